/**
 * The trajectory that is drawn and frozen: extrapolation method with dense output (odex), restarted at every switch,
 * since its step control assumes a smooth right side. Independent of `taylor-kernel.ts`, which it checks: it follows
 * logarithms, which cannot turn negative and keep their digits where few are infected,
 *
 *     x = ln(S/S₀),  w = ln(E + I),  θ = I/(E + I),  z = Z − Z₀:
 *     x' = −βθe^w/N,  w' = θ(βS/N − γ),  θ' = σ(1 − θ) − γθ − θw',  z' = γθe^w
 *
 * @see Hairer, Nørsett & Wanner (1993), Solving Ordinary Differential Equations I, II.9
 */
import { EngineError, tooManySteps } from "./errors";
import type { Parameters } from "./model";
import { findRoot } from "./numeric";
import { Outcome, Solver } from "./odex-solver.mjs";
import { INFECTED_LEAST, removalsToCome, type State, susceptibleAfter } from "./settled-state";
import type { CoursePoint } from "./types";

export type Trajectory = {
  course: CoursePoint[];
  peak: { day: number; infectious: number };
  /** False where growth is so slow that the peak lies beyond the search. */
  peakFound: boolean;
  /** State at the start of each piece. */
  states: State[];
  /** Removals from day 0 to t → ∞, persons. */
  removals: number;
  /** Susceptible at t → ∞, persons. */
  susceptibleLeft: number;
};

const TOLERANCE = 1e-12;
/** Past the last switch, in search of the peak: more than a century. */
const SEARCH_DAYS = 40_000;
const STEPS_MAX = 100_000;
const X = 0;
const W = 1;
const THETA = 2;
const REMOVED = 3;

/**
 * @param starts ascending days, starts[0] = 0; piece k holds from starts[k] with factor factors[k] on β
 * @param horizonDays whole days 0…horizon are put in `course`
 * @throws EngineError "notConverged" where the solver fails; "outsideDomain" where it takes too many steps
 */
export function trajectory(p: Parameters, starts: readonly number[], factors: readonly number[], horizonDays: number): Trajectory {
  const { population: n, removalRate: gamma, onsetRate: sigma, infectionFatality: phi } = p;
  const infectedAtStart = p.exposed + p.infectious;
  const course: CoursePoint[] = [];
  const states: State[] = [];
  const peak = { day: 0, infectious: p.infectious };
  let y = [0, Math.log(infectedAtStart), sigma === null ? 1 : p.infectious / infectedAtStart, 0];
  let beta = 0;
  let nextDay = 0;

  const stateFrom = (component: (index: number) => number): State => {
    const infected = Math.exp(component(W));
    const theta = component(THETA);
    return { susceptible: p.susceptible * Math.exp(component(X)), latent: (1 - theta) * infected, infectious: theta * infected, removed: component(REMOVED) };
  };
  const record = (day: number, { susceptible, latent, infectious, removed }: State) =>
    course.push({ day, susceptible, latent, infectious, deathsPerDay: phi * gamma * infectious, cumulativeDeaths: phi * removed });
  /** Sign of I'. */
  const slope = (x: number, theta: number) => (sigma === null ? beta * p.susceptible * Math.exp(x) - gamma * n : sigma * (1 - theta) - gamma * theta);
  const grows = () => beta * p.susceptible * Math.exp(y[X]!) > gamma * n;

  /** Integrates from `from` to `to`; `stop` may end it early after a step. */
  const integrate = (from: number, to: number, stop: () => boolean): number => {
    const solver = new Solver(4);
    solver.relativeTolerance = TOLERANCE;
    // x and z start at 0 and stay as small as the share infected: so must their errors, for few deaths to keep their digits.
    solver.absoluteTolerance = [(TOLERANCE * infectedAtStart) / n, TOLERANCE, TOLERANCE, TOLERANCE * infectedAtStart];
    solver.denseOutput = true;
    solver.maxSteps = STEPS_MAX;
    solver.initialStepSize = Math.min(0.1, (to - from) / 4);
    let reached = to;
    const { y: end, outcome } = solver.solve(
      (_day, [x, w, theta]) => {
        const infectious = theta! * Math.exp(w!);
        const growth = theta! * ((beta * p.susceptible * Math.exp(x!)) / n - gamma);
        return [(-beta * infectious) / n, growth, sigma === null ? 0 : sigma * (1 - theta!) - gamma * theta! - theta! * growth, gamma * infectious];
      },
      from,
      y,
      to,
      (_step, dayBefore, day, state, dense) => {
        if (day === dayBefore) return undefined;
        // Dense output is read inside this callback only: the solver reuses its arrays afterwards.
        const at = (t: number) => (index: number) => (t >= day ? state[index]! : dense(index, t));
        for (; nextDay <= horizonDays && nextDay <= day; nextDay++) record(nextDay, stateFrom(at(nextDay)));
        const slopeAt = (t: number) => slope(at(t)(X), at(t)(THETA));
        const top = slopeAt(dayBefore) > 0 && slopeAt(day) < 0 ? findRoot(slopeAt, dayBefore, day, 1e-10) : day;
        const { infectious } = stateFrom(at(top));
        if (infectious > peak.infectious) Object.assign(peak, { day: top, infectious });
        y = state.slice(0, 4);
        if (!stop()) return undefined;
        reached = day;
        return false;
      },
    );
    if (outcome === Outcome.MaxStepsExceeded) throw tooManySteps();
    if (end.some((value) => !Number.isFinite(value))) throw new EngineError("notConverged");
    return reached;
  };

  const last = starts.length - 1;
  for (const [k, start] of starts.entries()) {
    beta = p.transmissionRate * factors[k]!;
    const state = stateFrom((index) => y[index]!);
    const over = state.latent + state.infectious < INFECTED_LEAST;
    states.push(over ? { ...state, latent: 0, infectious: 0 } : state);
    if (k === 0) record(nextDay++, state);
    if (over) y[W] = Number.NEGATIVE_INFINITY;
    else if (k < last) integrate(start, starts[k + 1]!, () => false);
  }
  const final = states[last]!;
  const solved = removalsToCome(final, n, beta, gamma);
  if (solved.outcome !== "converged") throw new EngineError("notConverged");
  const susceptibleLeft = susceptibleAfter(final, solved.value, n, beta, gamma);

  // Past the last switch only for the drawing and the peak: where it settles is already known.
  const falls = () => y[W] === Number.NEGATIVE_INFINITY || (!grows() && slope(y[X]!, y[THETA]!) <= 0);
  let day = starts[last]!;
  if (y[W] === Number.NEGATIVE_INFINITY) for (; nextDay <= horizonDays; nextDay++) record(nextDay, final);
  else if (day < horizonDays) day = integrate(day, horizonDays, () => false);
  if (!falls()) integrate(day, day + SEARCH_DAYS, falls);
  return { course, peak, peakFound: falls(), states, removals: final.removed + solved.value, susceptibleLeft };
}
