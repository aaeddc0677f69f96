import { z } from "zod";
import type { Locale } from "@/lib/i18n/locales";
import type { LegalFinding } from "@/lib/packages/legal-findings";
import { SNAPSHOT_VERSION } from "./constants";

/** A measure as it stood when the assessment was frozen: what the file format doesn't carry, and residents' words. */
export type MeasureSnapshot = {
  code: string;
  name: string;
  shortName: string;
  instruction: string;
  legalBasis: string;
  legalLink: string;
  evidence: string;
  cutSource: string;
  ladder: string | null;
  leadTimeDays: number;
  limits: { maxDays: number | null; maxDaysWithin: number | null; daysUsed: number | null; reviewEveryDays: number | null };
  publicTexts: Partial<Record<Locale, { title: string; detail: string }>>;
};

export type PackageSnapshot = {
  letter: string;
  name: string;
  /** First day of the earliest item, and first day on which nothing is in force any more; null: never lifted. */
  startDay: number | null;
  endDay: number | null;
  items: { measureCode: string; startDay: number; endDay: number | null }[];
  /** False where the schedule goes against structured law: it may be studied, never delivered. */
  deliverable: boolean;
  legalFindings: LegalFinding[];
};

/** Frozen beside input and result. Read it through `readContext`: older versions keep reading. */
export type ContextSnapshot = {
  snapshotVersion: typeof SNAPSHOT_VERSION;
  assessment: { number: number; title: string };
  outbreak: {
    id: string;
    name: string;
    place: string;
    publicNames: Partial<Record<Locale, { name: string; place: string }>>;
    populationPersons: number;
    dayZero: string;
    currency: string;
    priceYear: number;
    languages: Locale[];
  };
  packages: PackageSnapshot[];
  measures: MeasureSnapshot[];
};

const finding = z.object({ measureCode: z.string(), kind: z.enum(["tooLong", "noEnd"]), days: z.number().nullable(), allowedDays: z.number(), withinDays: z.number().nullable() });
const named = <S extends z.ZodType>(value: S) => z.partialRecord(z.enum(["en", "es", "fr", "uk", "vi", "hi", "ar"]), value);

const ContextV1 = z.object({
  snapshotVersion: z.literal(1),
  assessment: z.object({ number: z.number().int(), title: z.string() }),
  outbreak: z.object({
    id: z.string(),
    name: z.string(),
    place: z.string(),
    publicNames: named(z.object({ name: z.string(), place: z.string() })),
    populationPersons: z.number(),
    dayZero: z.string(),
    currency: z.string(),
    priceYear: z.number(),
    languages: z.array(z.string()),
  }),
  packages: z.array(
    z.object({
      letter: z.string(),
      name: z.string(),
      startDay: z.number().nullable(),
      endDay: z.number().nullable(),
      items: z.array(z.object({ measureCode: z.string(), startDay: z.number(), endDay: z.number().nullable() })),
      deliverable: z.boolean(),
      legalFindings: z.array(finding),
    }),
  ),
  measures: z.array(
    z.object({
      code: z.string(),
      name: z.string(),
      shortName: z.string(),
      instruction: z.string(),
      legalBasis: z.string(),
      legalLink: z.string(),
      evidence: z.string(),
      cutSource: z.string(),
      ladder: z.string().nullable(),
      leadTimeDays: z.number(),
      limits: z.object({
        maxDays: z.number().nullable(),
        maxDaysWithin: z.number().nullable(),
        daysUsed: z.number().nullable(),
        reviewEveryDays: z.number().nullable(),
      }),
      publicTexts: named(z.object({ title: z.string(), detail: z.string() })),
    }),
  ),
});

/**
 * Reads a frozen context. A later version adds its own reader here and turns older ones into the present shape.
 * @throws Error where the text is not a context of a known version
 */
export function readContext(text: string, snapshotVersion: number): ContextSnapshot {
  if (snapshotVersion !== 1) throw new Error(`A context of version ${snapshotVersion} can't be read; known: 1.`);
  // Safe: languages are held to the list of locales when an outbreak is saved, and old ones stay readable.
  return ContextV1.parse(JSON.parse(text)) as ContextSnapshot;
}
