import { asc, eq } from "drizzle-orm";
import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { closeDb, db } from "@/db/client";
import { seedCatalogue } from "@/db/demo/catalogue";
import kelmaren from "@/db/demo/kelmaren.json";
import { seedOutbreak } from "@/db/demo/outbreak";
import { measures, outbreaks, packages } from "@/db/schema";
import { toInput } from "@/lib/assessments/to-input";
import { parseAssessmentInput } from "@/lib/engine";
import type { AssessmentInput, MeasureCostInput } from "@/lib/engine/types";
import { LOCALE_CODES } from "@/lib/i18n/locales";
import type { Measure } from "@/lib/measures/queries";
import { legalFindings } from "@/lib/packages/legal-findings";
import { checkPackage } from "@/lib/packages/rules";
import { asStaff } from "../fixtures/assessments";

/** Undoes everything that was done in its transaction. */
class Rollback extends Error {}

let rows: Measure[];
let input: AssessmentInput;
let publicNames: (typeof outbreaks.$inferSelect)["publicNames"];

// Other tests share the database and its codes: the demonstration is written in a transaction that never ends well.
beforeAll(async () => {
  const ctx = await asStaff("adviser");
  await db
    .transaction(async (tx) => {
      await tx.delete(measures);
      const ids = await seedCatalogue({ ...ctx, tx });
      const { outbreakId } = await seedOutbreak({ ...ctx, tx }, ids);
      rows = await tx.select().from(measures).orderBy(asc(measures.code));
      const [outbreak] = await tx.select().from(outbreaks).where(eq(outbreaks.id, outbreakId));
      if (!outbreak?.profile) throw new Error("no outbreak was seeded");
      publicNames = outbreak.publicNames;
      const own = await tx.select().from(packages).where(eq(packages.outbreakId, outbreakId)).orderBy(asc(packages.letter));
      input = toInput({ outbreak: { ...outbreak, profile: outbreak.profile }, packages: own, measures: rows, settings: { draws: 2000, seed: 20270301, horizonDays: 365 } });
      throw new Rollback();
    })
    .catch((error: unknown) => {
      if (!(error instanceof Rollback)) throw error;
    });
});
afterAll(closeDb);

const demo = kelmaren as AssessmentInput;
/** Costs left out are zero: the file says so, and a row keeps no zeros. */
const withZeros = (costs: readonly MeasureCostInput[]) => costs.map((cost) => ({ setUp: 0, perDay: 0, perResidentDay: 0, ...cost }));
const byId = <T extends { id: string }>(list: readonly T[]) => list.toSorted((a, b) => (a.id < b.id ? -1 : 1));

describe("what the demonstration's rows give to the calculation is its file", () => {
  test("measures: numbers exactly, law and ladders too", () => {
    const plain = input.measures.map(({ legalBasis: _, evidence: __, ...measure }) => ({ ...measure, costs: withZeros(measure.costs) }));
    expect(plain).toEqual(byId(demo.measures).map((measure) => ({ ...measure, costs: withZeros(measure.costs) })));
    expect(input.measures.every(({ legalBasis, evidence }) => legalBasis && evidence?.startsWith("Invented"))).toBe(true);
  });
  test("packages: uptake and days exactly, in the order of the file", () => expect(input.packages).toEqual(demo.packages));
  test("the outbreak, but for the notes on its sources", () => {
    const plain = JSON.parse(JSON.stringify(input.outbreak), (key, value) => (key === "source" ? undefined : value));
    expect(plain).toEqual(demo.outbreak);
  });
  test("the settings, and a file that the engine takes", () => {
    expect(input).toMatchObject({ format: demo.format, horizonDays: demo.horizonDays, uncertainty: demo.uncertainty });
    expect(parseAssessmentInput(JSON.parse(JSON.stringify(input)))).toEqual(input);
  });
});

describe("the demonstration's law", () => {
  const items = (letter: string) => (input.packages.find(({ id }) => id === letter)?.items ?? []).map(({ measure, startDay, endDay }) => ({ measureCode: measure, startDay, endDay }));
  test("A and B are lawful; C holds gatherings of ten for 70 days where 56 are lawful", () => {
    expect(legalFindings(items("A"), rows)).toEqual([]);
    expect(legalFindings(items("B"), rows)).toEqual([]);
    expect(legalFindings(items("C"), rows)).toEqual([{ measureCode: "g10", kind: "tooLong", days: 70, allowedDays: 56, withinDays: null }]);
  });
  test("no package stops the calculation, and every start leaves its lead time", () => {
    for (const letter of ["A", "B", "C"]) {
      const scheduled = items(letter).map(({ measureCode, ...days }) => ({ measureId: rows.find(({ code }) => code === measureCode)?.id ?? "", ...days }));
      const codes = checkPackage(scheduled, rows).map(({ code }) => code);
      expect(codes).toContain("ladders");
      expect(codes).toContain("leadTimes");
    }
  });
  test("evening closure: 112 days in any 365, reviewed every 28", () => {
    expect(rows.find(({ code }) => code === "eve")).toMatchObject({ maxDays: 112, maxDaysWithin: 365, reviewEveryDays: 28, legalBasis: "Health Act, s. 12 (3)" });
  });
});

describe("residents' words", () => {
  test.each(LOCALE_CODES)("every measure says in %s what to do, and so does the illness", (locale) => {
    for (const { code, publicTexts } of rows) {
      expect(publicTexts[locale]?.title, `${code} title`).toMatch(/\S/);
      expect(publicTexts[locale]?.detail, `${code} detail`).toMatch(/\S/);
    }
    expect(publicNames[locale]).toMatchObject({ name: expect.stringMatching(/\S/), place: expect.stringMatching(/\S/) });
  });
  test("no two languages share a sentence", () => {
    for (const { code, publicTexts } of rows) {
      const titles = LOCALE_CODES.map((locale) => publicTexts[locale]?.title);
      expect(new Set(titles).size, code).toBe(LOCALE_CODES.length);
    }
  });
  test("scripts are those of their languages", () => {
    for (const { code, publicTexts } of rows) {
      for (const [locale, script] of [["uk", /\p{Script=Cyrillic}/u], ["hi", /\p{Script=Devanagari}/u], ["ar", /\p{Script=Arabic}/u]] as const) {
        expect(publicTexts[locale]?.title, `${code} ${locale}`).toMatch(script);
        expect(publicTexts[locale]?.title, `${code} ${locale}`).not.toMatch(/[A-Za-z]/);
      }
    }
  });
  test("numbers stay the same in every language", () => {
    for (const { code, publicTexts } of rows) {
      const numbers = (text: string | undefined) => text?.match(/\d+(:\d+)?/g) ?? [];
      for (const locale of LOCALE_CODES) expect(numbers(publicTexts[locale]?.title), `${code} ${locale}`).toEqual(numbers(publicTexts.en?.title));
    }
  });
});
