import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { typedPackage } from "@/app/(desk)/desk/outbreaks/[outbreakId]/packages/_typed-package";
import { dateOf, dayOf } from "@/lib/packages/days";
import { phaseFactors } from "@/lib/packages/phase-factors";
import { CreatePackageInput, DeletePackageInput, UpdatePackageInput } from "@/lib/packages/schema";
import { toEnginePackage } from "@/lib/packages/to-engine-package";

const measureId = "0b8f6d0e-1111-4222-8333-444455556666";
const line = (over: Record<string, unknown> = {}) => ({ measureId, included: "on", uptakePercent: { low: "", central: "95", high: "" }, from: "2027-06-07", until: "2027-09-12", ...over });
const form = (lines: unknown[], over: Record<string, unknown> = {}) => ({ id: measureId, version: "2", name: "Evening closure", dayZero: "2027-03-01", lines, ...over });
const faults = (raw: unknown) => {
  const parsed = UpdatePackageInput.safeParse(raw);
  return parsed.success ? [] : parsed.error.issues.map(({ path, message }) => [path.join("."), message] as const);
};

describe("days and dates", () => {
  test.each([
    ["2027-03-01", 0],
    ["2027-02-28", -1],
    ["2027-03-28", 27],
    ["2027-06-07", 98],
    ["2027-09-13", 196],
    ["2028-02-29", 365],
    ["2028-03-01", 366],
  ])("%s is day %i of 1 March 2027", (iso, day) => {
    expect(dayOf("2027-03-01", iso)).toBe(day);
    expect(dateOf("2027-03-01", day)).toBe(iso);
  });
  test("a day and its date are each other's inverse", () => {
    fc.assert(fc.property(fc.integer({ min: -40_000, max: 40_000 }), fc.integer({ min: 0, max: 36_500 }), (shift, day) => {
      const zero = dateOf("2027-03-01", shift);
      expect(dayOf(zero, dateOf(zero, day))).toBe(day);
    }));
  });
  test("a part of a day belongs to its day", () => expect(dateOf("2027-03-01", 6.9)).toBe("2027-03-07"));
});

