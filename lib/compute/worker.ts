/** Runs in a worker thread: one calculation per message, and refusals as data (classes don't cross threads). */
import type { MessagePort } from "node:worker_threads";
import { assess, EngineError } from "@/lib/engine";
import type { AssessmentInput } from "@/lib/engine/types";
import type { TaskOutcome } from "./outcome";

export type Task = { input: AssessmentInput; progress?: MessagePort };

export default function run({ input, progress }: Task): TaskOutcome {
  try {
    return { kind: "result", result: assess(input, progress ? { onProgress: inSteps(progress) } : {}) };
  } catch (error) {
    if (error instanceof EngineError) return { kind: "refused", code: error.code, faults: [...error.faults] };
    throw error;
  } finally {
    progress?.close();
  }
}

const STEP = 0.02;

/** Tells about every second hundredth only: messages cost more than draws. */
function inSteps(port: MessagePort): (share: number) => void {
  let told = -1;
  return (share) => {
    if (share - told < STEP && share < 1) return;
    told = share;
    port.postMessage(share);
  };
}
