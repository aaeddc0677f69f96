// The parts of odex that are used.
export declare enum Outcome {
  Converged = 0,
  MaxStepsExceeded = 1,
  EarlyReturn = 2,
}
/** Dense output within the step just taken: component (from 0) at x. */
export type Dense = (component: number, x: number) => number;
export declare class Solver {
  constructor(dimensions: number);
  absoluteTolerance: number | number[];
  relativeTolerance: number | number[];
  denseOutput: boolean;
  maxSteps: number;
  initialStepSize: number;
  solve(
    f: (x: number, y: number[]) => number[],
    x0: number,
    y0: number[],
    xEnd: number,
    observe?: (step: number, xOld: number, x: number, y: number[], dense: Dense) => boolean | undefined,
  ): { y: number[]; outcome: Outcome; nStep: number; xEnd: number; nAccept: number; nReject: number; nEval: number };
}