describe("a schedule as typed", () => {
  test("lines that aren't ticked are left out, whatever stands in them", () => {
    expect(UpdatePackageInput.parse(form([line({ included: "", from: "never", uptakePercent: { central: "x" } }), line()])).lines).toEqual([null, { measureId, uptakePercent: 95, from: "2027-06-07", until: "2027-09-12" }]);
  });
  test("“never lifted” wins over a last day", () => {
    expect(UpdatePackageInput.parse(form([line({ never: "on" })])).lines?.[0]).toMatchObject({ until: null });
  });
  test("uptake may have a low and a high end", () => {
    expect(UpdatePackageInput.parse(form([line({ uptakePercent: { low: "60", central: "70", high: "82.5" } })])).lines?.[0]).toMatchObject({ uptakePercent: { low: 60, central: 70, high: 82.5 } });
  });
  test("the first and the last lawful corner are accepted", () => {
    expect(faults(form([line({ uptakePercent: { central: "0" }, from: "2027-03-01", until: "2027-03-01" }), line({ uptakePercent: { central: "100" }, from: dateOf("2027-03-01", 36_499), until: dateOf("2027-03-01", 36_499) })]))).toEqual([]);
  });
  test.each([
    ["no uptake", { uptakePercent: { central: "" } }, "lines.0.uptakePercent.central", /Uptake, central: give a number from 0 to 100 %/],
    ["uptake above 100 %", { uptakePercent: { central: "101" } }, "lines.0.uptakePercent.central", /from 0 to 100 %/],
    ["uptake below 0", { uptakePercent: { central: "-1" } }, "lines.0.uptakePercent.central", /from 0 to 100 %/],
    ["uptake out of order", { uptakePercent: { low: "80", central: "70", high: "90" } }, "lines.0.uptakePercent.low", /low must be at most central/],
    ["uptake with one end", { uptakePercent: { low: "60", central: "70", high: "" } }, "lines.0.uptakePercent.high", /Uptake, high/],
    ["no first day", { from: "" }, "lines.0.from", /First day in force: give a calendar date/],
    ["a day that no month has", { from: "2027-02-30" }, "lines.0.from", /calendar date/],
    ["a start before day 0", { from: "2027-02-28" }, "lines.0.from", /must be day 0, 2027-03-01, or later/],
    ["a start a century on", { from: "2128-01-01", until: "2128-02-01" }, "lines.0.from", /within 36,500 days/],
    ["no end and not “never lifted”", { until: "" }, "lines.0.until", /tick “never lifted”/],
    ["an end before the start", { until: "2027-06-06" }, "lines.0.until", /must be the first day in force or later/],
    ["an end a century on", { until: "2128-01-01" }, "lines.0.until", /within 36,500 days/],
  ])("refuses %s beside its field", (_, over, path, message) => {
    const found = faults(form([line(over)]));
    expect(found.map(([where]) => where)).toContain(path);
    expect(found.find(([where]) => where === path)?.[1]).toMatch(message);
  });
  test("refuses more than 40 measures, but not a long catalogue", () => {
    expect(faults(form(Array.from({ length: 41 }, () => line())))).toEqual([["lines", "A package holds at most 40 measures. Untick some."]]);
    expect(faults(form(Array.from({ length: 90 }, (_, index) => line(index < 40 ? {} : { included: "" }))))).toEqual([]);
  });
  test("the command reads a parsed form as the form was typed", () => {
    const once = UpdatePackageInput.parse(form([line({ included: "" }), line(), line({ never: "on", uptakePercent: { low: "1", central: "2", high: "3" } })]));
    expect(UpdatePackageInput.parse(typedPackage(once))).toEqual({ ...once, lines: once.lines?.filter((each) => each !== null) });
  });
  test("names, and the tick before a removal, are asked for", () => {
    expect(CreatePackageInput.safeParse({ outbreakId: measureId, name: " " }).error?.issues[0]?.message).toMatch(/Give 1 to 60 characters/);
    expect(CreatePackageInput.safeParse({ outbreakId: measureId, name: "x".repeat(61) }).error?.issues[0]?.message).toMatch(/at most 60/);
    expect(DeletePackageInput.safeParse({ id: measureId }).error?.issues[0]?.message).toMatch(/Tick the box/);
  });
});

describe("a schedule in the calculation", () => {
  test("the letter is the package's id and codes name its measures", () => {
    const row = { letter: "B", name: "Evening closure", items: [{ measureId, uptake: { low: 0.6, central: 0.7, high: 0.8 }, startDay: 7, endDay: null }] };
    expect(toEnginePackage(row, new Map([[measureId, "eve"]]))).toEqual({ id: "B", name: "Evening closure", items: [{ measure: "eve", uptake: { low: 0.6, central: 0.7, high: 0.8 }, startDay: 7, endDay: null }] });
    expect(() => toEnginePackage(row, new Map())).toThrow(/unknown measure/);
  });

  test("each phase multiplies what is left by the measures in force", () => {
    const measures = [{ id: "a", shortName: "sick leave", cut: { central: 0.18 } }, { id: "b", shortName: "masks", cut: { central: 0.14 } }];
    const phases = phaseFactors([{ measureId: "a", uptake: 0.7, startDay: 7, endDay: 217 }, { measureId: "b", uptake: { low: 0.5, central: 0.8, high: 0.9 }, startDay: 98, endDay: 196 }], measures);
    expect(phases.map(({ fromDay, names }) => [fromDay, names])).toEqual([[0, []], [7, ["sick leave"]], [98, ["sick leave", "masks"]], [196, ["sick leave"]], [217, []]]);
    const a = 1 - 0.7 * 0.18;
    const b = 1 - 0.8 * 0.14;
    for (const [index, factor] of [1, a, a * b, a, 1].entries()) expect(phases[index]?.factor).toBeCloseTo(factor, 15);
  });
});
