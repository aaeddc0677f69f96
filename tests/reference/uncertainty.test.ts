import { describe, expect, test } from "vitest";
import { assess } from "@/lib/engine";
import { normalQuantile } from "@/lib/engine/numeric";
import { sidesOf, spread } from "@/lib/engine/quantities";
import { latinHypercube } from "@/lib/engine/random";
import { expectAccounted, expectRelative, named, type Row, readCases } from "./cases";
import { anInput, withCuts } from "./input";

const rows = readCases("09-uncertainty");
const row = (id: string): Row => rows.find((each) => each.id === id)!;
const Z = 1.959963984540054;

const intervals = rows.filter(({ id, inputs }) => id.startsWith("lognormal-") && inputs["central(median)"] !== undefined);

describe("an interval on the log scale has a side below and a side above", () => {
  test.each(named(intervals))("%s", (_, { inputs, expected }) => {
    const value = { low: Number(inputs.low95), central: Number(inputs["central(median)"]), high: Number(inputs.high95) };
    const { lower, upper } = sidesOf(value, "log");
    expectRelative(lower, expected.sigma_lowerSide, 1e-10, "below");
    expectRelative(upper, expected.sigma_upperSide, 1e-10, "above");
    const [low, central, high] = spread(value, "log", new Float64Array([-Z, 0, Z]));
    for (const [found, given] of [[low, value.low], [central, value.central], [high, value.high]] as const) expectRelative(found!, given, 1e-14, "quantile");
  });
});

test("lognormal-product-1: independent factors multiply, through an assessment of 10,000 draws", () => {
  const { inputs, expected, tolerance } = row("lognormal-product-1");
  const factors = (inputs["factors_(median,sigma)_independent"] as [string, string][]).map(([median, sigma]) => ({ median: Number(median), sigma: Number(sigma) }));
  const { packages, measures } = withCuts(factors.map(({ median }) => 1 - median));
  const cuts = factors.map(({ median, sigma }) => ({ low: 1 - median * Math.exp(Z * sigma), central: 1 - median, high: 1 - median * Math.exp(-Z * sigma) }));
  const drawn = assess(anInput({}, { packages, measures: measures.map((measure, i) => ({ ...measure, cut: cuts[i]! })), uncertainty: { draws: 10_000, seed: 1 } }));
  const { median, low, high } = drawn.packages[0]!.uncertainty!.thresholdRatio;
  const b = drawn.withoutMeasures.thresholdRatio;
  // b' = b/m turns the ends about.
  expectRelative(b / median, expected.median, Number(tolerance.monteCarlo_10000), "median");
  expectRelative(b / high, expected.low95, Number(tolerance.monteCarlo_10000), "low end");
  expectRelative(b / low, expected.high95, Number(tolerance.monteCarlo_10000), "high end");
});

const isLatin = (points: ArrayLike<number>) => new Set(Array.from(points, (p) => Math.floor(p * points.length))).size === points.length;

describe("Latin hypercube", () => {
  test("the test's own idea of one is right (lhs-valid, lhs-invalid)", () => {
    for (const id of ["lhs-valid", "lhs-invalid"]) {
      const { inputs, expected } = row(id);
      const points = inputs.points as number[][];
      expect([0, 1].every((dimension) => isLatin(points.map((point) => point[dimension]!)))).toBe(expected.isLatinHypercube);
    }
  });
  test("lhs-check-2-1000: each stratum exactly once, whatever the seed, and the mean as near as that makes it", () => {
    const { inputs, expected } = row("lhs-check-2-1000");
    for (const seed of [0, 1, 2 ** 31, 2 ** 32, 2 ** 40 + 7, Number.MAX_SAFE_INTEGER]) {
      for (let dimension = 0; dimension < inputs.dimensions; dimension++) {
        const points = latinHypercube(inputs.n, seed, `dimension ${dimension}`);
        expect(isLatin(points)).toBe(expected.eachStratumExactlyOnce);
        expect(Math.abs(points.reduce((sum, p) => sum + p, 0) / inputs.n - 0.5)).toBeLessThanOrEqual(Number(expected.marginalMeanWithin));
      }
    }
  });
  test("lhs-midpoints-10: the strata's middles on a log scale", () => {
    const { inputs, expected } = row("lhs-midpoints-10");
    const value = { low: 2 * Math.exp(-0.3 * Z), central: 2, high: 2 * Math.exp(0.3 * Z) };
    const scores = Float64Array.from({ length: inputs.n }, (_, i) => normalQuantile((i + 0.5) / inputs.n));
    for (const [i, x] of spread(value, "log", scores).entries()) expectRelative(x, expected.values[i], 1e-10, `stratum ${i}`);
  });
  test("streams of different inputs and seeds are unrelated", () => {
    const n = 2_000;
    const streams = [0, 1, 2, 3].flatMap((seed) => ["cut.a", "cut.b", "cut.c", "infectious"].map((name) => latinHypercube(n, seed, name)));
    const correlation = (a: Float64Array, b: Float64Array) => (12 * a.reduce((sum, x, i) => sum + (x - 0.5) * (b[i]! - 0.5), 0)) / n;
    // 120 pairs: five standard errors of a correlation of nothing.
    for (const [i, a] of streams.entries()) for (const b of streams.slice(0, i)) expect(Math.abs(correlation(a, b))).toBeLessThanOrEqual(5 / Math.sqrt(n));
  });
});

test("every row of the file is tested, or left out for a reason", () => {
  const shapley = rows.filter(({ group }) => group === "Shapley value").map(({ id }) => [id, "what each measure contributed comes with a later version"]);
  const tested = ["lognormal-product-1", "lhs-check-2-1000", "lhs-midpoints-10", "lhs-valid", "lhs-invalid"].map(row);
  expectAccounted(rows, [...intervals, ...tested], { ...Object.fromEntries(shapley), "se-log-ratio": "the standard error of a fitted ratio: fits come with a later version" });
});
