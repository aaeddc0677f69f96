import { quantileSorted } from "./numeric";
import type { Interval } from "./types";

/** Median and 95 % interval of a sample, with the standard error of the median. */
export type Summary = Interval & { error: number };

/**
 * @param values one value per draw, at least one
 * @returns the error of the median from the order statistics that enclose it by one binomial standard deviation
 */
export function summarise(values: Float64Array): Summary {
  const sorted = Float64Array.from(values).sort();
  const n = sorted.length;
  const half = 0.5 / Math.sqrt(n);
  return {
    median: quantileSorted(sorted, 0.5),
    low: quantileSorted(sorted, 0.025),
    high: quantileSorted(sorted, 0.975),
    error: (quantileSorted(sorted, Math.min(1, 0.5 + half)) - quantileSorted(sorted, Math.max(0, 0.5 - half))) / 2,
  };
}

export const interval = ({ median, low, high }: Summary): Interval => ({ median, low, high });

/** Standard error of a share of n draws. */
export const shareError = (share: number, n: number): number => Math.sqrt((share * (1 - share)) / n);

export const mean = (values: Float64Array): number => values.reduce((sum, value) => sum + value, 0) / values.length;
