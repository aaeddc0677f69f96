import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { checkPackage, type PackageFinding, type RuleItem, type RuleMeasure } from "@/lib/packages/rules";

const measure = (id: string, over: Partial<RuleMeasure> = {}): RuleMeasure => ({
  id, code: id, name: id, legalBasis: "Act, s. 12", ladder: null, leadTimeDays: 0, reviewEveryDays: null, maxDays: null, maxDaysWithin: null, daysUsed: null, ...over,
});
const item = (measureId: string, startDay: number, endDay: number | null): RuleItem => ({ measureId, startDay, endDay });
const codes = (findings: PackageFinding[], level?: PackageFinding["level"]) => findings.filter((each) => !level || each.level === level).map(({ code }) => code);
const PASSES = ["ladders", "leadTimes", "lawful"];

describe("what the checks say", () => {
  const rungs = [measure("g100", { ladder: "gatherings" }), measure("g30", { ladder: "gatherings" })];
  const other = measure("close", { ladder: "venues" });

  test.each<[string, RuleItem[], RuleMeasure[], string[], string[]]>([
    ["an empty package equals no further measures", [], [], ["empty"], []],
    ["one measure without limits passes all", [item("m", 0, null)], [measure("m")], [], PASSES],
    ["a measure that stands twice on the same days", [item("m", 0, 10), item("m", 9, 20)], [measure("m")], ["overlap"], ["leadTimes", "lawful"]],
    ["twice, the second on the day after the first", [item("m", 0, 10), item("m", 10, 20)], [measure("m")], [], PASSES],
    ["two rungs on one day", [item("g100", 0, 10), item("g30", 9, 20)], rungs, ["ladder"], ["leadTimes", "lawful"]],
    ["one rung after the other", [item("g100", 0, 10), item("g30", 10, null)], rungs, [], PASSES],
    ["never lifted meets everything later", [item("g100", 0, null), item("g30", 500, 501)], rungs, ["ladder"], ["leadTimes", "lawful"]],
    ["two ladders don't exclude each other", [item("g100", 0, 10), item("close", 0, 10)], [...rungs, other], [], PASSES],
    ["measures without a ladder don't exclude each other", [item("a", 0, 10), item("b", 0, 10)], [measure("a"), measure("b")], [], PASSES],
    ["a start before the lead time", [item("m", 3, 10)], [measure("m", { leadTimeDays: 4 })], ["leadTime"], ["ladders", "lawful"]],
    ["a start on the day when the lead time is over", [item("m", 4, 10)], [measure("m", { leadTimeDays: 4 })], [], PASSES],
    ["a schedule longer than is lawful", [item("m", 0, 57)], [measure("m", { maxDays: 56 })], ["tooLong"], ["ladders", "leadTimes"]],
    ["no end where the duration is limited", [item("m", 0, null)], [measure("m", { maxDays: 56 })], ["noEnd"], ["ladders", "leadTimes"]],
    ["all lawful days used", [item("m", 0, 56)], [measure("m", { maxDays: 56 })], ["nearLimit"], PASSES],
    ["less than three quarters of the lawful days", [item("m", 0, 41)], [measure("m", { maxDays: 56 })], [], PASSES],
    ["a review falls in the time in force", [item("m", 0, 29)], [measure("m", { reviewEveryDays: 28 })], ["review"], PASSES],
    ["no review where it ends first", [item("m", 0, 28)], [measure("m", { reviewEveryDays: 28 })], [], PASSES],
  ])("%s", (_, items, measures, wrong, right) => {
    const findings = checkPackage(items, measures);
    expect(codes(findings).filter((code) => !PASSES.includes(code))).toEqual(wrong);
    expect(codes(findings, "passes")).toEqual(right);
  });

  test("only what the calculation would refuse stops", () => {
    const findings = checkPackage(
      [item("g100", 0, 10), item("g30", 5, 20), item("m", 0, 100)],
      [...rungs, measure("m", { leadTimeDays: 4, maxDays: 56 })],
    );
    expect(codes(findings, "stops")).toEqual(["ladder"]);
    expect(codes(findings, "looks")).toEqual(["leadTime", "tooLong"]);
    expect(codes(findings, "passes")).toEqual([]);
  });
});

