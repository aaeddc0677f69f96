import { latinHypercubeScores } from "./random";
import type { AssessmentInput, Quantity } from "./types";

/** The number itself, or the median of its quantiles. */
export const central = (value: Quantity): number => (typeof value === "number" ? value : value.central);

/** Φ⁻¹(0.975): low and high are the 2.5 % and 97.5 % quantiles. */
const Z_975 = 1.959963984540054;

/** The scale on which an input's two half-normals are laid (README.md, section "Uncertainty"). */
export type Scale = "log" | "logOfRest" | "logit" | "linear" | "linearFromZero" | "linearShare";

const TO: Record<Scale, (x: number) => number> = {
  log: Math.log,
  logOfRest: (x) => Math.log1p(-x),
  logit: (x) => Math.log(x) - Math.log1p(-x),
  linear: (x) => x,
  linearFromZero: (x) => x,
  linearShare: (x) => x,
};
const FROM: Record<Scale, (x: number) => number> = {
  log: Math.exp,
  logOfRest: (x) => -Math.expm1(x),
  logit: (x) => 1 / (1 + Math.exp(-x)),
  linear: (x) => x,
  linearFromZero: (x) => Math.max(0, x),
  linearShare: (x) => Math.min(1, Math.max(0, x)),
};

/** Positive quantities on the log scale; those that reach 0 linearly, cut off at 0. */
export const positiveScale = (low: number): Scale => (low > 0 ? "log" : "linearFromZero");
/** Costs are laid out linearly, cut off at 0. */
export const costScale = (): Scale => "linearFromZero";
/** Shares strictly inside (0, 1) on the logit scale; those that reach an end linearly, cut off there. */
export const shareScale = (low: number, high: number): Scale => (low > 0 && high < 1 ? "logit" : "linearShare");

/**
 * Two-piece normal: x(p) = central + Φ⁻¹(p) × side/1.96 on the scale; side is the distance to low below the median and
 * to high above it.
 * @param scores standard normal scores
 */
export function spread(value: Exclude<Quantity, number>, scale: Scale, scores: Float64Array): Float64Array {
  const middle = TO[scale](value.central);
  // log(1 − e) falls as e rises, so its high end is the low cut.
  const below = (middle - TO[scale](value.low)) / Z_975;
  const above = (TO[scale](value.high) - middle) / Z_975;
  const from = FROM[scale];
  return scores.map((z) => from(middle + z * (z < 0 ? below : above)));
}

/** Standard deviations of the two halves on the scale. */
export function sidesOf(value: Exclude<Quantity, number>, scale: Scale): { lower: number; upper: number } {
  const middle = TO[scale](value.central);
  return { lower: Math.abs(middle - TO[scale](value.low)) / Z_975, upper: Math.abs(TO[scale](value.high) - middle) / Z_975 };
}

/** Reads one input in draw `i`; `i = -1` is the central run. */
export type Reader = (i: number) => number;

/** Hands out one reader per named input; inputs with the same name rise and fall together. */
export class Draws {
  private readonly scores = new Map<string, Float64Array>();
  constructor(private readonly uncertainty: AssessmentInput["uncertainty"]) {}

  reader(name: string, value: Quantity, scaleOf: (low: number, high: number) => Scale): Reader {
    const middle = central(value);
    if (typeof value === "number" || value.low === value.high || !this.uncertainty) return () => middle;
    const { draws, seed } = this.uncertainty;
    let scores = this.scores.get(name);
    if (!scores) {
      scores = latinHypercubeScores(draws, seed, name);
      this.scores.set(name, scores);
    }
    const values = spread(value, scaleOf(value.low, value.high), scores);
    return (i) => (i < 0 ? middle : values[i]!);
  }
}
