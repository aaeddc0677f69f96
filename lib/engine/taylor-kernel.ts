/**
 * The fast integrator for draws: Taylor series of order 14 (the system is quadratic, so that each coefficient is one
 * convolution), in shares of the population, restarted at every switch. `trajectory.ts` checks it.
 * @see Jorba & Zou (2005), Experimental Mathematics 14:99, for the choice of step
 */
import { tooManySteps } from "./errors";
import type { Parameters } from "./model";
import { findRoot } from "./numeric";
import { INFECTED_LEAST, removalsToCome, SUSCEPTIBLE_LEAST, type State, susceptibleAfter } from "./settled-state";
import { stepWithLatent, stepWithoutLatent, TAYLOR_ORDER } from "./taylor-step.generated";

/** What one run through a schedule leaves behind; reused from run to run. */
export type Run = {
  /** Per piece: state at its start, persons; `removed` counts from day 0. */
  states: State[];
  /** Removals from day 0 to t → ∞, persons, with the last piece for ever. */
  removals: number;
  /** Susceptible at t → ∞, persons. */
  susceptibleLeft: number;
  peakDay: number;
  peakInfectious: number;
  /** Day from which on E + I stays below 1, ten years at most; NaN unless asked for. */
  dayBelowOne: number;
  /** Steps taken: the cost of the run. */
  steps: number;
  converged: boolean;
  residual: number;
};

export const newRun = (pieces: number): Run => ({
  states: Array.from({ length: pieces }, () => ({ susceptible: 0, latent: 0, infectious: 0, removed: 0 })),
  removals: 0,
  susceptibleLeft: 0,
  peakDay: 0,
  peakInfectious: 0,
  dayBelowOne: Number.NaN,
  steps: 0,
  converged: true,
  residual: 0,
});

export const TEN_YEARS_DAYS = 3650;
/** Size of the last terms left out, relative to S and to E + I: about 1e-12 of the settled value, at half the steps of 1e-15. */
const TOLERANCE = 1e-10;
const STEP_DAYS_MAX = 60;
const SHARE_LEAST = 1e-250;
const STEPS_MAX = 100_000;
/** Past the last switch, in search of the peak: more than a century with periods of days. */
const SEARCH_STEPS_MAX = 5_000;

const S = 0;
const E = 1;
const I = 2;
const Z = 3;
const y = new Float64Array(4);
const stepStart = new Float64Array(4);
/** Taylor coefficients of the infectious share about the last step's start. */
const coefficients = new Float64Array(TAYLOR_ORDER + 1);

function infectiousAt(h: number): number {
  let sum = 0;
  for (let k = TAYLOR_ORDER; k >= 0; k--) sum = coefficients[k]! + h * sum;
  return sum;
}
function slopeAt(h: number): number {
  let sum = 0;
  for (let k = TAYLOR_ORDER; k >= 1; k--) sum = k * coefficients[k]! + h * sum;
  return sum;
}

/** What stays the same during a run. Closures over what changes would cost more than the arithmetic. */
type Flow = { step: typeof stepWithLatent; population: number; sigma: number; gamma: number; noLatentStage: boolean; wants: Wants };
type Wants = { peak: boolean; belowOne: boolean };

/**
 * Runs a schedule: piece k holds from starts[k] with factor factors[k] on β; the last piece never ends.
 * @param starts ascending days, starts[0] = 0
 * @param wants whether to look for the peak past the last switch, and for the day from which on E + I < 1
 * @throws EngineError "outsideDomain" where the periods are so short beside the course that it takes too many steps
 */
export function followSchedule(p: Parameters, starts: ArrayLike<number>, factors: ArrayLike<number>, wants: Wants, run: Run): Run {
  const n = p.population;
  const flow: Flow = {
    step: p.onsetRate === null ? stepWithoutLatent : stepWithLatent,
    population: n,
    sigma: p.onsetRate ?? 0,
    gamma: p.removalRate,
    noLatentStage: p.onsetRate === null,
    wants,
  };
  const last = starts.length - 1;
  y[S] = p.susceptible / n;
  y[E] = p.exposed / n;
  y[I] = p.infectious / n;
  y[Z] = 0;
  run.steps = 0;
  run.peakDay = 0;
  run.peakInfectious = p.infectious;
  run.dayBelowOne = wants.belowOne ? 0 : Number.NaN;

  let day = 0;
  for (let k = 0; k < last; k++) {
    noteState(run.states[k]!, n);
    const beta = p.transmissionRate * factors[k]!;
    const end = starts[k + 1]!;
    // The last step is taken to the switch itself, so that no rounding of the day is left.
    for (let left = end - day; left > 0; left = end - day) {
      const h = advance(flow, run, beta, day, Math.min(left, STEP_DAYS_MAX));
      if (h === left) break;
      day += h;
    }
    day = end;
  }

  const beta = p.transmissionRate * factors[last]!;
  const state = run.states[last]!;
  noteState(state, n);
  const solved = removalsToCome(state, n, beta, flow.gamma);
  run.removals = state.removed + solved.value;
  run.susceptibleLeft = susceptibleAfter(state, solved.value, n, beta, flow.gamma);
  run.converged = solved.outcome === "converged";
  run.residual = solved.residual;
  if (wants.belowOne) day = followUntilBelowOne(flow, run, beta, day);
  if (wants.peak) followUntilFalling(flow, run, beta, day);
  if (wants.belowOne) run.dayBelowOne = Math.min(run.dayBelowOne, TEN_YEARS_DAYS);
  return run;
}

