import { describe, expect, test } from "vitest";
import { assess, EngineError } from "@/lib/engine";
import { expectAccounted, expectRelative, named, type Row, readCases } from "./cases";
import { anInput, withCuts } from "./input";

const rows = readCases("03-measures");
const REFUSED = "edge-full-and-other";
const products = rows.filter(({ inputs, id }) => Array.isArray(inputs.percentReductions) && id !== REFUSED);
const needed = rows.filter(({ id }) => id.startsWith("needed-"));
const singles = rows.filter(({ expected }) => Array.isArray(expected.interval95));
const once = rows.filter(({ id }) => ["flaxman-R", "yu-holidays-R", "soucy-mobility-step"].includes(id));

/** R on day 0 with everybody but one susceptible; b of the strongest phase relative to it gives the factor. */
function factorOf(reproductionNumber: number, percents: readonly number[]) {
  const result = assess(anInput({ transmission: { given: "effectiveReproductionNumber", value: reproductionNumber } }, withCuts(percents.map((percent) => percent / 100))));
  const [a] = result.packages;
  return { factor: a!.phases[a!.strongestPhase]!.factor, thresholdRatio: a!.thresholdRatio, enough: a!.enough };
}

describe("measures multiply", () => {
  test.each(named(products))("%s", (_, { inputs, expected }) => {
    const percents = inputs.percentReductions as number[];
    const r = Number(inputs.R0 ?? 2);
    const { factor, thresholdRatio, enough } = factorOf(r, percents);
    expectRelative(factor, expected.factor, 1e-13, "factor");
    expectRelative(factorOf(r, percents.toReversed()).factor, expected.factor, 1e-13, "factor in another order");
    if (expected.b) {
      expectRelative(thresholdRatio, expected.b, 1e-12, "b");
      if (expected.endsEpidemicGrowth !== undefined) expect(enough).toBe(expected.endsEpidemicGrowth);
    }
  });

  test.each([
    ["brauner-sci-all (from memory: never the only ground)", [42, 27, 38, 13], 67, 85],
    ["sharma-product (from memory: never the only ground)", [26, 35, 7, 13, 12], 61, 69],
  ])("%s: the product lies within the published interval of the combined effect", (_, percents, low, high) => {
    const percent = 100 * (1 - factorOf(2, percents).factor);
    expect(percent).toBeGreaterThanOrEqual(low);
    expect(percent).toBeLessThanOrEqual(high);
  });

  test("a full cut is refused, with the field and what is allowed (the row's β = 0 is outside this engine's domain)", () => {
    expect(() => factorOf(2, [100, 30])).toThrow(EngineError);
    expect(() => factorOf(2, [100, 30])).toThrow(/measures\[0\]\.cut: must be at least -1 and below 1/);
  });

  test.each(named(needed))("%s: the cut that is needed is 1 − b", (_, { inputs, expected }) => {
    const cut = 1 - factorOf(Number(inputs.R0), [0]).thresholdRatio;
    expectRelative(100 * cut, expected.percentReductionToReachR1, 1e-12, "per cent");
  });
});

describe("published estimates are accepted as they are", () => {
  test.each(named(singles))("%s", (_, { expected }) => {
    const [low, high] = (expected.interval95 as number[]).map((percent) => percent / 100);
    const central = expected.percentReductionR / 100;
    const { measures, packages } = withCuts([central]);
    const result = assess(anInput({}, { measures: [{ ...measures[0]!, cut: { low: low!, central, high: high! } }], packages, uncertainty: { draws: 2000, seed: 7 } }));
    const { median, low: l, high: h } = result.packages[0]!.uncertainty!.thresholdRatio;
    const b = result.withoutMeasures.thresholdRatio;
    // The interval of b is that of the cut, carried through 1/(1 − e).
    expectRelative(median, b / (1 - central), 5e-3, "median");
    expectRelative(l, b / (1 - low!), 2e-2, "low end");
    expectRelative(h, b / (1 - high!), 2e-2, "high end");
  });
});

describe("one combined cut", () => {
  const of = (id: string) => once.find((each) => each.id === id)!;
  test("flaxman-R (from memory)", () => expectRelative(1 / factorOf(3.8, [82]).thresholdRatio, of("flaxman-R").expected.R, 1e-12));
  test("yu-holidays-R", () => expectRelative(factorOf(1.25, [37]).thresholdRatio, of("yu-holidays-R").expected.threshold_b, 1e-12));
  test("soucy-mobility-step", () => expect(100 * (1 - factorOf(2, [14.6]).factor)).toBeCloseTo(of("soucy-mobility-step").expected.percentDecrease, 9));
});

test("every row of the file is tested, or left out for a reason", () => {
  const refused = rows.filter(({ id }) => id === REFUSED);
  expectAccounted(rows, [...products, ...needed, ...singles, ...once, ...refused] as Row[], {
    "sharma-combined": "a published combined effect: the bound of sharma-product above",
    "sharma-singles": "published single effects: the factors of sharma-product above",
    "flaxman-average": "a study's findings, nothing to compute",
    haug: "a change of R without the R it started from",
  });
});
