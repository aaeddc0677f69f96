import { describe, expect, test } from "vitest";
import { applyEdit } from "@/lib/assessments/apply-edit";
import { reasonsAgainstFreezing } from "@/lib/assessments/freeze-rules";
import { placeOf } from "@/lib/assessments/recalculation";
import { CreateAssessmentInput, EditAssessmentInput, FreezeAssessmentInput } from "@/lib/assessments/schema";
import { toContext } from "@/lib/assessments/to-context";
import { type SourceMeasure, type SourcePackage, toInput } from "@/lib/assessments/to-input";
import { canonicalJson } from "@/lib/canonical-json";
import { DomainError } from "@/lib/errors";

const ID = "6f9619ff-8b86-4011-b42d-00c04fc964ff";
const M1 = "6f9619ff-8b86-4011-b42d-00c04fc964f1";
const M2 = "6f9619ff-8b86-4011-b42d-00c04fc964f2";
const quantity = { low: 1, central: 2, high: 3 };
const outbreak = {
  id: ID, name: "Sedge fever", place: "Kelmaren", populationPersons: 412_000, currency: "EUR", priceYear: 2027, dayZero: "2027-03-01", languages: ["en" as const], publicNames: {},
  profile: {
    infectious: quantity, removed: { low: 0, central: 0, high: 0 }, transmission: { given: "reproductionNumber" as const, value: quantity },
    infectiousPeriodDays: quantity, latentPeriodDays: null, infectionFatality: { low: 0.001, central: 0.002, high: 0.003 },
  },
};
const measure = (id: string, code: string): SourceMeasure => ({
  id, code, name: `Measure ${code}`, shortName: code, instruction: "", cut: { low: 0.1, central: 0.2, high: 0.3 }, evidence: "", legalBasis: "", legalLink: "", ladder: null, leadTimeDays: 0,
  maxDays: code === "b" ? 30 : null, maxDaysWithin: null, daysUsed: null, reviewEveryDays: null, costs: [], publicTexts: {},
});
const measures = [measure(M2, "b"), measure(M1, "a")];
const packages: SourcePackage[] = [
  { id: "p1", letter: "A", name: "Light", version: 3, items: [{ measureId: M1, uptake: 0.7, startDay: 7, endDay: 77 }] },
  { id: "p2", letter: "B", name: "Long", version: 1, items: [{ measureId: M2, uptake: { low: 0.5, central: 0.6, high: 0.7 }, startDay: 0, endDay: null }] },
];
const typed = (over: Record<string, unknown> = {}) => ({
  id: ID, version: "1", title: " Two packages ", packageLetters: ["B", "A"], draws: "2 000", seed: "20270301", horizonDays: "365", dayZero: "2027-03-01",
  packages: [
    { letter: "A", version: "3", shiftDays: "0", items: [{ measureId: M1, uptakePercent: "70", from: "2027-03-08", to: "2027-05-16" }] },
    { letter: "B", version: "1", shiftDays: "0", items: [{ measureId: M2, from: "2027-03-01", to: "" }] },
  ],
  ...over,
});
const issues = (raw: unknown) => {
  const parsed = EditAssessmentInput.safeParse(raw);
  return parsed.success ? [] : parsed.error.issues.map(({ path, message }) => `${path.join(".")}: ${message}`);
};

describe("what is typed", () => {
  test("unchanged fields give back the stored rows to the byte", () => {
    const edit = EditAssessmentInput.parse(typed());
    const sources = applyEdit({ outbreak, measures }, packages, edit);
    expect(sources.packages).toEqual(packages);
    expect(sources.settings).toEqual({ draws: 2000, seed: 20270301, horizonDays: 365 });
    expect(canonicalJson(toInput(sources))).toBe(canonicalJson(toInput({ outbreak, measures, packages, settings: sources.settings })));
  });
  test("parsing what was parsed changes nothing", () => {
    const once = EditAssessmentInput.parse(typed());
    expect(EditAssessmentInput.parse(once)).toEqual(once);
  });
  test("the last day in force is in force: its day after is the file's end", () => {
    const edit = EditAssessmentInput.parse(typed({ packages: [{ letter: "A", version: 3, shiftDays: "−7", items: [{ measureId: M1, uptakePercent: "57,3", from: "2027-03-15", to: "2027-03-15" }] }] }));
    const [a] = applyEdit({ outbreak, measures }, packages, edit).packages;
    expect(a?.items[0]).toEqual({ measureId: M1, uptake: 0.573, startDay: 7, endDay: 8 });
  });
  test.each([
    ["draws below the range", { draws: "99" }, "draws: Must be a whole number from 100 to 100,000."],
    ["draws that are no number", { draws: "many" }, "draws: Must be a whole number from 100 to 100,000."],
    ["draws left empty", { draws: "" }, "draws: Must be a whole number from 100 to 100,000."],
    ["a fraction of a day", { horizonDays: "30.5" }, "horizonDays: Must be a whole number from 30 to 3,650."],
    ["no package", { packageLetters: [] }, "packageLetters: Choose 1 to 8 packages. “No further measures” is always there."],
    ["no title", { title: "  " }, "title: Give the assessment a title."],
  ])("names field and range for %s", (_, over, expected) => expect(issues(typed(over))).toEqual([expected]));
  test.each([
    ["before day 0", { from: "2027-02-28" }, "packages.0.items.0.from: Must be on or after day 0, 2027-03-01."],
    ["an end before its start", { to: "2027-03-07" }, "packages.0.items.0.to: Must be on or after the first day in force, 2027-03-08."],
    ["no first day", { from: "" }, "packages.0.items.0.from: Give the first day in force."],
    ["an uptake above 100", { uptakePercent: "101" }, "packages.0.items.0.uptakePercent: Must be a number from 0 to 100."],
    ["a day that doesn't exist", { from: "2027-02-30" }, "packages.0.items.0.from: Must be a date, year-month-day."],
  ])("names the line for %s", (_, over, expected) => {
    const line = { measureId: M1, uptakePercent: "70", from: "2027-03-08", to: "2027-05-16", ...over };
    expect(issues(typed({ packages: [{ letter: "A", version: 3, shiftDays: 0, items: [line] }] }))).toEqual([expected]);
  });
  test("a move before day 0 is refused at the line that it hits", () => {
    const line = { measureId: M1, uptakePercent: "70", from: "2027-03-08", to: "2027-05-16" };
    expect(issues(typed({ packages: [{ letter: "A", version: 3, shiftDays: "-8", items: [line] }] }))).toEqual(["packages.0.items.0.from: Must be on or after day 0, 2027-03-01, moved dates included."]);
  });
  test("one chosen package posts as one value", () => expect(EditAssessmentInput.parse(typed({ packageLetters: "A" })).packageLetters).toEqual(["A"]));
  test("the reason for freezing is asked for in words", () => {
    expect(FreezeAssessmentInput.safeParse({ id: ID, version: 1, reason: "now" }).error?.issues[0]?.message).toBe("Say why it is frozen now, in 10 to 1,000 characters.");
  });
  test("creating asks for the same ranges", () => {
    expect(CreateAssessmentInput.safeParse({ outbreakId: ID, title: "x", packageLetters: "A", draws: "100001", seed: "1", horizonDays: "365" }).error?.issues[0]?.message).toBe("Must be a whole number from 100 to 100,000.");
  });
});

