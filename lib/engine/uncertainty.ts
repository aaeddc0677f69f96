/** The draws: every package on the same ones, so that differences are differences of packages. */
import { removalsHeld, settledFromDayZero } from "./central-run";
import { EngineError } from "./errors";
import { factorFromDayZero, type Plan, pieceFactors } from "./measure-effects";
import { type ParametersAt, thresholdRatioOf } from "./outbreak";
import { type ByPayer, costPerDeath, PAYERS, packageCost, type Tariff } from "./prices";
import { interval, mean, shareError, summarise } from "./statistics";
import { followSchedule, newRun, type Parameters } from "./taylor-kernel";
import { chanceChainsEnd } from "./transmission";
import type { Comparison, Interval, PackageUncertainty, WithoutMeasuresResult } from "./types";

const ASK_TO_STOP_EVERY = 64;

type Columns<K extends string> = Record<K, Float64Array>;
const columns = <K extends string>(names: readonly K[], draws: number) =>
  Object.fromEntries(names.map((name) => [name, new Float64Array(draws)])) as Columns<K>;

const OUTBREAK = ["thresholdRatio", "reproductionNumber", "finalDeaths", "finalInfected", "peakDay"] as const;
const PACKAGE = [
  "thresholdRatio", "asScheduled", "heldToEnd", "heldFromDayZero", "avertedAsScheduled", "avertedHeldToEnd",
  "finalInfected", "peakDay", "total", ...PAYERS,
] as const;

export type DrawsOutcome = {
  without: NonNullable<WithoutMeasuresResult["uncertainty"]>;
  packages: PackageUncertainty[];
  pairs: Comparison["pairs"];
  refusedDraws: number;
};

type Progress = { onProgress?: ((share: number) => void) | undefined; shouldStop?: (() => boolean) | undefined };

/**
 * @param draws how many, ≥ 100
 * @throws EngineError "cancelled" where asked to stop; "outsideDomain" where more than half of the draws are unusable
 */
export function runDraws(parametersAt: ParametersAt, plans: readonly Plan[], tariffs: readonly Tariff[], draws: number, { onProgress, shouldStop }: Progress): DrawsOutcome {
  const outbreak = columns(OUTBREAK, draws);
  const perPackage = plans.map((plan) => ({ ...newColumns(plan, draws), run: newRun(plan.pieces.length), factors: new Float64Array(plan.pieces.length) }));
  const alone = newRun(1);
  let used = 0;
  let refused = 0;
  for (let draw = 0; draw < draws; draw++) {
    if (draw % ASK_TO_STOP_EVERY === 0) {
      if (shouldStop?.()) throw new EngineError("cancelled");
      onProgress?.(draw / draws);
    }
    const p = usable(parametersAt, draw);
    if (p === null) {
      refused++;
      continue;
    }
    followSchedule(p, [0], [1], { peak: true, belowOne: false }, alone);
    const b = thresholdRatioOf(p);
    const deathsWithout = p.infectionFatality * alone.removals;
    outbreak.thresholdRatio[used] = b;
    outbreak.reproductionNumber[used] = 1 / b;
    outbreak.finalDeaths[used] = deathsWithout;
    outbreak.finalInfected[used] = alone.removals;
    outbreak.peakDay[used] = alone.peakDay;
    for (const [index, plan] of plans.entries()) drawPackage(p, plan, tariffs[index]!, perPackage[index]!, deathsWithout, draw, used);
    used++;
  }
  onProgress?.(1);
  if (used < draws / 2) {
    throw new EngineError("outsideDomain", [{ path: "outbreak", message: `must be usable in most draws; ${refused} of ${draws} draws lie outside the domain. Narrow the ranges of transmission and periods.` }]);
  }
  const cut = (values: Float64Array) => values.subarray(0, used);
  return {
    without: summariseOutbreak(outbreak, cut, used),
    packages: perPackage.map((held, index) => summarisePackage(held, plans[index]!, cut, used)),
    pairs: pairsOf(plans, perPackage.map(({ figures }) => cut(figures.avertedAsScheduled))),
    refusedDraws: refused,
  };
}

function usable(parametersAt: ParametersAt, draw: number): Parameters | null {
  try {
    const p = parametersAt(draw);
    return p.susceptible > 0 && p.susceptible <= p.population ? p : null;
  } catch (error) {
    if (error instanceof EngineError && error.code === "outsideDomain") return null;
    throw error;
  }
}

type Held = ReturnType<typeof newColumns> & { run: ReturnType<typeof newRun>; factors: Float64Array };

function newColumns(plan: Plan, draws: number) {
  return {
    figures: columns(PACKAGE, draws),
    /** Per phase: effective ratio at its start ≥ 1 (count), and the chance that chains end where it is lifted (sum). */
    shrinks: new Float64Array(plan.pieces.length),
    ends: plan.pieces.map(() => new Float64Array(draws)),
  };
}

