/** The central run: every input at its centre, integrated twice, by the solver that is drawn and by the fast kernel. */
import { factorFromDayZero, type Plan, pieceFactors } from "./measure-effects";
import { thresholdRatioOf } from "./outbreak";
import { costPerDeath, packageCost, type Tariff } from "./prices";
import { removalsToCome, type State } from "./settled-state";
import { followSchedule, newRun, type Parameters, TEN_YEARS_DAYS } from "./taylor-kernel";
import { trajectory } from "./trajectory";
import { chanceChainsEnd } from "./transmission";
import type { PackageResult, Phase, Warning, WithoutMeasuresResult } from "./types";

export type Check = { integratorDifferencePersons: number; settledResidual: number; converged: boolean };

const stateOf = (p: Parameters): State => ({ susceptible: p.susceptible, latent: p.exposed, infectious: p.infectious, removed: 0 });

/** Removals from day 0 on under a factor on β that holds for ever. Persons. */
export const settledFromDayZero = (p: Parameters, factor: number) =>
  removalsToCome(stateOf(p), p.population, p.transmissionRate * factor, p.removalRate);

export function runWithoutMeasures(p: Parameters, horizonDays: number): { result: WithoutMeasuresResult; check: Check } {
  const drawn = trajectory(p, [0], [1], horizonDays);
  const fast = followSchedule(p, [0], [1], { peak: true, belowOne: false }, newRun(1));
  const b = thresholdRatioOf(p);
  const perRemoval = p.infectionFatality * p.removalRate;
  return {
    result: {
      thresholdRatio: b,
      reproductionNumber: 1 / b,
      finalDeaths: p.infectionFatality * drawn.removals,
      finalRemoved: p.removed + drawn.removals,
      peak: drawn.peak,
      worstDay: { day: drawn.peak.day, deaths: perRemoval * drawn.peak.infectious },
      chanceDiesOut: chanceChainsEnd(b, p.exposed + p.infectious),
      uncertainty: null,
      course: drawn.course,
    },
    check: { integratorDifferencePersons: Math.abs(drawn.removals - fast.removals), settledResidual: fast.residual, converged: fast.converged },
  };
}

export function runPackage(p: Parameters, plan: Plan, tariff: Tariff, without: WithoutMeasuresResult, horizonDays: number): { result: PackageResult; check: Check } {
  const { pieces, starts, strongest } = plan;
  const factors = [...pieceFactors(plan, -1, new Float64Array(pieces.length))];
  const drawn = trajectory(p, starts, factors, horizonDays);
  const fast = followSchedule(p, starts, factors, { peak: true, belowOne: true }, newRun(pieces.length));
  const held = removalsHeld(p, drawn.states[strongest]!, factors[strongest]!);
  const fromZero = settledFromDayZero(p, factorFromDayZero(plan, -1));
  const fastHeld = removalsHeld(p, fast.states[strongest]!, factors[strongest]!);

  const phases = pieces.map((piece, k): Phase => {
    const at = drawn.states[k]!;
    const next = drawn.states[k + 1];
    const susceptibleAtEnd = next?.susceptible ?? drawn.susceptibleLeft;
    const infectedAtEnd = next ? next.latent + next.infectious : 0;
    const after = next ? thresholdRatioOf(p, next.susceptible, factors[k + 1]!) : null;
    return {
      fromDay: piece.fromDay,
      toDay: piece.toDay,
      factor: factors[k]!,
      thresholdRatio: thresholdRatioOf(p, p.susceptible, factors[k]!),
      effectiveRatioAtStart: thresholdRatioOf(p, at.susceptible, factors[k]!),
      effectiveRatioAtEnd: thresholdRatioOf(p, susceptibleAtEnd, factors[k]!),
      infectedAtEnd,
      chanceEndsByItself: after !== null && factors[k + 1]! > factors[k]! ? chanceChainsEnd(after, infectedAtEnd) : null,
    };
  });
  const phi = p.infectionFatality;
  const best = phases[strongest]!;
  const finalDeaths = { asScheduled: phi * drawn.removals, heldToEnd: phi * held.value, heldFromDayZero: phi * fromZero.value };
  const deathsAverted = { asScheduled: without.finalDeaths - finalDeaths.asScheduled, heldToEnd: without.finalDeaths - finalDeaths.heldToEnd };
  const chargedUntilDay = plan.neverLifted ? fast.dayBelowOne : null;
  const cost = packageCost(plan, tariff, p.population, chargedUntilDay ?? 0, -1);
  const lastLift = plan.neverLifted || plan.items.length === 0 ? null : drawn.states.at(-1)!;
  return {
    result: {
      id: plan.id,
      phases,
      strongestPhase: strongest,
      thresholdRatio: best.thresholdRatio,
      thresholdShift: best.thresholdRatio - without.thresholdRatio,
      enough: best.thresholdRatio >= 1,
      furtherFactor: best.thresholdRatio >= 1 ? null : best.thresholdRatio,
      finalDeaths,
      finalRemoved: p.removed + drawn.removals,
      deathsAverted,
      peak: drawn.peak,
      worstDay: { day: drawn.peak.day, deaths: phi * p.removalRate * drawn.peak.infectious },
      susceptibleShareAtLift: lastLift ? lastLift.susceptible / p.susceptible : null,
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
      warnings: packageWarnings(plan, finalDeaths.asScheduled, chargedUntilDay, phases),
    },
    check: {
      integratorDifferencePersons: Math.max(Math.abs(drawn.removals - fast.removals), Math.abs(held.value - fastHeld.value)),
      settledResidual: Math.max(fast.residual, held.residual, fromZero.residual),
      converged: fast.converged && held.outcome === "converged" && fromZero.outcome === "converged",
    },
  };
}

