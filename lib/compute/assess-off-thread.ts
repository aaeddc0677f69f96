import os from "node:os";
import { MessageChannel } from "node:worker_threads";
import { Piscina } from "piscina";
import type { AssessmentInput, AssessmentResult } from "@/lib/engine/types";
import { ComputeError, type TaskOutcome } from "./outcome";
import { workerFile } from "./worker-file";

/** Calculations that may be under way or waiting; the next one is told to come back. */
const PENDING_MAX = 12;
const TIME_LIMIT_MS = 60_000;

type Held = { ebbmarkCompute?: Piscina; ebbmarkComputePending?: number };
const held = globalThis as Held;
const pending = (change: number): number => {
  held.ebbmarkComputePending = (held.ebbmarkComputePending ?? 0) + change;
  return held.ebbmarkComputePending;
};

// On globalThis, so that hot reload doesn't leave a pool behind per save.
function pool(): Piscina {
  held.ebbmarkCompute ??= new Piscina({
    filename: workerFile(),
    minThreads: 0,
    maxThreads: Math.min(4, Math.max(1, os.availableParallelism() - 1)),
    idleTimeout: 30_000,
    resourceLimits: { maxOldGenerationSizeMb: 1024 },
    // What node was started with (a loader of TypeScript, say) is not for the bundle.
    execArgv: [],
  });
  return held.ebbmarkCompute;
}

export type OffThreadOptions = {
  /** Ends the calculation: a running thread is stopped, a waiting one is taken out of the queue. */
  signal?: AbortSignal | undefined;
  /** Milliseconds, waiting included. Default 60,000. */
  timeLimitMs?: number;
  /** Share of the draws done, 0..1. */
  onProgress?: (share: number) => void;
};

/**
 * Runs the engine's `assess` in a worker thread.
 * @throws {ComputeError} refused | busy | timeLimit | cancelled
 */
export async function assessOffThread(input: AssessmentInput, options: OffThreadOptions = {}): Promise<AssessmentResult> {
  const { signal, timeLimitMs = TIME_LIMIT_MS, onProgress } = options;
  if (signal?.aborted) throw new ComputeError("cancelled");
  if (pending(0) >= PENDING_MAX) throw new ComputeError("busy");
  pending(1);
  const timeLimit = AbortSignal.timeout(timeLimitMs);
  const stop = signal ? AbortSignal.any([signal, timeLimit]) : timeLimit;
  const channel = onProgress ? new MessageChannel() : null;
  channel?.port1.on("message", (share: number) => onProgress?.(share));
  try {
    const outcome = await (pool().run(channel ? { input, progress: channel.port2 } : { input }, {
      signal: stop,
      ...(channel ? { transferList: [channel.port2] } : {}),
    }) as Promise<TaskOutcome>);
    if (outcome.kind === "refused") throw new ComputeError("refused", outcome.faults);
    return outcome.result;
  } catch (error) {
    if (signal?.aborted) throw new ComputeError("cancelled");
    if (timeLimit.aborted) throw new ComputeError("timeLimit");
    throw error;
  } finally {
    pending(-1);
    channel?.port1.close();
  }
}

/** Stops every thread; for tests and processes that end by themselves. */
export async function closeCompute(): Promise<void> {
  const open = held.ebbmarkCompute;
  delete held.ebbmarkCompute;
  await open?.destroy();
}
