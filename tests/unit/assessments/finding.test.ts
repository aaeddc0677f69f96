import { describe, expect, test } from "vitest";
import type { SlimResult } from "@/lib/assessments/figures-of";
import { finding } from "@/lib/assessments/finding";
import type { AssessmentInput, Interval, PackageResult } from "@/lib/engine/types";

const interval = (low: number, median: number, high: number): Interval => ({ low, median, high });
type Crafted = { id: string; ratio: [number, number, number]; averted: [number, number, number]; chanceEnough?: number; susceptibleShareAtLift?: number | null; cost?: number };

function aPackage({ id, ratio, averted, chanceEnough = 0.5, susceptibleShareAtLift = 0.6, cost = 1e6 }: Crafted): Omit<PackageResult, "course"> {
  const deaths = interval(100, 1_000, 2_000);
  const total = interval(cost, cost, cost);
  return {
    id,
    phases: [{ fromDay: 0, toDay: null, factor: 0.5, thresholdRatio: ratio[1], effectiveRatioAtStart: ratio[1], effectiveRatioAtEnd: 1.2, infectedAtEnd: 0, chanceEndsByItself: null }],
    strongestPhase: 0,
    thresholdRatio: ratio[1],
    thresholdShift: 0.3,
    enough: ratio[1] >= 1,
    furtherFactor: ratio[1] >= 1 ? null : ratio[1],
    finalDeaths: { asScheduled: 1_000, heldToEnd: 900, heldFromDayZero: 500 },
    finalRemoved: 100_000,
    deathsAverted: { asScheduled: averted[1], heldToEnd: averted[1] },
    peak: { day: 80, infectious: 1_000 },
    worstDay: { day: 85, deaths: 10 },
    susceptibleShareAtLift,
    cost: { total: cost, byPayer: { public: cost, business: 0, household: 0 }, perDeathAverted: null },
    chargedUntilDay: null,
    contributions: [],
    warnings: [],
    uncertainty: {
      thresholdRatio: interval(...ratio),
      finalDeaths: { asScheduled: deaths, heldToEnd: deaths, heldFromDayZero: deaths },
      deathsAverted: { asScheduled: interval(...averted), heldToEnd: interval(...averted) },
      finalInfected: interval(1, 2, 3),
      cost: { total, byPayer: { public: total, business: total, household: total } },
      peakDay: interval(70, 80, 90),
      perDeathAverted: null,
      chanceEnough,
      phases: [],
      monteCarloError: {},
    },
  };
}

function aResult(packages: Crafted[], options: { none?: [number, number, number]; pairs?: [string, string, number][] } = {}): SlimResult {
  const none = interval(...(options.none ?? [0.4, 0.48, 0.56]));
  return {
    format: "ebbmark.assessment-result/1",
    engine: "test",
    inputHash: "",
    withoutMeasures: {
      thresholdRatio: none.median,
      reproductionNumber: 1 / none.median,
      finalDeaths: 2_000,
      finalRemoved: 300_000,
      peak: { day: 80, infectious: 40_000 },
      worstDay: { day: 85, deaths: 40 },
      chanceDiesOut: 0,
      uncertainty: {
        thresholdRatio: none,
        reproductionNumber: interval(1 / none.high, 1 / none.median, 1 / none.low),
        finalDeaths: interval(1_300, 2_000, 3_100),
        finalInfected: interval(1, 2, 3),
        peakDay: interval(70, 80, 90),
        chanceShrinks: 0,
        monteCarloError: {},
      },
    },
    packages: packages.map(aPackage),
    comparison: { efficient: [], dominated: [], incremental: [], pairs: (options.pairs ?? []).map(([a, b, chanceAvertsMore]) => ({ a, b, chanceAvertsMore })) },
    diagnostics: { converged: true, integratorDifferencePersons: 0, integratorAllowedPersons: 1, settledResidual: 0, refusedDraws: 0 },
    warnings: [],
  };
}
const schedule = (ends: Record<string, number | null>): AssessmentInput["packages"] =>
  Object.entries(ends).map(([id, endDay]) => ({ id, name: id, items: [{ measure: "m", startDay: 7, endDay }] }));
const keys = (result: SlimResult, ends: Record<string, number | null>) => finding(result, schedule(ends)).map(({ key }) => key);

const strong = { id: "C", ratio: [1.04, 1.39, 1.83] as [number, number, number], chanceEnough: 0.99, susceptibleShareAtLift: 0.999 };

