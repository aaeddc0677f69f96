/**
 * Fixed points of  du/dτ = a − b u − e^(−u),  the outbreak without a latent stage counted from one moment
 * (README.md, equation 2). Kermack & McKendrick (1927), Proc. R. Soc. A 115:700.
 */
export type Solved = {
  value: number;
  iterations: number;
  /** |a − b u − e^(−u)| over the sum of its terms' sizes: dimensionless. */
  residual: number;
  outcome: "converged" | "iterationLimit";
};

export type SettledInput = {
  /** c = a − 1 = (E + I)/S at the moment, ≥ 0. Given as it is: a itself has lost its digits near 1. */
  excess: number;
  /** b = γN/(βS), > 0. */
  thresholdRatio: number;
  /** d = 1 − b, where it is known more exactly than by subtracting. */
  margin?: number;
};

const SERIES_BELOW = 0.6;
const ITERATIONS_MAX = 50;
/** Halley's error shrinks with the cube of the step: after a step this small it is below rounding. */
const STEP_LAST = 1e-6;

/** g(u) = u − 1 + e^(−u) = u²/2 − u³/6 + …, without cancellation; the 16 terms are exact to a double for |u| < 0.6. */
function gap(u: number): number {
  const high = 1 / 3628800 - u * (1 / 39916800 - u * (1 / 479001600 - u * (1 / 6227020800 - u * (1 / 87178291200 - u * (1 / 1307674368000 - u * (1 / 20922789888000 - u / 355687428096000))))));
  return u * u * (1 / 2 - u * (1 / 6 - u * (1 / 24 - u * (1 / 120 - u * (1 / 720 - u * (1 / 5040 - u * (1 / 40320 - u * (1 / 362880 - u * high))))))));
}

/** a − b u − e^(−u), to the last digits on both sides of the threshold. */
export function settledResidual({ excess, thresholdRatio, margin }: Required<SettledInput>, u: number): number {
  return Math.abs(u) < SERIES_BELOW ? excess + margin * u - gap(u) : 1 + excess - thresholdRatio * u - Math.exp(-u);
}

/**
 * The stable fixed point u* ≥ 0 alone: `settledState` without the account of how it was found.
 * @returns dimensionless; NaN where the iteration did not end
 */
export function settledValue(c: number, b: number, d: number): number {
  return c === 0 && d <= 0 ? 0 : iterate(c, b, d, upperBound(c, b, d));
}

/**
 * The stable fixed point u* ≥ 0: where the outbreak settles. Exactly 0 where excess = 0 and b ≥ 1.
 * The residual is concave and the start lies above the root, so the steps (Halley's) fall monotonically.
 * @returns dimensionless; relative error ≤ 1e-13 for b in [1e-3, 1e3], excess in [0, 10]
 */
export function settledState({ excess: c, thresholdRatio: b, margin: d = 1 - b }: SettledInput): Solved {
  return solved(c, b, d, settledValue(c, b, d));
}

/**
 * The other fixed point, where the outbreak is unstable or could not have started: below 0 where excess > 0; at
 * excess = 0 it is 0 for b < 1 and negative for b > 1 (the two change places at b = 1, a transcritical bifurcation).
 */
export function otherFixedPoint({ excess: c, thresholdRatio: b, margin: d = 1 - b }: SettledInput): Solved {
  return solved(c, b, d, c === 0 && d >= 0 ? 0 : iterate(c, b, d, lowerBound(c, b, d)));
}

/** The smaller of two bounds: nobody left susceptible, and 1 − e^(−u) ≤ u/(1 + u/2), whose root is that of a quadratic. */
function upperBound(c: number, b: number, d: number): number {
  const slope = c / 2 + d;
  // Written so that neither sign of the slope cancels and no square of a large b overflows.
  const wide = Math.abs(slope) * Math.sqrt(1 + (2 * b * (c / slope)) / slope);
  const pade = slope > 0 ? (slope + wide) / b : slope < 0 ? (2 * c) / (wide - slope) : Math.sqrt((2 * c) / b);
  return Math.min((1 + c) / b, pade);
}

