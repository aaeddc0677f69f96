import { readFileSync } from "node:fs";
import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { type AssessmentInput, assess, otherFixedPoint, settledState } from "@/lib/engine";
import { settledResidual } from "@/lib/engine/settled-state";
import { anInput, withCuts } from "../../reference/input";

const share = (min: number, max: number) => fc.double({ min, max, noNaN: true });
const outbreak = fc.record({
  population: fc.integer({ min: 10_000, max: 10_000_000 }),
  infectious: fc.integer({ min: 1, max: 90 }),
  transmission: share(0.5, 6).map((value) => ({ given: "reproductionNumber" as const, value })),
  infectiousPeriod: share(1, 20),
  latentPeriod: fc.option(share(0.5, 10), { nil: null }),
  infectionFatality: share(0.001, 1),
});
const cuts = fc.array(share(0, 0.8), { minLength: 1, maxLength: 5 });
const near = (a: number, b: number, relative: number) => expect(Math.abs(a - b)).toBeLessThanOrEqual(relative * Math.max(1e-9, Math.abs(a), Math.abs(b)));
const deaths = (input: AssessmentInput) => assess(input).packages[0]!.finalDeaths;

describe("settled value", () => {
  test("both fixed points are roots, the stable one above, for the whole domain", () => {
    fc.assert(
      fc.property(share(-3, 3), fc.oneof(fc.constant(0), share(-9, 1).map((e) => 10 ** e)), (logB, excess) => {
        const thresholdRatio = 10 ** logB;
        const equation = { excess, thresholdRatio, margin: 1 - thresholdRatio };
        const stable = settledState(equation);
        const other = otherFixedPoint(equation);
        expect(stable.outcome).toBe("converged");
        expect(other.outcome).toBe("converged");
        expect(stable.value).toBeGreaterThanOrEqual(0);
        expect(other.value).toBeLessThanOrEqual(0);
        const scale = 1 + excess + thresholdRatio * Math.abs(stable.value);
        expect(Math.abs(settledResidual(equation, stable.value))).toBeLessThanOrEqual(1e-14 * scale);
        expect(stable.iterations).toBeLessThanOrEqual(12);
      }),
      { numRuns: 3000 },
    );
  });
  test("a = 1 and b ≥ 1 gives exactly 0", () => {
    fc.assert(
      fc.property(share(1, 1000), (thresholdRatio) => {
        expect(settledState({ excess: 0, thresholdRatio }).value).toBe(0);
      }),
    );
  });
});

