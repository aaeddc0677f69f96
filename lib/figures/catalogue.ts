import type { AssessmentResult, Interval, PackageResult } from "../engine/types";

/** Central value with its ends where draws exist. Persons, shares 0..1, days from day 0, or money. */
export type FigureValue = { value: number; low: number | null; high: number | null };
export type FigureKind = "deaths" | "persons" | "share" | "day" | "money";

type Read = (result: AssessmentResult, found: PackageResult | null) => FigureValue | null;
type Entry = { kind: FigureKind; of: "either" | "package"; read: Read };

const drawn = (interval: Interval | undefined | null, fallback: number): FigureValue =>
  interval ? { value: interval.median, low: interval.low, high: interval.high } : { value: fallback, low: null, high: null };
const exact = (value: number | null | undefined): FigureValue | null => (value == null ? null : { value, low: null, high: null });

/**
 * Every figure that a briefing may bind. Where draws exist it is their median; a difference is the median of paired
 * differences. Forgetting one key elsewhere doesn't compile.
 */
export const FIGURES = {
  finalDeaths: {
    kind: "deaths",
    of: "either",
    read: (result, found) =>
      found ? drawn(found.uncertainty?.finalDeaths.asScheduled, found.finalDeaths.asScheduled) : drawn(result.withoutMeasures.uncertainty?.finalDeaths, result.withoutMeasures.finalDeaths),
  },
  finalDeathsHeld: { kind: "deaths", of: "package", read: (_, found) => (found ? drawn(found.uncertainty?.finalDeaths.heldToEnd, found.finalDeaths.heldToEnd) : null) },
  deathsAverted: { kind: "deaths", of: "package", read: (_, found) => (found ? drawn(found.uncertainty?.deathsAverted.asScheduled, found.deathsAverted.asScheduled) : null) },
  infected: {
    kind: "persons",
    of: "either",
    read: (result, found) => {
      const interval = found ? found.uncertainty?.finalInfected : result.withoutMeasures.uncertainty?.finalInfected;
      return interval ? drawn(interval, Number.NaN) : null;
    },
  },
  chanceShrinks: {
    kind: "share",
    of: "either",
    read: (result, found) =>
      exact(found ? found.uncertainty?.phases[found.strongestPhase]?.chanceShrinksAtStart : result.withoutMeasures.uncertainty?.chanceShrinks),
  },
  chanceEndsByItself: {
    kind: "share",
    of: "package",
    read: (_, found) => exact(found?.uncertainty?.phases.findLast(({ chanceEndsByItself }) => chanceEndsByItself !== null)?.chanceEndsByItself),
  },
  /** Day with most infectious people. */
  peakDay: {
    kind: "day",
    of: "either",
    read: (result, found) => (found ? drawn(found.uncertainty?.peakDay, found.peak.day) : drawn(result.withoutMeasures.uncertainty?.peakDay, result.withoutMeasures.peak.day)),
  },
  /** All payers, over all days charged, in the currency's major unit. */
  costTotal: { kind: "money", of: "package", read: (_, found) => (found ? drawn(found.uncertainty?.cost.total, found.cost.total) : null) },
} as const satisfies Record<string, Entry>;

export type FigureKey = keyof typeof FIGURES;
export const FIGURE_KEYS = Object.keys(FIGURES) as FigureKey[];
export const isFigureKey = (value: string): value is FigureKey => Object.hasOwn(FIGURES, value);

/** The value that a reference names; null where the assessment doesn't hold it. @param letter package, or "none" */
export function readFigure(result: AssessmentResult, key: FigureKey, letter: string): FigureValue | null {
  const { of, read } = FIGURES[key] as Entry;
  if (letter === "none") return of === "either" ? read(result, null) : null;
  const found = result.packages.find(({ id }) => id === letter);
  return found ? read(result, found) : null;
}
