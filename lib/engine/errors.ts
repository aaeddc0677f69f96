/** One thing wrong with an input: where, what, and what is allowed. */
export type Fault = { path: string; message: string };

export type EngineErrorCode =
  /** The input lies outside the engine's domain; `faults` says where. */
  | "outsideDomain"
  /** An iteration did not converge. */
  | "notConverged"
  /** The caller asked to stop. */
  | "cancelled";

/** A refusal. The engine never clamps an input that it can't use. */
export class EngineError extends Error {
  override readonly name = "EngineError";
  constructor(
    readonly code: EngineErrorCode,
    readonly faults: readonly Fault[] = [],
  ) {
    super([code, ...faults.map(({ path, message }) => `${path}: ${message}`)].join("\n"));
  }
}

export const outsideDomain = (path: string, message: string): EngineError =>
  new EngineError("outsideDomain", [{ path, message }]);

/** Periods a thousand times shorter than the schedule would take hours: refused rather than left to run. */
export const tooManySteps = (): EngineError =>
  outsideDomain("outbreak.infectiousPeriod", "must be longer beside the length of this course: with periods this short it takes more than 100,000 steps");