describe("conflicts", () => {
  const refusal = (over: Record<string, unknown>) => {
    try {
      applyEdit({ outbreak, measures }, packages, EditAssessmentInput.parse(typed(over)));
      return null;
    } catch (error) {
      return error instanceof DomainError ? error.code : error;
    }
  };
  const line = { measureId: M1, uptakePercent: "70", from: "2027-03-08", to: "2027-05-16" };
  test.each([
    ["a package saved meanwhile", { packages: [{ letter: "A", version: 2, items: [line] }] }],
    ["another number of lines", { packages: [{ letter: "A", version: 3, items: [line, line] }] }],
    ["another measure in a line", { packages: [{ letter: "A", version: 3, items: [{ ...line, measureId: M2 }] }] }],
    ["a package that is gone", { packageLetters: ["C"] }],
    ["another day 0", { dayZero: "2027-02-01", packages: [] }],
  ])("%s is a conflict", (_, over) => expect(refusal(over)).toBe("conflict"));
});

describe("input and context", () => {
  const sources = { outbreak, measures, packages, settings: { draws: 200, seed: 1, horizonDays: 365 } };
  test("measures come in the order of their codes, only those that are named", () => {
    expect(toInput(sources).measures.map(({ id }) => id)).toEqual(["a", "b"]);
    expect(toInput({ ...sources, packages: packages.slice(0, 1) }).measures.map(({ id }) => id)).toEqual(["a"]);
  });
  test("a limited measure without an end makes its package undeliverable, and says why", () => {
    const { packages: found } = toContext(sources, { number: 1, title: "t" });
    expect(found.map(({ letter, startDay, endDay, deliverable }) => ({ letter, startDay, endDay, deliverable }))).toEqual([
      { letter: "A", startDay: 7, endDay: 77, deliverable: true },
      { letter: "B", startDay: 0, endDay: null, deliverable: false },
    ]);
    expect(found[1]?.legalFindings).toEqual([{ measureCode: "b", kind: "noEnd", days: null, allowedDays: 30, withinDays: null }]);
  });
});

describe("reasons against freezing", () => {
  const sound = { converged: true, integratorDifferencePersons: 1e-9, integratorAllowedPersons: 0.4, settledResidual: 0, refusedDraws: 0 };
  test.each([
    ["sound", sound, [{ items: [1] }], []],
    ["not converged", { ...sound, converged: false }, [{ items: [1] }], ["notConverged"]],
    ["integrators at the limit", { ...sound, integratorDifferencePersons: 0.4 }, [{ items: [1] }], []],
    ["integrators beyond it", { ...sound, integratorDifferencePersons: 0.41 }, [{ items: [1] }], ["integratorsDiffer"]],
    ["no number", { ...sound, integratorDifferencePersons: Number.NaN }, [{ items: [1] }], ["integratorsDiffer"]],
    ["nothing to compare", sound, [], ["noPackages"]],
    ["an empty package", sound, [{ items: [1] }, { items: [] }], ["emptyPackage"]],
  ])("%s", (_, diagnostics, chosen, expected) => expect(reasonsAgainstFreezing(diagnostics, chosen)).toEqual(expected));
});

test("a fault's path is told in the reader's terms", () => {
  const input = { packages: [{ id: "A", items: [{ measure: "x" }] }], measures: [{ id: "x", name: "Masks" }] };
  expect(placeOf("packages[0].items[0].endDay", input)).toEqual({ letter: "A", measure: "Masks" });
  expect(placeOf("packages[0].id", input)).toEqual({ letter: "A" });
  expect(placeOf("measures[0].cut", input)).toEqual({ measure: "Masks" });
  expect(placeOf("outbreak.population", input)).toEqual({});
});
