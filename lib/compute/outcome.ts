import type { AssessmentResult } from "@/lib/engine/types";

export type Fault = { path: string; message: string };

/** What a worker thread sends back. */
export type TaskOutcome =
  | { kind: "result"; result: AssessmentResult }
  | { kind: "refused"; code: string; faults: Fault[] };

export type ComputeErrorCode =
  /** The input lies outside what the engine can calculate; `faults` says where. */
  | "refused"
  /** Too many calculations wait already. */
  | "busy"
  /** It took longer than allowed. */
  | "timeLimit"
  /** The caller withdrew it. */
  | "cancelled";

/** A calculation that brought no result, and why. */
export class ComputeError extends Error {
  override readonly name = "ComputeError";
  constructor(
    readonly code: ComputeErrorCode,
    readonly faults: readonly Fault[] = [],
  ) {
    super([code, ...faults.map(({ path, message }) => `${path}: ${message}`)].join("\n"));
  }
}