describe("how much of a lawful duration is left", () => {
  const near = (items: RuleItem[], over: Partial<RuleMeasure>) => checkPackage(items, [measure("m", over)]).find(({ code }) => code === "nearLimit");

  test("names days, limit and the last day that is still lawful", () => {
    expect(near([item("m", 98, 196)], { maxDays: 112, maxDaysWithin: 365 })).toMatchObject({ days: 98, allowed: 112, within: 365, lastDay: 98 + 112 - 1, legalBasis: "Act, s. 12" });
  });
  test("days already used shorten it", () => {
    expect(near([item("m", 0, 90)], { maxDays: 112, daysUsed: 12 })).toMatchObject({ days: 102, lastDay: 99 });
  });
  test("a window that moves on leaves more than the limit less the days counted", () => {
    // 28 + 28 days; day 100 on lies a year after the first run began, so all of it counts anew.
    expect(near([item("m", 0, 28), item("m", 72, 100)], { maxDays: 56, maxDaysWithin: 100 })).toMatchObject({ days: 56, lastDay: 72 + 56 - 1 });
  });
  test("the last lawful day is lawful and the day after it is not", () => {
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 80 }), fc.integer({ min: 0, max: 60 }), fc.integer({ min: 1, max: 60 }), fc.integer({ min: 0, max: 30 }), fc.integer({ min: 1, max: 60 }), (maxDays, start, length, gap, second) => {
        const items = [item("m", start, start + length), item("m", start + length + gap, start + length + gap + second)];
        const law = { maxDays, maxDaysWithin: maxDays + 40 };
        const found = near(items, law);
        fc.pre(found?.code === "nearLimit");
        if (found?.code !== "nearLimit") return;
        const endingAfter = (lastDay: number) => codes(checkPackage([items[0] as RuleItem, { ...(items[1] as RuleItem), endDay: lastDay + 1 }], [measure("m", law)]));
        expect(endingAfter(found.lastDay)).not.toContain("tooLong");
        // A run as long as the limit is never lawful to lengthen.
        expect(endingAfter(found.lastDay + 1)).toContain("tooLong");
      }),
    );
  });
});

test("review dates count from each start and end with the measure", () => {
  const found = checkPackage([item("m", 7, 77), item("m", 100, 129)], [measure("m", { reviewEveryDays: 28 })]).find(({ code }) => code === "review");
  expect(found).toMatchObject({ every: 28, dueDays: [35, 63, 128] });
});

test("the order of the lines doesn't change what is found", () => {
  const measures = [measure("a", { ladder: "l", maxDays: 20, reviewEveryDays: 7 }), measure("b", { ladder: "l", leadTimeDays: 5 }), measure("c", { maxDays: 30, maxDaysWithin: 60 })];
  const line = fc.record({ measureId: fc.constantFrom("a", "b", "c"), startDay: fc.integer({ min: 0, max: 80 }), length: fc.option(fc.integer({ min: 1, max: 60 })) });
  const summary = (items: RuleItem[]) =>
    checkPackage(items, measures)
      .map((each) => (each.code === "ladder" || each.code === "overlap" ? { code: each.code, pair: [each.measure, each.other].sort() } : each))
      .map((each) => JSON.stringify(each))
      .sort();
  fc.assert(
    fc.property(fc.array(line, { maxLength: 6 }), (lines) => {
      const items = lines.map(({ measureId, startDay, length }) => item(measureId, startDay, length === null ? null : startDay + length));
      expect(summary(items.toReversed())).toEqual(summary(items));
    }),
  );
});
