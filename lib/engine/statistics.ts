import { quantileSorted } from "./numeric";
import type { Interval } from "./types";

/** Standard errors of an interval's three quantiles. */
export type IntervalError = Interval;

/**
 * Median and 95 % interval of a sample, each with its Monte-Carlo error: half the distance of the order statistics one
 * binomial standard deviation to either side. For a Latin hypercube, whose error is smaller, that errs on the safe side.
 * @param values one value per draw, at least one
 */
export function summarise(values: Float64Array): { interval: Interval; error: IntervalError } {
  const sorted = Float64Array.from(values).sort();
  const errorAt = (p: number) => {
    const half = shareError(p, sorted.length);
    return (quantileSorted(sorted, Math.min(1, p + half)) - quantileSorted(sorted, Math.max(0, p - half))) / 2;
  };
  return {
    interval: { median: quantileSorted(sorted, 0.5), low: quantileSorted(sorted, 0.025), high: quantileSorted(sorted, 0.975) },
    error: { median: errorAt(0.5), low: errorAt(0.025), high: errorAt(0.975) },
  };
}

/** Standard error of a share of n draws. */
export const shareError = (share: number, n: number): number => Math.sqrt((share * (1 - share)) / n);

export const mean = (values: Float64Array): number => values.reduce((sum, value) => sum + value, 0) / values.length;

/** Standard error of the mean. */
export function meanError(values: Float64Array): number {
  const middle = mean(values);
  return Math.sqrt(values.reduce((sum, value) => sum + (value - middle) ** 2, 0)) / values.length;
}

/** Share of the values that satisfy a condition. */
export const shareOf = (values: Float64Array, holds: (value: number, row: number) => boolean): number =>
  values.reduce((count, value, row) => count + (holds(value, row) ? 1 : 0), 0) / values.length;