describe("measures", () => {
  test("a zero cut equals no further measures", () => {
    fc.assert(
      fc.property(outbreak, (o) => {
        const result = assess(anInput(o, withCuts([0, 0])));
        expect(result.packages[0]!.finalDeaths.asScheduled).toBe(result.withoutMeasures.finalDeaths);
        expect(result.packages[0]!.deathsAverted.asScheduled).toBe(0);
      }),
      { numRuns: 60 },
    );
  });
  test("held from day 0, a stronger cut never leaves more deaths", () => {
    fc.assert(
      fc.property(outbreak, share(0, 0.85), share(0.001, 0.1), (o, cut, more) => {
        const weak = deaths(anInput(o, withCuts([cut]))).asScheduled;
        const strong = deaths(anInput(o, withCuts([cut + more]))).asScheduled;
        expect(strong).toBeLessThanOrEqual(weak * (1 + 1e-12));
      }),
      { numRuns: 80 },
    );
  });
  test("splitting a measure in two factors changes nothing", () => {
    fc.assert(
      fc.property(outbreak, share(0.1, 0.9), share(0, 1), fc.integer({ min: 0, max: 60 }), fc.integer({ min: 1, max: 200 }), (o, factor, part, start, length) => {
        const whole = deaths(anInput(o, withCuts([1 - factor], start, start + length)));
        const split = deaths(anInput(o, withCuts([1 - factor ** part, 1 - factor ** (1 - part)], start, start + length)));
        near(whole.asScheduled, split.asScheduled, 1e-9);
        near(whole.heldToEnd, split.heldToEnd, 1e-9);
      }),
      { numRuns: 60 },
    );
  });
  test("an endless window from day 0 agrees with the settled value, and a very long one with the endless", () => {
    fc.assert(
      fc.property(outbreak, cuts, (o, list) => {
        const endless = deaths(anInput(o, withCuts(list)));
        near(endless.asScheduled, endless.heldFromDayZero, 1e-12);
        near(endless.asScheduled, endless.heldToEnd, 1e-12);
      }),
      { numRuns: 60 },
    );
  });
  test("the order of measures and packages changes no figure, draws included", () => {
    const measures = [0.1, 0.25, 0.4].map((cut, i) => ({ id: `m${i}`, name: `M${i}`, cut: { low: cut / 2, central: cut, high: cut * 1.5 }, ladder: null, maxDays: null, costs: [{ payer: "public" as const, perDay: { low: 1, central: 2, high: 4 } }] }));
    const items = measures.map(({ id }, i) => ({ measure: id, uptake: 0.8, startDay: 5 * i, endDay: 100 + 10 * i }));
    const packages = [
      { id: "A", name: "a", items },
      { id: "B", name: "b", items: items.slice(1) },
    ];
    const base = anInput({ transmission: { given: "reproductionNumber", value: { low: 1.5, central: 2, high: 2.6 } }, latentPeriod: 3 }, { measures, packages, uncertainty: { draws: 400, seed: 3 } });
    const turned = { ...base, measures: measures.toReversed(), packages: packages.toReversed().map((p) => ({ ...p, items: p.items.toReversed() })) };
    const [one, two] = [assess(base), assess(turned)];
    for (const id of ["A", "B"]) {
      const [p, q] = [one, two].map((r) => r.packages.find((each) => each.id === id)!);
      near(p!.finalDeaths.asScheduled, q!.finalDeaths.asScheduled, 1e-12);
      near(p!.uncertainty!.finalDeaths.asScheduled.median, q!.uncertainty!.finalDeaths.asScheduled.median, 1e-12);
      near(p!.uncertainty!.cost.total.high, q!.uncertainty!.cost.total.high, 1e-12);
      expect(p!.uncertainty!.chanceEnough).toBe(q!.uncertainty!.chanceEnough);
    }
  });
});

describe("draws", () => {
  const input = anInput({ transmission: { given: "growthRate", value: { low: 0.06, central: 0.1, high: 0.14 } }, latentPeriod: { low: 2, central: 3, high: 4 } }, { ...withCuts([0.3], 7, 120), uncertainty: { draws: 500, seed: 1 } });
  test("same input and seed, same bytes", () => expect(JSON.stringify(assess(input))).toBe(JSON.stringify(assess(structuredClone(input)))));
  test("another seed moves the interval and not the central run", () => {
    const [one, two] = [assess(input), assess({ ...input, uncertainty: { draws: 500, seed: 2 } })];
    expect(two.packages[0]!.finalDeaths).toEqual(one.packages[0]!.finalDeaths);
    expect(two.packages[0]!.uncertainty!.finalDeaths.asScheduled).not.toEqual(one.packages[0]!.uncertainty!.finalDeaths.asScheduled);
  });
  test("an input taken as certain gives an interval of no width", () => {
    const certain = assess(anInput({}, { ...withCuts([0.3]), uncertainty: { draws: 100, seed: 1 } })).packages[0]!;
    const { median, low, high } = certain.uncertainty!.finalDeaths.asScheduled;
    expect([low, high]).toEqual([median, median]);
    near(median, certain.finalDeaths.asScheduled, 1e-12);
  });
  test("what one package costs and averts beyond another is the median of paired differences", () => {
    const demo = JSON.parse(readFileSync(new URL("../../../db/demo/kelmaren.json", import.meta.url), "utf8")) as AssessmentInput;
    const { comparison, packages } = assess({ ...demo, uncertainty: { draws: 400, seed: 5 } });
    const [first, second] = comparison.incremental;
    const firstFigures = packages.find(({ id }) => id === first!.to)!.uncertainty!;
    expect(first!.from).toBe("none");
    expect(first!.deathsAverted).toBe(firstFigures.deathsAverted.asScheduled.median);
    expect(first!.cost).toBe(firstFigures.cost.total.median);
    expect(second!.ratio).toBeCloseTo(second!.cost / second!.deathsAverted, 9);
  });
  test("a calculation can be stopped between draws", () => {
    let asked = 0;
    expect(() => assess(input, { shouldStop: () => ++asked > 2 })).toThrow("cancelled");
  });
});
