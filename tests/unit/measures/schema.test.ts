import { describe, expect, test } from "vitest";
import { CreateMeasureInput } from "@/lib/measures/schema";
import { typedMeasure } from "../../fixtures/measures";

const faults = (over: Record<string, unknown>) => {
  const parsed = CreateMeasureInput.safeParse(typedMeasure(over));
  return parsed.success ? [] : parsed.error.issues.map(({ path, message }) => [path.join("."), message] as const);
};
const cut = (low: string, central: string, high: string) => ({ cutPercent: { low, central, high, source: "" } });
const perDay = (low: string, central: string, high: string) => ({ costs: { household: { perDay: { low, central, high } } } });

describe("what a measure may say", () => {
  test("the example is accepted as typed", () => {
    expect(CreateMeasureInput.parse(typedMeasure())).toMatchObject({
      cutPercent: { low: 9, central: 16, high: 23 },
      ladder: null, maxDays: 112, maxDaysWithin: 365, daysUsed: null, reviewEveryDays: 28, leadTimeDays: 4,
      costs: [{ payer: "public", setUp: 90_000, perDay: { low: 40_000, central: 43_500, high: 50_000 } }],
      transfers: [],
      publicTexts: { en: { title: "Leave indoor venues by 20:00", detail: "Take-away goes on." } },
    });
  });

  test.each([
    ["a low end below zero", cut("-5", "2", "6")],
    ["a cut with decimals, comma or point", cut("1,5", "2.25", "6")],
    ["a cut that raises transmission throughout", cut("-100", "-50", "-1")],
    ["nothing but what is needed", { evidence: "", legalBasis: "", legalLink: "", maxDays: "", maxDaysWithin: "", daysUsed: "", reviewEveryDays: "", leadTimeDays: "", costs: {}, publicTexts: {} }],
    ["days used before any order", { daysUsed: "0" }],
  ])("accepts %s", (_, over) => expect(faults(over)).toEqual([]));

  test.each([
    ["a cut of all transmission", cut("9", "16", "100"), "cutPercent.high", /Cut in transmission, high: .*from -100 below 100 %/],
    ["a cut below −100 %", cut("-101", "16", "20"), "cutPercent.low", /from -100 below 100 %/],
    ["figures out of order", cut("20", "16", "23"), "cutPercent.low", /low must be at most central/],
    ["a cut left empty", cut("", "16", "23"), "cutPercent.low", /Cut in transmission, low/],
    ["a cut in words", cut("9", "some", "23"), "cutPercent.central", /give a number/],
    ["no name", { name: "  " }, "name", /Give 1 to 200 characters/],
    ["a name that is too long", { name: "x".repeat(201) }, "name", /at most 200/],
    ["a short name that is too long for charts", { shortName: "x".repeat(25) }, "shortName", /at most 24/],
    ["a code with a space", { code: "close 20" }, "code", /small letters, digits or hyphens/],
    ["a link that is no address", { legalLink: "Health Act" }, "legalLink", /https/],
    ["a duration of no day", { maxDays: "0", maxDaysWithin: "" }, "maxDays", /from 1 to 36,500 days/],
    ["half a day", { maxDays: "1.5", maxDaysWithin: "" }, "maxDays", /whole number/],
    ["a window without a limit", { maxDays: "" }, "maxDaysWithin", /needs a longest lawful duration/],
    ["a window shorter than its limit", { maxDaysWithin: "100" }, "maxDaysWithin", /at least as long/],
    ["a lead time of more than a year", { leadTimeDays: "366" }, "leadTimeDays", /from 0 to 365/],
    ["a cost below zero", perDay("", "-1", ""), "costs.household.perDay.central", /Households, per day, central: give a number from 0 to/],
    ["a cost with one end only", perDay("1", "2", ""), "costs.household.perDay.high", /Households, per day, high/],
    ["costs out of order", perDay("3", "2", "4"), "costs.household.perDay.low", /at most central/],
    ["a detail for residents without what to do", { publicTexts: { uk: { title: "", detail: "Докладно." } } }, "publicTexts.uk.title", /title is missing/],
  ])("refuses %s beside its field, naming what is allowed", (_, over, path, message) => {
    const found = faults(over);
    expect(found.map(([where]) => where)).toContain(path);
    expect(found.find(([where]) => where === path)?.[1]).toMatch(message);
  });
});

describe("costs", () => {
  test("central alone is taken as certain and kept as a plain number", () => {
    expect(CreateMeasureInput.parse(typedMeasure(perDay("", "0.045", ""))).costs).toEqual([{ payer: "household", perDay: 0.045 }]);
  });
  test("three equal figures are certain too", () => {
    expect(CreateMeasureInput.parse(typedMeasure(perDay("7", "7", "7"))).costs).toEqual([{ payer: "household", perDay: 7 }]);
  });
  test("what is passed on is marked as a transfer and stays apart from what is borne", () => {
    const { costs, transfers } = CreateMeasureInput.parse(typedMeasure({ ...perDay("", "5", ""), transfers: { public: { perDay: { low: "", central: "9", high: "" } } } }));
    expect(costs).toEqual([{ payer: "household", perDay: 5 }]);
    expect(transfers).toEqual([{ payer: "public", perDay: 9, transfer: true }]);
  });
});
