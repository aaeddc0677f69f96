import type { AssessmentResult, Interval, PackageResult, Payer, WithoutMeasuresResult } from "@/lib/engine/types";
import type { Range } from "@/lib/charts/axes";

/** Figures as shown: the median of the draws with its interval, or the central run where nothing is drawn. */
export const ofInterval = ({ median, low, high }: Interval): Range => ({ mid: median, low, high });
/** The median where something was drawn, otherwise the central run. */
export const shownRange = (interval: Interval | null | undefined, central: number): Range => (interval ? ofInterval(interval) : { mid: central, low: null, high: null });

/** A range's two ends, or null where it is taken as certain. */
export const endsOf = ({ low, high }: Range): { low: number; high: number } | null => (low === null || high === null ? null : { low, high });

/** What the comparison shows of no further measures. Day numbers count from day 0. */
export function withoutFigures({ uncertainty: u, ...without }: Omit<WithoutMeasuresResult, "course">) {
  return {
    thresholdRatio: shownRange(u?.thresholdRatio, without.thresholdRatio),
    reproductionNumber: shownRange(u?.reproductionNumber, without.reproductionNumber),
    finalDeaths: shownRange(u?.finalDeaths, without.finalDeaths),
    peakDay: shownRange(u?.peakDay, without.peak.day),
    chanceShrinks: u?.chanceShrinks ?? null,
    central: { finalDeaths: without.finalDeaths },
  };
}
export type WithoutFigures = ReturnType<typeof withoutFigures>;

const PAYERS: readonly Payer[] = ["public", "business", "household"];

/** What the comparison shows of one package. */
export function packageFigures({ uncertainty: u, ...result }: Omit<PackageResult, "course">) {
  return {
    thresholdRatio: shownRange(u?.thresholdRatio, result.thresholdRatio),
    finalDeaths: {
      asScheduled: shownRange(u?.finalDeaths.asScheduled, result.finalDeaths.asScheduled),
      heldToEnd: shownRange(u?.finalDeaths.heldToEnd, result.finalDeaths.heldToEnd),
      heldFromDayZero: shownRange(u?.finalDeaths.heldFromDayZero, result.finalDeaths.heldFromDayZero),
    },
    deathsAverted: {
      asScheduled: shownRange(u?.deathsAverted.asScheduled, result.deathsAverted.asScheduled),
      heldToEnd: shownRange(u?.deathsAverted.heldToEnd, result.deathsAverted.heldToEnd),
    },
    peakDay: shownRange(u?.peakDay, result.peak.day),
    cost: {
      total: shownRange(u?.cost.total, result.cost.total),
      byPayer: Object.fromEntries(PAYERS.map((payer) => [payer, shownRange(u?.cost.byPayer[payer], result.cost.byPayer[payer])])) as Record<Payer, Range>,
    },
    perDeathAverted: u ? (u.perDeathAverted ? ofInterval(u.perDeathAverted) : null) : result.cost.perDeathAverted === null ? null : shownRange(undefined, result.cost.perDeathAverted),
    chanceEnough: u?.chanceEnough ?? null,
    susceptibleShareAtLift: result.susceptibleShareAtLift === null ? null : shownRange(u?.susceptibleShareAtLift, result.susceptibleShareAtLift),
    central: { finalDeaths: result.finalDeaths.asScheduled, thresholdRatio: result.thresholdRatio },
  };
}
export type PackageFigures = ReturnType<typeof packageFigures>;

/** Where a ratio lies to 1, its whole interval considered. */
export type EnoughState = "enough" | "likely" | "fallsShort" | "notEnough";
export function enoughState({ mid, low, high }: Range): EnoughState {
  if ((low ?? mid) >= 1) return "enough";
  if ((high ?? mid) < 1) return "notEnough";
  return mid >= 1 ? "likely" : "fallsShort";
}

/** The result without its daily courses: what a page needs. */
export type SlimResult = Omit<AssessmentResult, "withoutMeasures" | "packages"> & {
  withoutMeasures: Omit<WithoutMeasuresResult, "course">;
  packages: Omit<PackageResult, "course">[];
};
export function withoutCourses({ withoutMeasures: { course: _, ...withoutMeasures }, packages, ...rest }: AssessmentResult): SlimResult {
  return { ...rest, withoutMeasures, packages: packages.map(({ course: __, ...each }) => each) };
}