describe("what is enough", () => {
  test("a package that ends is enough while held, and the sentence goes on with what follows its lift", () => {
    const result = aResult([{ id: "A", ratio: [0.57, 0.71, 0.86], averted: [40, 376, 745] }, { ...strong, averted: [1, 1.6, 2] }]);
    const [first, second] = finding(result, schedule({ A: 217, C: 77 }));
    expect(first).toMatchObject({ key: "onlyEnough", letter: "C", held: true, ratio: { mid: 1.39 } });
    expect((first as { reproductionNumber: { mid: number; low: number; high: number } }).reproductionNumber).toEqual({ mid: 1 / 1.39, low: 1 / 1.83, high: 1 / 1.04 });
    expect(second).toMatchObject({ key: "afterLift", letter: "C", endDay: 77, susceptibleShare: 0.999, outcome: "noDifference" });
  });
  test("what follows the lift may be deaths averted, or more deaths than without", () => {
    const outcome = (averted: [number, number, number]) => finding(aResult([{ ...strong, averted }]), schedule({ C: 77 })).find(({ key }) => key === "afterLift");
    expect(outcome([200, 400, 600])).toMatchObject({ outcome: "averts", deaths: { mid: 400 } });
    expect(outcome([-90, -60, -30])).toMatchObject({ outcome: "worse", deaths: { mid: 60, low: 30, high: 90 } });
    expect(outcome([-90, -60, 10])).toMatchObject({ outcome: "noDifference" });
  });
  test("never lifted means nothing follows", () => expect(keys(aResult([{ ...strong, averted: [900, 1_500, 2_000] }]), { C: null })).toEqual(["enough", "avertsOnly", "costs"]));
  test("one line without an end is enough for the package to have none", () => {
    const items = [{ measure: "m", startDay: 7, endDay: 77 }, { measure: "n", startDay: 7, endDay: null }];
    expect(finding(aResult([{ ...strong, averted: [9, 20, 30] }]), [{ id: "C", name: "C", items }])[0]).toMatchObject({ key: "enough", held: false });
  });
  test("several that are enough are named together", () => {
    const result = aResult([{ ...strong, id: "B", averted: [0, 1, 2] }, { ...strong, averted: [0, 1, 2] }]);
    expect(finding(result, schedule({ B: 77, C: 77 }))[0]).toEqual({ key: "severalEnough", letters: ["B", "C"], held: true });
  });
  test("an interval on both sides of 1 is uncertain, with its chance", () => {
    const result = aResult([{ id: "B", ratio: [0.71, 0.89, 1.1], averted: [105, 450, 862], chanceEnough: 0.148 }]);
    expect(finding(result, schedule({ B: 224 }))[0]).toMatchObject({ key: "uncertainEnough", letter: "B", chance: 0.148 });
  });
  test("where all fall short the closest is named with the further cut of what remains", () => {
    const result = aResult([{ id: "A", ratio: [0.5, 0.6, 0.7], averted: [40, 376, 745] }, { id: "B", ratio: [0.71, 0.89, 0.99], averted: [105, 450, 862] }]);
    const [first] = finding(result, schedule({ A: 217, B: 224 }));
    expect(first).toMatchObject({ key: "noneEnough", letter: "B", single: false });
    expect((first as { furtherCut: number }).furtherCut).toBeCloseTo(0.11, 12);
  });
  test("an outbreak that dies out anyway is said to", () => {
    expect(keys(aResult([{ ...strong, averted: [0, 1, 2] }], { none: [1.05, 1.2, 1.4] }), { C: 77 })[0]).toBe("diesOutAnyway");
  });
});

describe("what averts deaths", () => {
  const two = (pair: number | null, b: [number, number, number] = [105, 450, 862]) =>
    aResult([{ id: "A", ratio: [0.5, 0.6, 0.7], averted: [40, 376, 745], cost: 1 }, { id: "B", ratio: [0.7, 0.8, 0.9], averted: b, cost: 2 }], pair === null ? {} : { pairs: [["B", "A", pair]] });
  const ends = { A: 217, B: 224 };

  test("the best is set against the second on paired draws", () => {
    expect(finding(two(0.79), schedule(ends)).slice(1)).toMatchObject([
      { key: "avertsMost", letter: "B", averted: { mid: 450, low: 105, high: 862 }, over: { letter: "A", chance: 0.79 } },
      { key: "costs", costs: [{ letter: "B", total: { mid: 2 } }, { letter: "A", total: { mid: 1 } }] },
    ]);
  });
  test("a difference of costs is said only where it was drawn in pairs", () => {
    const result = two(0.79);
    const costs = (comparison: SlimResult["comparison"]) => finding({ ...result, comparison }, schedule(ends)).at(-1);
    expect(costs(result.comparison)).toMatchObject({ key: "costs", more: null });
    expect(costs({ ...result.comparison, incremental: [{ from: "A", to: "B", cost: 14e6, deathsAverted: 40, ratio: 1 }] })).toMatchObject({ more: 14e6 });
    expect(costs({ ...result.comparison, incremental: [{ from: "none", to: "B", cost: 30e6, deathsAverted: 40, ratio: 1 }] })).toMatchObject({ more: null });
  });
  test("without draws nothing is said of chances", () => expect(finding(two(null), schedule(ends))[1]).toMatchObject({ key: "avertsMost", over: null }));
  test("two that paired draws don't tell apart avert alike", () => expect(finding(two(0.52), schedule(ends))[1]).toMatchObject({ key: "avertAlike", letter: "B", other: "A", chance: 0.52, same: false }));
  test("two that do the same in every draw are said to", () => {
    const result = two(0, [40, 376, 745]);
    const pairs = [{ a: "A", b: "B", chanceAvertsMore: 0 }, { a: "B", b: "A", chanceAvertsMore: 0 }];
    expect(finding({ ...result, comparison: { ...result.comparison, pairs } }, schedule(ends))[1]).toMatchObject({ key: "avertAlike", letter: "A", other: "B", same: true });
  });
  test("one that can't be told from nothing leaves the other alone", () => {
    expect(finding(two(0.1, [-20, 30, 80]), schedule(ends))[1]).toMatchObject({ key: "avertsOnly", letter: "A", single: false });
  });
  test("none measurable is said once", () => {
    const result = aResult([{ id: "A", ratio: [0.5, 0.6, 0.7], averted: [1, 5, 9] }, { id: "B", ratio: [0.5, 0.6, 0.7], averted: [-20, 12, 50] }]);
    expect(keys(result, ends)).toEqual(["noneEnough", "noneAverts"]);
  });
  test("worse than nothing is said, with how much worse, beside what helps", () => {
    const sentences = finding(two(0, [-300, -120, -20]), schedule(ends));
    expect(sentences.map(({ key }) => key)).toEqual(["noneEnough", "avertsOnly", "worse", "costs"]);
    expect(sentences[2]).toMatchObject({ letter: "B", more: { mid: 120, low: 20, high: 300 } });
  });
  test("without packages there is nothing to say", () => expect(finding(aResult([]), [])).toEqual([]));
});
