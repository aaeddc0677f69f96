import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { measureFacts } from "@/app/(desk)/desk/measures/_facts";
import { typedMeasure as typedAgain } from "@/app/(desk)/desk/measures/_typed-measure";
import { parseAssessmentInput } from "@/lib/engine";
import type { MeasureCostInput, Payer } from "@/lib/engine/types";
import type { Measure } from "@/lib/measures/queries";
import { CreateMeasureInput } from "@/lib/measures/schema";
import { toEngineMeasure } from "@/lib/measures/to-engine-measure";
import { typedMeasure } from "../../fixtures/measures";

const row = (over: Partial<Measure> = {}): Measure => ({
  id: "0b8f6d0e-1111-4222-8333-444455556666", code: "eve", name: "Indoor venues close at 20:00", shortName: "close 20:00", instruction: "Leave by 20:00.",
  cut: { low: 0.09, central: 0.16, high: 0.23, source: "invented" }, evidence: "Invented.", legalBasis: "Act, s. 12", legalLink: "https://law.example.org/act", ladder: null,
  maxDays: 112, maxDaysWithin: 365, daysUsed: null, reviewEveryDays: 28, leadTimeDays: 4, costs: [], publicTexts: {}, archived: false, version: 3, createdBy: "x",
  createdAt: new Date(0), updatedAt: new Date(0), ...over,
});
const share = (percent: number) => Number((percent / 100).toPrecision(15));

/** Shares that a person can type in per cent: up to nine digits after the point. */
const typableShare = fc.integer({ min: -999_999_999, max: 999_999_998 }).map((n) => Number(`${n}e-9`));
const cutArbitrary = fc.tuple(typableShare, typableShare, typableShare).map(([a, b, c]) => {
  const [low, central, high] = [a, b, c].sort((x, y) => x - y) as [number, number, number];
  return { low, central, high, source: "invented" };
});
const amount = fc.integer({ min: 0, max: 1e12 }).map((n) => Number(`${n}e-4`));
const quantity = fc.oneof(amount, fc.tuple(amount, amount, fc.integer({ min: 1, max: 1000 })).map(([a, b, more]) => ({ low: Math.min(a, b), central: Math.max(a, b), high: Math.max(a, b) + more })));
const lineArbitrary = (payer: Payer, transfer: boolean) =>
  fc.record({ setUp: quantity, perDay: quantity, perResidentDay: quantity }, { requiredKeys: ["perDay"] }).map((line): MeasureCostInput => ({ payer, ...line, ...(transfer ? { transfer: true } : {}) }));

describe("a row, its form and back", () => {
  test("showing a row in the form and saving it unchanged changes nothing", () => {
    fc.assert(
      fc.property(cutArbitrary, lineArbitrary("public", false), lineArbitrary("business", true), (cut, borne, passedOn) => {
        const shown = measureFacts(row({ cut, costs: [borne, passedOn] }));
        const parsed = CreateMeasureInput.parse({ ...shown, id: undefined, version: undefined });
        const { low, central, high, source } = parsed.cutPercent;
        expect({ low: share(low), central: share(central), high: share(high), source }).toEqual(cut);
        expect([...parsed.costs, ...parsed.transfers]).toEqual([borne, passedOn]);
      }),
    );
  });

  test("the command reads a parsed form as the form was typed", () => {
    const once = CreateMeasureInput.parse(typedMeasure({ transfers: { public: { perDay: { low: "1", central: "2", high: "3" } } }, ladder: "gatherings" }));
    expect(CreateMeasureInput.parse(typedAgain(once))).toEqual(once);
  });
});

describe("a row as the assessment file's measure", () => {
  test("its code is the id; law and evidence go with it", () => {
    expect(toEngineMeasure(row({ daysUsed: 12, ladder: "venues" }))).toEqual({
      id: "eve", name: "Indoor venues close at 20:00", cut: { low: 0.09, central: 0.16, high: 0.23, source: "invented" }, ladder: "venues",
      maxDays: 112, maxDaysWithin: 365, daysUsed: 12, reviewEveryDays: 28, costs: [], legalBasis: "Act, s. 12", evidence: "Invented.",
    });
  });

  test("what the row leaves open stays out of the file, and the file is accepted", () => {
    const measure = toEngineMeasure(row({ maxDays: null, maxDaysWithin: null, reviewEveryDays: null, legalBasis: "", evidence: "" }));
    expect(Object.keys(measure).sort()).toEqual(["costs", "cut", "id", "ladder", "maxDays", "name"]);
    const input = {
      format: "ebbmark.assessment-input/1",
      outbreak: { name: "Sedge fever", place: "Kelmaren", dayZero: "2027-03-01", population: 1000, infectious: 5, transmission: { given: "reproductionNumber", value: 2 }, infectiousPeriod: 6, latentPeriod: null, infectionFatality: 0.01, currency: "EUR", priceYear: 2027 },
      measures: [measure, toEngineMeasure(row({ code: "full", daysUsed: 3, costs: [{ payer: "public", perDay: 9, transfer: true }] }))],
      packages: [{ id: "A", name: "One", items: [{ measure: "eve", startDay: 0, endDay: null }] }],
      uncertainty: null,
    };
    expect(parseAssessmentInput(input)).toMatchObject({ measures: [{ id: "eve" }, { id: "full" }] });
  });
});
