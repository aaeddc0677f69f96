import { describe, expect, test } from "vitest";
import { canonicalJson, growthRateAt, sha256Hex, startState } from "@/lib/engine";
import { findRoot, normalQuantile, quantileSorted } from "@/lib/engine/numeric";
import { priceComparison } from "@/lib/engine/prices";
import { positiveScale, shareScale, sidesOf, spread } from "@/lib/engine/quantities";
import { latinHypercubeScores } from "@/lib/engine/random";
import { piecesOf } from "@/lib/engine/windows";

describe("quantiles of the standard normal (values from tables; Wichura 1988 gives the algorithm)", () => {
  test.each([
    [0.5, 0],
    [0.975, 1.959963984540054],
    [0.995, 2.5758293035489004],
    [0.9999, 3.719016485455709],
    [1e-10, -6.361340902404056],
  ])("Φ⁻¹(%d)", (p, z) => expect(Math.abs(normalQuantile(p) - z)).toBeLessThanOrEqual(2e-14));
});

describe("two-piece normal on a scale (checks/09, computed with mpmath 1.3.0)", () => {
  test.each([
    [0.58, 0.72, 0.91, 0.110319939639287, 0.119488617825676],
    [2.4, 3.8, 5.6, 0.234459578340813, 0.197843192052205],
    [1, 2, 4, 0.353653019151067, 0.353653019151067],
    [0.835, 0.854, 0.873, 0.0114795318256801, 0.0112269216294789],
  ])("%d, %d, %d", (low, central, high, lower, upper) => {
    const sides = sidesOf({ low, central, high }, "log");
    expect(Math.abs(sides.lower / lower - 1)).toBeLessThanOrEqual(1e-10);
    expect(Math.abs(sides.upper / upper - 1)).toBeLessThanOrEqual(1e-10);
  });
  test("the three quantiles come back on every scale", () => {
    const z = new Float64Array([-1.959963984540054, 0, 1.959963984540054]);
    for (const [value, scale] of [
      [{ low: 0.2, central: 0.3, high: 0.6 }, "log"],
      [{ low: -0.1, central: 0.3, high: 0.6 }, "logOfRest"],
      [{ low: 0.2, central: 0.3, high: 0.6 }, "logit"],
      [{ low: -2, central: 0.3, high: 6 }, "linear"],
      [{ low: 0, central: 0.3, high: 6 }, "linearFromZero"],
      [{ low: 0, central: 0.3, high: 1 }, "linearShare"],
    ] as const) {
      const found = [...spread(value, scale, z)].map((x) => Number(x.toPrecision(12)));
      expect(found, scale).toEqual([value.low, value.central, value.high]);
    }
  });
  test("which scale", () => {
    expect([positiveScale(0.1), positiveScale(0), shareScale(0.1, 0.9), shareScale(0, 0.9), shareScale(0.1, 1)]).toEqual(["log", "linearFromZero", "logit", "linearShare", "linearShare"]);
  });
});

test("Latin hypercube: each stratum holds exactly one draw, and streams are their own", () => {
  const scores = latinHypercubeScores(1000, 42, "a");
  const edges = Array.from({ length: 999 }, (_, i) => normalQuantile((i + 1) / 1000));
  const strata = new Set([...scores].map((z) => edges.filter((edge) => z >= edge).length));
  expect(strata.size).toBe(1000);
  expect(latinHypercubeScores(1000, 42, "b")).not.toEqual(scores);
  expect(latinHypercubeScores(1000, 43, "a")).not.toEqual(scores);
});

test("pieces: one per change of what is in force", () => {
  const pieces = piecesOf([
    { startDay: 7, endDay: 20 },
    { startDay: 10, endDay: null },
    { startDay: 20, endDay: 20.5 },
  ]);
  expect(pieces).toEqual([
    { fromDay: 0, toDay: 7, items: [] },
    { fromDay: 7, toDay: 10, items: [0] },
    { fromDay: 10, toDay: 20, items: [0, 1] },
    { fromDay: 20, toDay: 20.5, items: [1, 2] },
    { fromDay: 20.5, toDay: null, items: [1] },
  ]);
  expect(piecesOf([])).toEqual([{ fromDay: 0, toDay: null, items: [] }]);
});

test("growth-consistent number latent satisfies its own definition for measured numbers too", () => {
  const rates = { removalRate: 1 / 5, onsetRate: 1 / 3 };
  const start = startState("effectiveReproductionNumber", 1.8, rates, { population: 1000, infectious: 20, removed: 300 }, null);
  const growth = growthRateAt((start.transmissionRate * (1000 - 300 - 20)) / (rates.removalRate * 1000), rates);
  expect(start.exposed).toBeCloseTo((20 * (growth + rates.removalRate)) / rates.onsetRate, 10);
  expect((start.transmissionRate * start.susceptible) / (rates.removalRate * 1000)).toBeCloseTo(1.8, 12);
});

describe("price comparison", () => {
  test("simple and extended dominance, ratios along what is left", () => {
    const result = priceComparison([
      { id: "A", cost: 10, deathsAverted: 10 },
      { id: "B", cost: 30, deathsAverted: 12 },
      { id: "C", cost: 40, deathsAverted: 30 },
      { id: "D", cost: 50, deathsAverted: 29 },
      { id: "E", cost: 5, deathsAverted: -3 },
    ]);
    expect(result.efficient).toEqual(["A", "C"]);
    expect(result.dominated).toEqual([
      { id: "B", by: ["A", "C"], kind: "extended" },
      { id: "D", by: ["C"], kind: "simple" },
      { id: "E", by: ["none"], kind: "simple" },
    ]);
    expect(result.incremental).toEqual([
      { from: "none", to: "A", cost: 10, deathsAverted: 10, ratio: 1 },
      { from: "A", to: "C", cost: 30, deathsAverted: 20, ratio: 1.5 },
    ]);
  });
});

describe("canonical form (RFC 8785, section 3.2; the example of its appendix for sorting)", () => {
  test("members sorted by UTF-16 code units", () => {
    const value = { "\u20ac": "Euro", "\r": "CR", "\ufb33": "Dalet", "1": "One", "\ud83d\ude00": "Emoji", "\u0080": "Control", "\u00f6": "Latin" };
    expect(Object.keys(JSON.parse(canonicalJson(value)))).toHaveLength(7);
    expect(canonicalJson(value).match(/:"(\w+)"/g)).toEqual([':"CR"', ':"One"', ':"Control"', ':"Latin"', ':"Euro"', ':"Emoji"', ':"Dalet"']);
  });
  test("numbers as ECMAScript writes them", () => expect(canonicalJson([Number("333333333.33333329"), 1e30, 4.5, 2e-3, 1e-27, -0])).toBe("[333333333.3333333,1e+30,4.5,0.002,1e-27,0]"));
  test("what isn't JSON is refused", () => {
    expect(() => canonicalJson({ a: Number.NaN })).toThrow(TypeError);
    expect(() => canonicalJson([undefined])).toThrow(TypeError);
  });
  test("SHA-256 of abc (FIPS 180-4 example)", () => expect(sha256Hex("abc")).toBe("ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad"));
});

test("quantile and root finding", () => {
  expect(quantileSorted(new Float64Array([1, 2, 3, 4]), 0.5)).toBe(2.5);
  expect(Math.abs(findRoot((x) => x ** 3 - 2, 0, 2, 1e-14) - Math.cbrt(2))).toBeLessThanOrEqual(1e-13);
});
