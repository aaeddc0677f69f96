/** Runs in a worker thread: one calculation per message, and refusals as data (classes don't cross threads). */
import type { MessagePort } from "node:worker_threads";
import { assess, EngineError } from "@/lib/engine";
import type { AssessmentInput } from "@/lib/engine/types";
import type { TaskOutcome } from "./outcome";

export type Task = { input: AssessmentInput; progress?: MessagePort };

export default function run({ input, progress }: Task): TaskOutcome {
  try {
    const result = assess(input, progress ? { onProgress: (done, of) => progress.postMessage({ done, of }) } : {});
    return { kind: "result", result };
  } catch (error) {
    if (error instanceof EngineError) return { kind: "refused", code: error.code, faults: [...error.faults] };
    throw error;
  } finally {
    progress?.close();
  }
}
