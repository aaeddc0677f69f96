/** One draw of the outbreak and of a package, written into a row of the sample. */
import { factorFromDayZero, type Plan, pieceFactors } from "./measure-effects";
import { type Parameters, removalsFromDayZero, removalsHeld, thresholdRatioOf } from "./model";
import { packageCost, type Tariff } from "./prices";
import { followSchedule, newRun, type Run } from "./taylor-kernel";
import { chanceChainsEnd } from "./transmission";

type Columns<K extends string> = Record<K, Float64Array>;
const columns = <K extends string>(names: readonly K[], rows: number) =>
  Object.fromEntries(names.map((name) => [name, new Float64Array(rows)])) as Columns<K>;

const OUTBREAK_FIGURES = ["thresholdRatio", "reproductionNumber", "finalDeaths", "finalInfected", "peakDay", "peakInfectious", "worstDayDeaths"] as const;
const PACKAGE_FIGURES = [
  "thresholdRatio",
  "thresholdShift",
  "asScheduled",
  "heldToEnd",
  "heldFromDayZero",
  "avertedAsScheduled",
  "avertedHeldToEnd",
  "finalInfected",
  "peakDay",
  "peakInfectious",
  "worstDayDeaths",
  "susceptibleShareAtLift",
  "chargedUntilDay",
  "total",
  "public",
  "business",
  "household",
] as const;
const PHASE_FIGURES = ["ratioAtStart", "ratioAtEnd", "infectedAtEnd", "chanceEnds"] as const;

export type OutbreakSample = { rows: number; figures: Columns<(typeof OUTBREAK_FIGURES)[number]>; run: Run };
export type PackageSample = {
  rows: number;
  figures: Columns<(typeof PACKAGE_FIGURES)[number]>;
  phases: Columns<(typeof PHASE_FIGURES)[number]>[];
  run: Run;
  factors: Float64Array;
};

export const newOutbreakSample = (rows: number): OutbreakSample => ({ rows, figures: columns(OUTBREAK_FIGURES, rows), run: newRun(1) });

export const newPackageSample = ({ pieces }: Plan, rows: number): PackageSample => ({
  rows,
  figures: columns(PACKAGE_FIGURES, rows),
  phases: pieces.map(() => columns(PHASE_FIGURES, rows)),
  run: newRun(pieces.length),
  factors: new Float64Array(pieces.length),
});

/** Numbers held per draw for a package with this many phases. */
export const figuresPerDraw = (phases: number): number => PACKAGE_FIGURES.length + phases * PHASE_FIGURES.length;

/** Beyond this nothing is left that could be told apart from no transmission, and quotients overflow. */
const FACTOR_LEAST = 1e-100;
export const usableFactors = (plan: Plan, draw: number): boolean => factorFromDayZero(plan, draw) >= FACTOR_LEAST && pieceFactors(plan, draw, new Float64Array(plan.pieces.length)).every((factor) => factor >= FACTOR_LEAST);

export function drawOutbreak(p: Parameters, { figures, run }: OutbreakSample, row: number): void {
  followSchedule(p, [0], [1], { peak: true, belowOne: false }, run);
  const b = thresholdRatioOf(p);
  figures.thresholdRatio[row] = b;
  figures.reproductionNumber[row] = 1 / b;
  figures.finalDeaths[row] = p.infectionFatality * run.removals;
  figures.finalInfected[row] = run.removals;
  figures.peakDay[row] = run.peakDay;
  figures.peakInfectious[row] = run.peakInfectious;
  figures.worstDayDeaths[row] = p.infectionFatality * p.removalRate * run.peakInfectious;
}

/** @param outbreak the same draw without further measures, in the same row */
export function drawPackage(p: Parameters, plan: Plan, tariff: Tariff, draw: number, sample: PackageSample, outbreak: OutbreakSample, row: number): void {
  const { figures, run, factors } = sample;
  pieceFactors(plan, draw, factors);
  followSchedule(p, plan.starts, factors, { peak: true, belowOne: plan.neverLifted }, run);
  const strongest = factors[plan.strongest]!;
  const phi = p.infectionFatality;
  const deathsWithout = outbreak.figures.finalDeaths[row]!;
  const scheduled = phi * run.removals;
  const held = phi * removalsHeld(p, run.states[plan.strongest]!, strongest).value;
  const b = thresholdRatioOf(p, p.susceptible, strongest);
  figures.thresholdRatio[row] = b;
  figures.thresholdShift[row] = b - outbreak.figures.thresholdRatio[row]!;
  figures.asScheduled[row] = scheduled;
  figures.heldToEnd[row] = held;
  figures.heldFromDayZero[row] = phi * removalsFromDayZero(p, factorFromDayZero(plan, draw)).value;
  figures.avertedAsScheduled[row] = deathsWithout - scheduled;
  figures.avertedHeldToEnd[row] = deathsWithout - held;
  figures.finalInfected[row] = run.removals;
  figures.peakDay[row] = run.peakDay;
  figures.peakInfectious[row] = run.peakInfectious;
  figures.worstDayDeaths[row] = phi * p.removalRate * run.peakInfectious;
  figures.susceptibleShareAtLift[row] = run.states.at(-1)!.susceptible / p.susceptible;
  figures.chargedUntilDay[row] = plan.neverLifted ? run.dayBelowOne : 0;
  const cost = packageCost(plan, tariff, p.population, figures.chargedUntilDay[row]!, draw);
  figures.total[row] = cost.total;
  figures.public[row] = cost.byPayer.public;
  figures.business[row] = cost.byPayer.business;
  figures.household[row] = cost.byPayer.household;
  for (const [k, phase] of sample.phases.entries()) {
    const factor = factors[k]!;
    const next = run.states[k + 1];
    phase.ratioAtStart[row] = thresholdRatioOf(p, run.states[k]!.susceptible, factor);
    phase.ratioAtEnd[row] = thresholdRatioOf(p, next?.susceptible ?? run.susceptibleLeft, factor);
    const infected = next ? next.latent + next.infectious : 0;
    phase.infectedAtEnd[row] = infected;
    phase.chanceEnds[row] = next ? chanceChainsEnd(thresholdRatioOf(p, next.susceptible, factors[k + 1]!), infected) : 1;
  }
}
