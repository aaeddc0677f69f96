/**
 * The fast integrator for draws: Taylor series of order 14 (the system is quadratic, so that each coefficient is one
 * convolution), in shares of the population, restarted at every switch. `trajectory.ts` checks it.
 * @see Jorba & Zou (2005), Experimental Mathematics 14:99, for the choice of step
 */
import { findRoot } from "./numeric";
import { removalsToCome, removedBetween } from "./settled-state";
import { stepWithLatent, stepWithoutLatent, TAYLOR_ORDER } from "./taylor-step.generated";

/** One draw (or the central run) of what drives the outbreak. Persons, per day, share. */
export type Parameters = {
  population: number;
  susceptible: number;
  exposed: number;
  infectious: number;
  removed: number;
  transmissionRate: number;
  removalRate: number;
  onsetRate: number | null;
  infectionFatality: number;
};

/** What one run through a schedule leaves behind; the arrays are reused from run to run. */
export type Run = {
  /** Per piece k: state at its start. Persons. */
  susceptibleAt: Float64Array;
  latentAt: Float64Array;
  infectiousAt: Float64Array;
  /** Removals from day 0 to t → ∞, persons, with the last piece for ever. */
  removals: number;
  peakDay: number;
  peakInfectious: number;
  /** First day from the last switch on with E + I < 1, or the limit; NaN unless asked for. */
  dayBelowOne: number;
  converged: boolean;
  residual: number;
};

export const newRun = (pieces: number): Run => ({
  susceptibleAt: new Float64Array(pieces),
  latentAt: new Float64Array(pieces),
  infectiousAt: new Float64Array(pieces),
  removals: 0,
  peakDay: 0,
  peakInfectious: 0,
  dayBelowOne: Number.NaN,
  converged: true,
  residual: 0,
});

export const TEN_YEARS_DAYS = 3650;
/** Size of the last terms left out, relative to S and to E + I: about 1e-12 of the settled value, at half the steps of 1e-15. */
const TOLERANCE = 1e-10;
const STEP_MAX_DAYS = 60;
/** An outbreak that hasn't peaked by then won't within any use of this. */
const PEAK_SEARCH_DAYS = 200_000;

const y = new Float64Array(3);
const coefficients = new Float64Array(TAYLOR_ORDER + 1);

/** I' about the last step's start, per day. */
function slopeAt(h: number): number {
  let sum = 0;
  for (let k = TAYLOR_ORDER; k >= 1; k--) sum = k * coefficients[k]! + h * sum;
  return sum;
}
function infectiousAt(h: number): number {
  let sum = 0;
  for (let k = TAYLOR_ORDER; k >= 0; k--) sum = coefficients[k]! + h * sum;
  return sum;
}

/**
 * Runs a schedule: piece k holds from starts[k] with factor factors[k] on β; the last piece never ends.
 * @param starts ascending days, starts[0] = 0
 * @param wants whether to look for the peak past the last switch, and for the day with E + I < 1
 */
export function followSchedule(p: Parameters, starts: ArrayLike<number>, factors: ArrayLike<number>, wants: { peak: boolean; belowOne: boolean }, run: Run): Run {
  const n = p.population;
  const gamma = p.removalRate;
  const sigma = p.onsetRate ?? 0;
  const step = p.onsetRate === null ? stepWithoutLatent : stepWithLatent;
  const last = starts.length - 1;
  y[0] = p.susceptible / n;
  y[1] = p.exposed / n;
  y[2] = p.infectious / n;
  let day = 0;
  run.peakDay = 0;
  run.peakInfectious = p.infectious;
  run.dayBelowOne = Number.NaN;

  const advance = (beta: number, hMax: number): number => {
    const h = step(y, coefficients, beta, sigma, gamma, hMax, TOLERANCE);
    if (wants.peak) {
      if (y[2]! * n > run.peakInfectious) {
        run.peakInfectious = y[2]! * n;
        run.peakDay = day + h;
      }
      if (coefficients[1]! > 0 && slopeAt(h) < 0) {
        const top = findRoot(slopeAt, 0, h, 1e-12);
        const height = infectiousAt(top) * n;
        if (height > run.peakInfectious) {
          run.peakInfectious = height;
          run.peakDay = day + top;
        }
      }
    }
    day += h;
    return h;
  };

  for (let k = 0; k <= last; k++) {
    run.susceptibleAt[k] = y[0]! * n;
    run.latentAt[k] = y[1]! * n;
    run.infectiousAt[k] = y[2]! * n;
    if (k === last) break;
    const beta = p.transmissionRate * factors[k]!;
    const end = starts[k + 1]!;
    // The last step is taken to the switch itself, so that no rounding of the day is left.
    for (let left = end - day; left > 0; left = end - day) {
      const h = advance(beta, Math.min(left, STEP_MAX_DAYS));
      if (h === left) break;
    }
    day = end;
  }

  const s = run.susceptibleAt[last]!;
  const latent = run.latentAt[last]!;
  const infectious = run.infectiousAt[last]!;
  const beta = p.transmissionRate * factors[last]!;
  const state = { susceptible: s, latent, infectious };
  const solved = removalsToCome(state, n, beta, gamma);
  run.removals = removedBetween(p, state) + solved.value;
  run.converged = solved.outcome === "converged";
  run.residual = solved.residual;

  // Once the effective ratio is above 1 and I falls, it falls for good: E/I moves monotonically to its final ratio.
  const rising = () => beta * y[0]! > gamma || (p.onsetRate === null ? beta * y[0]! * y[2]! : sigma * y[1]!) > gamma * y[2]!;
  if (wants.peak) while (rising() && day < PEAK_SEARCH_DAYS && (y[1]! + y[2]!) * n > 1e-9) advance(beta, STEP_MAX_DAYS);
  if (wants.belowOne) run.dayBelowOne = dayBelowOne(p, starts[last]!, run, beta, step, sigma);
  return run;
}

type Step = typeof stepWithLatent;

function dayBelowOne(p: Parameters, from: number, run: Run, beta: number, step: Step, sigma: number): number {
  const last = run.susceptibleAt.length - 1;
  const n = p.population;
  y[0] = run.susceptibleAt[last]! / n;
  y[1] = run.latentAt[last]! / n;
  y[2] = run.infectiousAt[last]! / n;
  let day = from;
  const limit = Math.max(from, TEN_YEARS_DAYS);
  while ((y[1]! + y[2]!) * n >= 1) {
    if (day >= limit) return limit;
    const before = [y[0]!, y[1]!, y[2]!] as const;
    const h = step(y, coefficients, beta, sigma, p.removalRate, Math.min(STEP_MAX_DAYS, limit - day), TOLERANCE);
    if ((y[1]! + y[2]!) * n < 1) {
      const infectedAfter = (part: number) => {
        y.set(before);
        if (part > 0) step(y, coefficients, beta, sigma, p.removalRate, part, TOLERANCE);
        return (y[1]! + y[2]!) * n - 1;
      };
      return day + findRoot(infectedAfter, 0, h, 1e-9);
    }
    day += h;
  }
  return day;
}