/** Removals from day 0 on where the strongest piece, once begun, never ends. */
export function removalsHeld(p: Parameters, from: State, factor: number) {
  const solved = removalsToCome(from, p.population, p.transmissionRate * factor, p.removalRate);
  return { ...solved, value: from.removed + solved.value };
}

function contributions(plan: Plan): PackageResult["contributions"] {
  const inForce = plan.pieces[plan.strongest]!.items;
  const logs = new Map(inForce.map((item) => {
    const { measure, cut, uptake } = plan.items[item]!;
    return [measure.id, -Math.log1p(-uptake(-1) * cut(-1))] as const;
  }));
  const sum = [...logs.values()].reduce((total, log) => total + log, 0);
  return [...new Set(plan.items.map(({ measure }) => measure.id))].map((measure) => {
    const log = logs.get(measure);
    return { measure, logShare: log === undefined || sum === 0 ? null : log / sum };
  });
}

function packageWarnings(plan: Plan, finalDeaths: number, chargedUntilDay: number | null, phases: readonly Phase[]): Warning[] {
  const warnings: Warning[] = [];
  if (finalDeaths < 10) warnings.push({ code: "chanceDominates", message: "Settled deaths are below 10: chance decides, and the deterministic figure is no forecast." });
  if (chargedUntilDay !== null && chargedUntilDay >= TEN_YEARS_DAYS) warnings.push({ code: "chargedTenYears", message: "Somebody is still infected after ten years; measures that are never lifted are charged for ten years only." });
  if (phases.some(({ thresholdRatio }) => Math.abs(thresholdRatio - 1) < 0.02)) warnings.push({ code: "nearThreshold", message: "The threshold ratio is within 0.02 of 1: small changes decide whether the outbreak grows." });
  for (const { measure } of plan.items) if (measure.maxDays !== null && plan.items.some((item) => item.measure.id === measure.id && (item.endDay === null || item.endDay - item.startDay > measure.maxDays!))) {
    const warning = { code: "overMaxDays", message: `${measure.name} is in force for longer than its longest lawful duration of ${measure.maxDays} days.`, path: `measures.${measure.id}` };
    if (!warnings.some(({ path }) => path === warning.path)) warnings.push(warning);
  }
  return warnings;
}