function noteState(state: State, population: number): void {
  if ((y[E]! + y[I]!) * population < INFECTED_LEAST) y.fill(0, E, Z);
  state.susceptible = y[S]! * population;
  state.latent = y[E]! * population;
  state.infectious = y[I]! * population;
  state.removed = y[Z]! * population;
}

/** One step from `day`, with what is to be noted on the way. Returns its length. */
function advance(flow: Flow, run: Run, beta: number, day: number, daysMax: number): number {
  if (++run.steps > STEPS_MAX) throw tooManySteps();
  if (flow.wants.belowOne) stepStart.set(y);
  const h = flow.step(y, coefficients, beta, flow.sigma, flow.gamma, daysMax, TOLERANCE);
  // Before coefficients underflow, which would let a step grow without measure.
  if (y[S]! * flow.population < SUSCEPTIBLE_LEAST) y[S] = 0;
  if (y[E]! + y[I]! < SHARE_LEAST) y.fill(0, E, Z);
  if (flow.wants.peak) notePeak(run, flow.population, day, h);
  if (flow.wants.belowOne) noteBelowOne(flow, run, beta, day, h);
  return h;
}

function notePeak(run: Run, population: number, day: number, h: number): void {
  const inside = coefficients[1]! > 0 && slopeAt(h) < 0;
  const at = inside ? findRoot(slopeAt, 0, h, 1e-12) : h;
  const height = (inside ? infectiousAt(at) : y[I]!) * population;
  if (height > run.peakInfectious) {
    run.peakInfectious = height;
    run.peakDay = day + at;
  }
}

/** E + I rises while βS > γ and falls afterwards, so that it can leave a step below 1 only past its top in that step. */
function noteBelowOne(flow: Flow, run: Run, beta: number, day: number, h: number): void {
  const one = 1 / flow.population;
  if (y[E]! + y[I]! >= one) {
    run.dayBelowOne = Number.POSITIVE_INFINITY;
    return;
  }
  const within = (part: number): Float64Array => {
    y.set(stepStart);
    if (part > 0) flow.step(y, coefficients, beta, flow.sigma, flow.gamma, part, TOLERANCE);
    return y;
  };
  const infectedBeyondOne = (part: number) => within(part)[E]! + y[I]! - one;
  const wasAbove = stepStart[E]! + stepStart[I]! >= one;
  const turns = !wasAbove && beta * stepStart[S]! > flow.gamma && beta * y[S]! < flow.gamma;
  const top = turns ? findRoot((part) => beta * within(part)[S]! - flow.gamma, 0, h, 1e-9) : 0;
  if (wasAbove || (turns && infectedBeyondOne(top) >= 0)) run.dayBelowOne = day + findRoot(infectedBeyondOne, top, h, 1e-9);
  within(h);
}

const grows = (flow: Flow, beta: number) => beta * y[S]! > flow.gamma;
const infectiousRise = (flow: Flow, beta: number) => (flow.noLatentStage ? beta * y[S]! * y[I]! : flow.sigma * y[E]!) > flow.gamma * y[I]!;

/** Ten years at most, so that this ends; those still infected and an outbreak that grows are what is left to charge for. */
function followUntilBelowOne(flow: Flow, run: Run, beta: number, from: number): number {
  let day = from;
  while (day < TEN_YEARS_DAYS && (grows(flow, beta) || y[E]! + y[I]! >= 1 / flow.population)) day += advance(flow, run, beta, day, STEP_DAYS_MAX);
  return day;
}

/** Once the effective ratio is above 1 and I falls, it falls for good: I/E then moves one way to its final value. */
function followUntilFalling(flow: Flow, run: Run, beta: number, from: number): void {
  let day = from;
  const climbs = () => y[E]! + y[I]! > 0 && (grows(flow, beta) || infectiousRise(flow, beta));
  for (let left = SEARCH_STEPS_MAX; left > 0 && climbs(); left--) day += advance(flow, run, beta, day, STEP_DAYS_MAX);
}