/** The larger of two bounds: g(u) ≥ u²/2 below 0, and e^v ≥ a + b v at v = 2 ln(2 + a + b). */
function lowerBound(c: number, b: number, d: number): number {
  const wide = Math.sqrt(d * d + 2 * c);
  const parabola = d > 0 ? (-2 * c) / (d + wide) : d - wide;
  return Math.max(parabola, -2 * Math.log(3 + c + b));
}

let iterationsTaken = 0;

function iterate(c: number, b: number, d: number, start: number): number {
  let u = start;
  for (let k = 1; k <= ITERATIONS_MAX; k++) {
    let residual: number;
    let slope: number;
    let survivors: number;
    if (Math.abs(u) < SERIES_BELOW) {
      const g = gap(u);
      residual = c + d * u - g;
      slope = d + (g - u);
      survivors = 1 + (g - u);
    } else {
      survivors = Math.exp(-u);
      residual = 1 + c - b * u - survivors;
      slope = survivors - b;
    }
    const step = residual / (slope + (residual * survivors) / (2 * slope));
    u -= step;
    if (Math.abs(step) <= STEP_LAST * Math.abs(u)) {
      iterationsTaken = k;
      return u;
    }
  }
  return Number.NaN;
}

function solved(c: number, b: number, d: number, value: number): Solved {
  if (value === 0) return { value: 0, iterations: 0, residual: 0, outcome: "converged" };
  if (Number.isNaN(value)) return { value, iterations: ITERATIONS_MAX, residual: Number.POSITIVE_INFINITY, outcome: "iterationLimit" };
  const terms = Math.abs(value) < SERIES_BELOW ? c + Math.abs(d * value) + gap(value) : 1 + c + Math.abs(b * value) + Math.exp(-value);
  const residual = Math.abs(settledResidual({ excess: c, thresholdRatio: b, margin: d }, value)) / terms;
  return { value, iterations: iterationsTaken, residual, outcome: "converged" };
}

/** Slope of the right side at a fixed point, e^(−u) − b: negative means stable. */
export const stabilitySlope = (thresholdRatio: number, u: number): number => Math.exp(-u) - thresholdRatio;

/** Persons; with fewer than this left susceptible, ratios that divide by them say nothing any more. */
export const SUSCEPTIBLE_LEAST = 1e-9;

/** Persons; fewer infected than this at a switch are nobody, so that no outbreak comes back from rounding. */
export const INFECTED_LEAST = 1e-30;

/** A state of the outbreak at one moment, persons; `removed` counts from day 0. */
export type State = { susceptible: number; latent: number; infectious: number; removed: number };

/**
 * Where a state settles under a constant β: removals still to come, in persons, from this moment to t → ∞.
 * A latent stage changes when, not where.
 */
export function removalsToCome(state: State, population: number, transmissionRate: number, removalRate: number): Solved {
  const s = state.susceptible;
  const infected = state.latent + state.infectious;
  if (infected < INFECTED_LEAST) return { value: 0, iterations: 0, residual: 0, outcome: "converged" };
  // Nobody is left to be infected: whoever is infected now is all that is to come.
  if (s < SUSCEPTIBLE_LEAST) return { value: infected, iterations: 0, residual: 0, outcome: "converged" };
  const b = (removalRate * population) / (transmissionRate * s);
  const solved = settledState({ excess: infected / s, thresholdRatio: b });
  return { ...solved, value: b * s * solved.value };
}

/** Susceptible left after so many removals under a constant β: S e^(−u), without a difference of large numbers. Persons. */
export const susceptibleAfter = (from: State, removals: number, population: number, transmissionRate: number, removalRate: number): number =>
  from.susceptible * Math.exp((-removals * transmissionRate) / (removalRate * population));
