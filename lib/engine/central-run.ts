/** The central run: every input at its centre, integrated twice, by the solver that is drawn and by the fast kernel. */
import { factorFromDayZero, type Plan, pieceFactors } from "./measure-effects";
import { type Parameters, removalsFromDayZero, removalsHeld, thresholdRatioOf } from "./model";
import { costPerDeath, packageCost, type Tariff } from "./prices";
import { followSchedule, newRun } from "./taylor-kernel";
import { type Trajectory, trajectory } from "./trajectory";
import { chanceChainsEnd } from "./transmission";
import type { PackageResult, Phase, WithoutMeasuresResult } from "./types";
import { packageWarnings } from "./warnings";
import { isLift } from "./windows";

export type Check = { integratorDifferencePersons: number; settledResidual: number; converged: boolean; peakFound: boolean; steps: number };

export function runWithoutMeasures(p: Parameters, horizonDays: number): { result: WithoutMeasuresResult; check: Check } {
  const drawn = trajectory(p, [0], [1], horizonDays);
  const fast = followSchedule(p, [0], [1], { peak: true, belowOne: false }, newRun(1));
  const b = thresholdRatioOf(p);
  return {
    result: {
      thresholdRatio: b,
      reproductionNumber: 1 / b,
      finalDeaths: p.infectionFatality * drawn.removals,
      finalRemoved: p.removed + drawn.removals,
      peak: drawn.peak,
      worstDay: worstDay(p, drawn.peak),
      chanceDiesOut: chanceChainsEnd(b, p.exposed + p.infectious),
      uncertainty: null,
      course: drawn.course,
    },
    check: {
      integratorDifferencePersons: Math.abs(drawn.removals - fast.removals),
      settledResidual: fast.residual,
      converged: fast.converged,
      peakFound: drawn.peakFound,
      steps: fast.steps,
    },
  };
}

export function runPackage(p: Parameters, plan: Plan, tariff: Tariff, without: WithoutMeasuresResult, horizonDays: number): { result: PackageResult; check: Check } {
  const { pieces, starts, strongest } = plan;
  const factors = [...pieceFactors(plan, -1, new Float64Array(pieces.length))];
  const drawn = trajectory(p, starts, factors, horizonDays);
  const fast = followSchedule(p, starts, factors, { peak: true, belowOne: plan.neverLifted }, newRun(pieces.length));
  const held = removalsHeld(p, drawn.states[strongest]!, factors[strongest]!);
  const fastHeld = removalsHeld(p, fast.states[strongest]!, factors[strongest]!);
  const fromDayZero = removalsFromDayZero(p, factorFromDayZero(plan, -1));

  const phi = p.infectionFatality;
  const phases = phasesOf(p, plan, factors, drawn);
  const best = phases[strongest]!;
  const enough = best.thresholdRatio >= 1;
  const finalDeaths = { asScheduled: phi * drawn.removals, heldToEnd: phi * held.value, heldFromDayZero: phi * fromDayZero.value };
  const deathsAverted = { asScheduled: without.finalDeaths - finalDeaths.asScheduled, heldToEnd: without.finalDeaths - finalDeaths.heldToEnd };
  const chargedUntilDay = plan.neverLifted ? fast.dayBelowOne : null;
  const cost = packageCost(plan, tariff, p.population, chargedUntilDay ?? 0, -1);
  return {
    result: {
      id: plan.id,
      phases,
      strongestPhase: strongest,
      thresholdRatio: best.thresholdRatio,
      thresholdShift: best.thresholdRatio - without.thresholdRatio,
      enough,
      furtherFactor: enough ? null : best.thresholdRatio,
      finalDeaths,
      finalRemoved: p.removed + drawn.removals,
      deathsAverted,
      peak: drawn.peak,
      worstDay: worstDay(p, drawn.peak),
      susceptibleShareAtLift: plan.endsWithoutMeasures ? drawn.states.at(-1)!.susceptible / p.susceptible : null,
      cost: {
        total: cost.total,
        byPayer: cost.byPayer,
        ...(tariff.hasTransfers ? { transfers: cost.transfers } : {}),
        perDeathAverted: costPerDeath(cost.total, deathsAverted.asScheduled),
      },
      chargedUntilDay,
      contributions: contributions(plan),
      uncertainty: null,
      course: drawn.course,
      warnings: packageWarnings(plan, { finalDeaths: finalDeaths.asScheduled, chargedUntilDay, phases, peakFound: drawn.peakFound }),
    },
    check: {
      integratorDifferencePersons: Math.max(Math.abs(drawn.removals - fast.removals), Math.abs(held.value - fastHeld.value)),
      settledResidual: Math.max(fast.residual, held.residual, fromDayZero.residual),
      converged: fast.converged && held.outcome === "converged" && fromDayZero.outcome === "converged",
      peakFound: drawn.peakFound,
      steps: fast.steps,
    },
  };
}

/** With one group everybody infectious is equally likely to die, so the worst day is the day of the peak. */
const worstDay = (p: Parameters, peak: Trajectory["peak"]) => ({ day: peak.day, deaths: p.infectionFatality * p.removalRate * peak.infectious });

function phasesOf(p: Parameters, plan: Plan, factors: readonly number[], { states, susceptibleLeft }: Trajectory): Phase[] {
  return plan.pieces.map(({ fromDay, toDay }, k) => {
    const factor = factors[k]!;
    const next = states[k + 1];
    const infectedAtEnd = next ? next.latent + next.infectious : 0;
    return {
      fromDay,
      toDay,
      factor,
      thresholdRatio: thresholdRatioOf(p, p.susceptible, factor),
      effectiveRatioAtStart: thresholdRatioOf(p, states[k]!.susceptible, factor),
      effectiveRatioAtEnd: thresholdRatioOf(p, next?.susceptible ?? susceptibleLeft, factor),
      infectedAtEnd,
      chanceEndsByItself: next && isLift(plan.pieces, k) ? chanceChainsEnd(thresholdRatioOf(p, next.susceptible, factors[k + 1]!), infectedAtEnd) : null,
    };
  });
}

/** −ln mᵢ / Σ(−ln m) within the strongest phase; null for a measure not in force then, or where nothing is cut. */
function contributions(plan: Plan): PackageResult["contributions"] {
  const logs = new Map(
    plan.pieces[plan.strongest]!.items.map((item) => {
      const { measure, cut, uptake } = plan.items[item]!;
      return [measure.id, -Math.log1p(-uptake(-1) * cut(-1))] as const;
    }),
  );
  const sum = [...logs.values()].reduce((total, log) => total + log, 0);
  return [...new Set(plan.items.map(({ measure }) => measure.id))].map((measure) => {
    const log = logs.get(measure);
    return { measure, logShare: log === undefined || sum === 0 ? null : log / sum };
  });
}
