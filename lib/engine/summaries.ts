/** Samples to medians, intervals, chances and their Monte-Carlo errors. */
import type { Plan } from "./measure-effects";
import type { OutbreakSample, PackageSample } from "./one-draw";
import { costPerDeath } from "./prices";
import { mean, meanError, shareError, shareOf, summarise } from "./statistics";
import type { Interval, PackageUncertainty, WithoutMeasuresResult } from "./types";
import { isLift } from "./windows";

/** Summarises and keeps the errors under the figure's dotted path. */
function bookkeeper(rows: number) {
  const monteCarloError: Record<string, number> = {};
  return {
    monteCarloError,
    interval(path: string, values: Float64Array): Interval {
      const { interval, error } = summarise(values);
      monteCarloError[path] = error.median;
      monteCarloError[`${path}.low`] = error.low;
      monteCarloError[`${path}.high`] = error.high;
      return interval;
    },
    chance(path: string, values: Float64Array): number {
      const share = shareOf(values, (ratio) => ratio >= 1);
      monteCarloError[path] = shareError(share, rows);
      return share;
    },
    mean(path: string, values: Float64Array): number {
      monteCarloError[path] = meanError(values);
      return mean(values);
    },
  };
}

export function outbreakSummary({ rows, figures }: OutbreakSample): NonNullable<WithoutMeasuresResult["uncertainty"]> {
  const { interval, chance, monteCarloError } = bookkeeper(rows);
  return {
    thresholdRatio: interval("thresholdRatio", figures.thresholdRatio),
    reproductionNumber: interval("reproductionNumber", figures.reproductionNumber),
    finalDeaths: interval("finalDeaths", figures.finalDeaths),
    finalInfected: interval("finalInfected", figures.finalInfected),
    peakDay: interval("peakDay", figures.peakDay),
    peakInfectious: interval("peakInfectious", figures.peakInfectious),
    worstDayDeaths: interval("worstDayDeaths", figures.worstDayDeaths),
    chanceShrinks: chance("chanceShrinks", figures.thresholdRatio),
    monteCarloError,
  };
}

export function packageSummary({ rows, figures, phases }: PackageSample, plan: Plan): PackageUncertainty {
  const { interval, chance, mean: meanOf, monteCarloError } = bookkeeper(rows);
  // A ratio has an interval only where every draw gives one: not where some draws avert nothing.
  const ratios = Array.from(figures.total, (cost, row) => costPerDeath(cost, figures.avertedAsScheduled[row]!));
  return {
    thresholdRatio: interval("thresholdRatio", figures.thresholdRatio),
    thresholdShift: interval("thresholdShift", figures.thresholdShift),
    finalDeaths: {
      asScheduled: interval("finalDeaths.asScheduled", figures.asScheduled),
      heldToEnd: interval("finalDeaths.heldToEnd", figures.heldToEnd),
      heldFromDayZero: interval("finalDeaths.heldFromDayZero", figures.heldFromDayZero),
    },
    deathsAverted: {
      asScheduled: interval("deathsAverted.asScheduled", figures.avertedAsScheduled),
      heldToEnd: interval("deathsAverted.heldToEnd", figures.avertedHeldToEnd),
    },
    finalInfected: interval("finalInfected", figures.finalInfected),
    cost: {
      total: interval("cost.total", figures.total),
      byPayer: {
        public: interval("cost.byPayer.public", figures.public),
        business: interval("cost.byPayer.business", figures.business),
        household: interval("cost.byPayer.household", figures.household),
      },
    },
    peakDay: interval("peakDay", figures.peakDay),
    peakInfectious: interval("peakInfectious", figures.peakInfectious),
    worstDayDeaths: interval("worstDayDeaths", figures.worstDayDeaths),
    susceptibleShareAtLift: plan.endsWithoutMeasures ? interval("susceptibleShareAtLift", figures.susceptibleShareAtLift) : null,
    chargedUntilDay: plan.neverLifted ? interval("chargedUntilDay", figures.chargedUntilDay) : null,
    perDeathAverted: ratios.includes(null) ? null : interval("perDeathAverted", Float64Array.from(ratios as number[])),
    chanceEnough: chance("chanceEnough", figures.thresholdRatio),
    phases: phases.map((phase, k) => ({
      effectiveRatioAtStart: interval(`phases.${k}.effectiveRatioAtStart`, phase.ratioAtStart),
      effectiveRatioAtEnd: interval(`phases.${k}.effectiveRatioAtEnd`, phase.ratioAtEnd),
      infectedAtEnd: interval(`phases.${k}.infectedAtEnd`, phase.infectedAtEnd),
      chanceShrinksAtStart: chance(`phases.${k}.chanceShrinksAtStart`, phase.ratioAtStart),
      chanceEndsByItself: isLift(plan.pieces, k) ? meanOf(`phases.${k}.chanceEndsByItself`, phase.chanceEnds) : null,
    })),
    monteCarloError,
  };
}
