/**
 * Fixed points of  du/dτ = a − b u − e^(−u),  the outbreak without a latent stage counted from one moment
 * (README.md, equation 2). Kermack & McKendrick (1927), Proc. R. Soc. A 115:700.
 */
export type Solved = { value: number; iterations: number; residual: number; outcome: "converged" | "iterationLimit" };

export type SettledInput = {
  /** a − 1 = (E + I)/S at the moment, ≥ 0. Given as it is: a itself has lost its digits near 1. */
  excess: number;
  /** b = γN/(βS), > 0. */
  thresholdRatio: number;
  /** 1 − b, where it is known more exactly than by subtracting. */
  margin?: number;
};

const SERIES_BELOW = 0.6;
const ITERATIONS_MAX = 80;

/** g(u) = u − 1 + e^(−u) = u²/2 − u³/6 + …, without cancellation for |u| < 0.6. */
function gap(u: number): number {
  let sum = 0;
  for (let k = 17; k >= 2; k--) sum = 1 / FACTORIAL[k]! - u * sum;
  return u * u * sum;
}
const FACTORIAL = Array.from({ length: 19 }, (_, n) => Array.from({ length: n }, (_, i) => i + 1).reduce((p, k) => p * k, 1));

/** a − b u − e^(−u), to the last digits on both sides of the threshold. */
export function settledResidual({ excess, thresholdRatio, margin }: Required<SettledInput>, u: number): number {
  return Math.abs(u) < SERIES_BELOW ? excess + margin * u - gap(u) : 1 + excess - thresholdRatio * u - Math.exp(-u);
}

/**
 * The stable fixed point u* ≥ 0: where the outbreak settles. Exactly 0 where excess = 0 and b ≥ 1.
 * The residual is concave and the start lies above the root, so the steps (Halley's) fall monotonically.
 * @returns dimensionless; relative error ≤ 1e-13 for b in [1e-3, 1e3], excess in [0, 10]
 */
export function settledState(input: SettledInput): Solved {
  const { excess: c, thresholdRatio: b } = input;
  const d = input.margin ?? 1 - b;
  if (c === 0 && d <= 0) return { value: 0, iterations: 0, residual: 0, outcome: "converged" };
  const equation = { excess: c, thresholdRatio: b, margin: d };
  const slope = c / 2 + d;
  const wide = Math.sqrt(slope * slope + 2 * b * c);
  // Two upper bounds: no susceptible left; and 1 − e^(−u) ≤ u/(1 + u/2), whose root is that of a quadratic.
  const pade = slope > 0 ? (slope + wide) / b : (2 * c) / (wide - slope);
  return iterate(equation, Math.min((1 + c) / b, pade));
}

/**
 * The other fixed point, where the outbreak is unstable or could not have started: below 0 where excess > 0; at
 * excess = 0 it is 0 for b < 1 and negative for b > 1 (the two change places at b = 1, a transcritical bifurcation).
 */
export function otherFixedPoint(input: SettledInput): Solved {
  const { excess: c, thresholdRatio: b } = input;
  const d = input.margin ?? 1 - b;
  if (c === 0 && d >= 0) return { value: 0, iterations: 0, residual: 0, outcome: "converged" };
  const wide = Math.sqrt(d * d + 2 * c);
  // g(u) ≥ u²/2 below 0 gives one bound, e^v ≥ a + b v at v = 2 ln(2 + a + b) the other; both lie left of the root.
  const parabola = d > 0 ? (-2 * c) / (d + wide) : d - wide;
  return iterate({ excess: c, thresholdRatio: b, margin: d }, Math.max(parabola, -2 * Math.log(3 + c + b)));
}

function iterate(equation: Required<SettledInput>, start: number): Solved {
  let u = start;
  let residual = settledResidual(equation, u);
  for (let iterations = 1; iterations <= ITERATIONS_MAX; iterations++) {
    const first = equation.margin + Math.expm1(-u);
    const second = -Math.exp(-u);
    const step = (2 * residual * first) / (2 * first * first - residual * second);
    const next = u - step;
    if (!Number.isFinite(next)) break;
    const nextResidual = settledResidual(equation, next);
    if (Math.abs(step) <= 2 * Number.EPSILON * Math.abs(next) || next === u) {
      return { value: next, iterations, residual: Math.abs(nextResidual), outcome: "converged" };
    }
    // Rounding is all that is left where the residual stops falling in size.
    if (Math.abs(step) <= 1e-13 * Math.abs(u) && Math.abs(nextResidual) >= Math.abs(residual)) {
      return { value: u, iterations, residual: Math.abs(residual), outcome: "converged" };
    }
    u = next;
    residual = nextResidual;
  }
  return { value: u, iterations: ITERATIONS_MAX, residual: Math.abs(residual), outcome: "iterationLimit" };
}

/** Slope of the right side at a fixed point, e^(−u) − b: negative means stable. */
export const stabilitySlope = (thresholdRatio: number, u: number): number => Math.exp(-u) - thresholdRatio;

/** Persons; with fewer than this left susceptible, ratios that divide by them say nothing any more. */
export const SUSCEPTIBLE_LEAST = 1e-9;

/** Persons: a state of the outbreak at one moment. */
export type State = { susceptible: number; latent: number; infectious: number; removed: number };

/** Removals between two states, persons: exactly 0 where nothing has happened yet. */
export const removedBetween = (from: { susceptible: number; exposed: number; infectious: number }, to: Omit<State, "removed">): number =>
  from.susceptible - to.susceptible + (from.exposed - to.latent) + (from.infectious - to.infectious);

/**
 * Where a state settles under a constant β: removals still to come, in persons, from this moment to t → ∞.
 * A latent stage changes when, not where.
 */
export function removalsToCome(state: Omit<State, "removed">, population: number, transmissionRate: number, removalRate: number): Solved {
  const { susceptible: s, latent, infectious } = state;
  const infected = latent + infectious;
  if (infected === 0) return { value: 0, iterations: 0, residual: 0, outcome: "converged" };
  // Nobody is left to be infected: whoever is infected now is all that is to come.
  if (s < SUSCEPTIBLE_LEAST) return { value: infected, iterations: 0, residual: 0, outcome: "converged" };
  const b = (removalRate * population) / (transmissionRate * s);
  const solved = settledState({ excess: infected / s, thresholdRatio: b });
  return { ...solved, value: b * s * solved.value };
}
