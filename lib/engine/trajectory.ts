/**
 * The trajectory that is drawn and frozen: extrapolation method with dense output (odex), restarted at every switch,
 * since its step control assumes a smooth right side. Independent of `taylor-kernel.ts`, which it checks.
 * @see Hairer, Nørsett & Wanner (1993), Solving Ordinary Differential Equations I, II.9
 */
import { Outcome, Solver } from "./odex-solver.mjs";
import { EngineError } from "./errors";
import { findRoot } from "./numeric";
import { removalsToCome, removedBetween } from "./settled-state";
import type { Parameters } from "./taylor-kernel";
import type { CoursePoint } from "./types";

export type Trajectory = {
  course: CoursePoint[];
  peak: { day: number; infectious: number };
  /** State at the start of each piece, persons. */
  states: { susceptible: number; latent: number; infectious: number }[];
  /** Removals from day 0 to t → ∞, persons. */
  removals: number;
  /** Susceptible at t → ∞, persons. */
  susceptibleLeft: number;
};

const RELATIVE_TOLERANCE = 1e-11;
const PEAK_SEARCH_DAYS = 200_000;
const S = 0;
const E = 1;
const I = 2;

/**
 * @param starts ascending days, starts[0] = 0; piece k holds from starts[k] with factor factors[k] on β
 * @param horizonDays whole days 0…horizon are put in `course`
 * @throws EngineError "notConverged" where a step of the solver fails
 */
export function trajectory(p: Parameters, starts: readonly number[], factors: readonly number[], horizonDays: number): Trajectory {
  const course: CoursePoint[] = [];
  const states: Trajectory["states"] = [];
  const peak = { day: 0, infectious: p.infectious };
  const n = p.population;
  let y = [p.susceptible, p.exposed, p.infectious];
  let nextDay = 0;

  const record = (day: number, at: (component: number) => number) => {
    const [s, e, i] = [at(S), at(E), at(I)];
    course.push({
      day,
      susceptible: s,
      latent: e,
      infectious: i,
      deathsPerDay: p.infectionFatality * p.removalRate * i,
      cumulativeDeaths: p.infectionFatality * Math.max(0, removedBetween(p, { susceptible: s, latent: e, infectious: i })),
    });
  };
  const raise = (day: number, infectious: number) => {
    if (infectious > peak.infectious) Object.assign(peak, { day, infectious });
  };

  /** Integrates from `from` to `to`; `stop` may end it early after a step. */
  const integrate = (from: number, to: number, beta: number, stop: (state: readonly number[]) => boolean): number => {
    const inflow = (s: number, e: number, i: number) => (p.onsetRate === null ? (beta * s * i) / n : p.onsetRate * e);
    const slope = (s: number, e: number, i: number) => inflow(s, e, i) - p.removalRate * i;
    const solver = new Solver(3);
    solver.relativeTolerance = RELATIVE_TOLERANCE;
    solver.absoluteTolerance = [n * 1e-13, 1e-11, 1e-11];
    solver.denseOutput = true;
    solver.maxSteps = 100_000;
    solver.initialStepSize = Math.min(0.1, (to - from) / 4);
    let reached = to;
    const { y: end, outcome } = solver.solve(
      (_x, [s, e, i]) => {
        const infections = (beta * s! * i!) / n;
        const onsets = p.onsetRate === null ? infections : p.onsetRate * e!;
        return [-infections, p.onsetRate === null ? 0 : infections - onsets, onsets - p.removalRate * i!];
      },
      from,
      y,
      to,
      (_step, xOld, x, state, dense) => {
        if (x === xOld) return undefined;
        // Dense output is read inside this callback only: the solver reuses its arrays afterwards.
        const at = (day: number) => (component: number) => (day >= x ? state[component]! : dense(component, day));
        for (; nextDay <= horizonDays && nextDay <= x; nextDay++) record(nextDay, at(nextDay));
        const rate = (day: number) => slope(at(day)(S), at(day)(E), at(day)(I));
        if (rate(xOld) > 0 && rate(x) < 0) {
          const top = findRoot(rate, xOld, x, 1e-10);
          raise(top, at(top)(I));
        }
        raise(x, state[I]!);
        if (stop(state)) {
          reached = x;
          y = state.slice(0, 3);
          return false;
        }
        return undefined;
      },
    );
    if (outcome === Outcome.MaxStepsExceeded || end.some((value) => !Number.isFinite(value))) throw new EngineError("notConverged");
    if (outcome === Outcome.Converged) y = end.slice(0, 3);
    return reached;
  };

  const last = starts.length - 1;
  record(nextDay++, (component) => y[component]!);
  for (let k = 0; k < last; k++) {
    states.push({ susceptible: y[S]!, latent: y[E]!, infectious: y[I]! });
    integrate(starts[k]!, starts[k + 1]!, p.transmissionRate * factors[k]!, () => false);
  }
  const beta = p.transmissionRate * factors[last]!;
  const final = { susceptible: y[S]!, latent: y[E]!, infectious: y[I]! };
  states.push(final);
  const solved = removalsToCome(final, n, beta, p.removalRate);
  if (solved.outcome !== "converged") throw new EngineError("notConverged");

  // S∞ = S e^(−u*), with u* = removals to come × β/(γN): no difference of large numbers.
  const susceptibleLeft = final.susceptible * Math.exp((-solved.value * beta) / (p.removalRate * n));
  // Past the last switch only for the drawing and the peak: where it settles is already known.
  const falling = ([s, e, i]: readonly number[]) =>
    beta * s! <= p.removalRate * n && (p.onsetRate === null ? (beta * s! * i!) / n : p.onsetRate * e!) <= p.removalRate * i!;
  let day = starts[last]!;
  if (day < horizonDays) day = integrate(day, horizonDays, beta, () => false);
  if (!falling(y)) integrate(day, PEAK_SEARCH_DAYS, beta, (state) => falling(state) || state[E]! + state[I]! < 1e-9);
  return { course, peak, states, removals: removedBetween(p, final) + solved.value, susceptibleLeft };
}
