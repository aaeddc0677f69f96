/** The only door to the engine. */
export { type AssessOptions, assess } from "./assess";
export { canonicalJson, hashInput, sha256Hex } from "./canonical";
export { EngineError, type EngineErrorCode, type Fault } from "./errors";
export { LIMITS } from "./limits";
export { PAYERS } from "./prices";
export { central } from "./quantities";
export { AssessmentInputSchema, parseAssessmentInput, TRANSMISSION_RANGE } from "./schema";
export { otherFixedPoint, type Solved, settledState, settledValue, stabilitySlope } from "./settled-state";
export {
  chanceChainsEnd,
  chanceOneChainEnds,
  doublingTimeOfGrowth,
  growthRateAt,
  growthRateOfDoubling,
  reproductionNumberAtGrowth,
  startState,
} from "./transmission";
export type * from "./types";
export { ENGINE_VERSION } from "./version";
export { type Piece, piecesOf } from "./windows";
