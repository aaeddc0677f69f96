/** Rounding of everything that a person reads: three significant figures, central values and intervals alike. */

/** @returns the value to three significant figures; 0 stays 0 (never −0) */
export const threeFigures = (value: number): number => (value === 0 ? 0 : Number(value.toPrecision(3)) + 0);

/** Persons: three significant figures, and never a fraction of a person. */
export const wholePersons = (value: number): number => Math.round(threeFigures(value)) + 0;

/** Below this a count from the deterministic course says little: chance decides. */
export const FEW = 10;
export const isFew = (value: number): boolean => Math.abs(value) < FEW;

/**
 * Whether a number of averted deaths may be shown as one: at or above ten, and its interval doesn't hold 0.
 * @param interval null where nothing was drawn
 */
export function isMeasurable(value: number, interval: { low: number; high: number } | null): boolean {
  return Math.abs(value) >= FEW && (interval === null || interval.low > 0 || interval.high < 0);
}

/** A share in whole per cent, with "under 1 %" and "over 99 %" where rounding would say never or always. */
export type PercentShown = { bound: "under" | "over" | "plain"; percent: number };
export function percentShown(share: number): PercentShown {
  const percent = share * 100;
  if (percent < 1) return { bound: "under", percent: 1 };
  if (percent > 99 && percent < 100) return { bound: "over", percent: 99 };
  return { bound: "plain", percent: Math.round(percent) };
}