function drawPackage(p: Parameters, plan: Plan, tariff: Tariff, held: Held, deathsWithout: number, draw: number, row: number): void {
  const { figures, run, factors } = held;
  pieceFactors(plan, draw, factors);
  followSchedule(p, plan.starts, factors, { peak: true, belowOne: plan.neverLifted }, run);
  const k = plan.strongest;
  const phi = p.infectionFatality;
  const scheduled = phi * run.removals;
  const toEnd = phi * removalsHeld(p, run.states[k]!, factors[k]!).value;
  figures.thresholdRatio[row] = thresholdRatioOf(p, p.susceptible, factors[k]!);
  figures.asScheduled[row] = scheduled;
  figures.heldToEnd[row] = toEnd;
  figures.heldFromDayZero[row] = phi * settledFromDayZero(p, factorFromDayZero(plan, draw)).value;
  figures.avertedAsScheduled[row] = deathsWithout - scheduled;
  figures.avertedHeldToEnd[row] = deathsWithout - toEnd;
  figures.finalInfected[row] = run.removals;
  figures.peakDay[row] = run.peakDay;
  const cost = packageCost(plan, tariff, p.population, plan.neverLifted ? run.dayBelowOne : 0, draw);
  figures.total[row] = cost.total;
  for (const payer of PAYERS) figures[payer][row] = cost.byPayer[payer];
  for (let piece = 0; piece < plan.pieces.length; piece++) {
    if (thresholdRatioOf(p, run.states[piece]!.susceptible, factors[piece]!) >= 1) held.shrinks[piece]! += 1;
    if (piece + 1 < plan.pieces.length) {
      const next = run.states[piece + 1]!;
      const after = thresholdRatioOf(p, next.susceptible, factors[piece + 1]!);
      held.ends[piece]![row] = chanceChainsEnd(after, next.latent + next.infectious);
    }
  }
}

function summariseOutbreak(outbreak: Columns<(typeof OUTBREAK)[number]>, cut: (v: Float64Array) => Float64Array, used: number): DrawsOutcome["without"] {
  const monteCarloError: Record<string, number> = {};
  const take = (name: (typeof OUTBREAK)[number]): Interval => {
    const summary = summarise(cut(outbreak[name]));
    monteCarloError[name] = summary.error;
    return interval(summary);
  };
  const figures = Object.fromEntries(OUTBREAK.map((name) => [name, take(name)])) as Record<(typeof OUTBREAK)[number], Interval>;
  const chanceShrinks = cut(outbreak.thresholdRatio).filter((b) => b >= 1).length / used;
  monteCarloError.chanceShrinks = shareError(chanceShrinks, used);
  return { ...figures, chanceShrinks, monteCarloError };
}

function summarisePackage(held: Held, plan: Plan, cut: (v: Float64Array) => Float64Array, used: number): PackageUncertainty {
  const monteCarloError: Record<string, number> = {};
  const take = (name: (typeof PACKAGE)[number], path: string): Interval => {
    const summary = summarise(cut(held.figures[name]));
    monteCarloError[path] = summary.error;
    return interval(summary);
  };
  const averted = cut(held.figures.avertedAsScheduled);
  const total = cut(held.figures.total);
  const chanceEnough = cut(held.figures.thresholdRatio).filter((b) => b >= 1).length / used;
  monteCarloError.chanceEnough = shareError(chanceEnough, used);
  // A ratio of two uncertain numbers has no interval where the lower one can be 0 or below.
  const quotients = Array.from(total, (value, i) => costPerDeath(value, averted[i]!));
  const ratios = quotients.includes(null) ? null : summarise(Float64Array.from(quotients as number[]));
  if (ratios) monteCarloError.perDeathAverted = ratios.error;
  const phases = plan.pieces.map((piece, k) => {
    const chanceShrinksAtStart = held.shrinks[k]! / used;
    monteCarloError[`phases.${k}.chanceShrinksAtStart`] = shareError(chanceShrinksAtStart, used);
    const next = plan.pieces[k + 1];
    const lifted = next !== undefined && piece.items.some((item) => !next.items.includes(item));
    return { chanceShrinksAtStart, chanceEndsByItself: lifted ? mean(cut(held.ends[k]!)) : null };
  });
  return {
    thresholdRatio: take("thresholdRatio", "thresholdRatio"),
    finalDeaths: {
      asScheduled: take("asScheduled", "finalDeaths.asScheduled"),
      heldToEnd: take("heldToEnd", "finalDeaths.heldToEnd"),
      heldFromDayZero: take("heldFromDayZero", "finalDeaths.heldFromDayZero"),
    },
    deathsAverted: {
      asScheduled: take("avertedAsScheduled", "deathsAverted.asScheduled"),
      heldToEnd: take("avertedHeldToEnd", "deathsAverted.heldToEnd"),
    },
    finalInfected: take("finalInfected", "finalInfected"),
    cost: {
      total: take("total", "cost.total"),
      byPayer: Object.fromEntries(PAYERS.map((payer) => [payer, take(payer, `cost.byPayer.${payer}`)])) as Record<keyof ByPayer, Interval>,
    },
    peakDay: take("peakDay", "peakDay"),
    perDeathAverted: ratios ? interval(ratios) : null,
    chanceEnough,
    phases,
    monteCarloError,
  };
}

function pairsOf(plans: readonly Plan[], averted: readonly Float64Array[]): Comparison["pairs"] {
  return plans.flatMap((a, i) =>
    plans.flatMap((b, j) => {
      if (i === j) return [];
      const more = averted[i]!.reduce((count, value, row) => count + (value > averted[j]![row]! ? 1 : 0), 0);
      return [{ a: a.id, b: b.id, chanceAvertsMore: more / averted[i]!.length }];
    }),
  );
}
