import { z } from "zod";
import { LIMITS } from "../engine/limits";
import type { MeasureCostInput, Payer } from "../engine/types";
import { LOCALE_CODES } from "../i18n/locales";
import { numberIn, optionalQuantityIn, quantityIn } from "../outbreaks/quantity";

const words = (label: string, max: number, min = 0) =>
  z
    .string(min ? `${label} is missing. Give ${min} to ${max} characters.` : undefined)
    .trim()
    .min(min, `${label} is missing. Give ${min} to ${max} characters.`)
    .max(max, `${label} must have at most ${max} characters.`);
const optionalWords = (label: string, max: number) => words(label, max).optional().transform((value) => value ?? "");
const days = (label: string) => ({ label, min: 1, max: LIMITS.dayMax, unit: "days", whole: true });
const optionalDays = (label: string, min = 1) =>
  z.preprocess((raw) => (raw === "" || raw === null ? undefined : raw), numberIn({ ...days(label), min }).optional()).transform((value) => value ?? null);

export const PAYERS = ["public", "business", "household"] as const satisfies readonly Payer[];
export const COST_KINDS = ["setUp", "perDay", "perResidentDay"] as const;
const PAYER_WORDS = { public: "Public purse", business: "Businesses", household: "Households" } as const;
const COST_WORDS = { setUp: "set-up", perDay: "per day", perResidentDay: "per resident and day" } as const;

type CostKind = (typeof COST_KINDS)[number];
const costsOf = (transfer: boolean) => {
  const line = (payer: Payer) => {
    const label = (kind: CostKind) => `${PAYER_WORDS[payer]}, ${transfer ? "passed on, " : ""}${COST_WORDS[kind]}`;
    const shape = Object.fromEntries(COST_KINDS.map((kind) => [kind, optionalQuantityIn({ label: label(kind), min: 0, max: LIMITS.costMax })]));
    return z.object(shape as Record<CostKind, ReturnType<typeof optionalQuantityIn>>).optional();
  };
  return z
    .object(Object.fromEntries(PAYERS.map((payer) => [payer, line(payer)])) as Record<Payer, ReturnType<typeof line>>)
    .optional()
    .transform((record) =>
      PAYERS.flatMap((payer): MeasureCostInput[] => {
        const filled = COST_KINDS.flatMap((kind) => (record?.[payer]?.[kind] === undefined ? [] : [[kind, record[payer][kind]] as const]));
        return filled.length ? [{ payer, ...Object.fromEntries(filled), ...(transfer ? { transfer: true } : {}) }] : [];
      }),
    );
};

const facts = {
  code: z
    .string("Code is missing. Give 1 to 32 small letters, digits or hyphens.")
    .trim()
    .regex(/^[a-z0-9][a-z0-9-]{0,31}$/, "Code: give 1 to 32 small letters, digits or hyphens, beginning with a letter or digit."),
  name: words("Name", 200, 1),
  shortName: words("Short name", 24, 1),
  instruction: words("What people must do", 500, 1),
  cutPercent: quantityIn({ label: "Cut in transmission", min: LIMITS.cutMin * 100, max: 100, below: 100, unit: "%" }),
  evidence: optionalWords("Evidence", 10_000),
  legalBasis: optionalWords("Legal basis", 2000),
  legalLink: optionalWords("Link to the law", 500).refine((value) => value === "" || /^https?:\/\/\S+$/.test(value), "Link to the law: give an address that begins with https://, or leave it empty."),
  ladder: optionalWords("Ladder", 64).transform((value) => value || null),
  maxDays: optionalDays("Longest lawful duration"),
  maxDaysWithin: optionalDays("In any how many days"),
  daysUsed: optionalDays("Days already used", 0),
  reviewEveryDays: optionalDays("Review every"),
  leadTimeDays: z.preprocess((raw) => (raw === "" || raw === undefined ? 0 : raw), numberIn({ ...days("Lead time"), min: 0, max: 365 })),
  costs: costsOf(false),
  /** Paid on by one payer to another: shown, never in the total. */
  transfers: costsOf(true),
  publicTexts: z
    .partialRecord(z.enum(LOCALE_CODES), z.object({ title: words("Words for residents, title", 160).optional(), detail: words("Words for residents, detail", 300).optional() }))
    .superRefine((record, context) => {
      for (const [locale, value] of Object.entries(record)) {
        if (!value?.title && value?.detail) context.addIssue({ code: "custom", path: [locale, "title"], message: "Words for residents, title is missing where there is a detail. Give 1 to 160 characters." });
      }
    })
    .optional()
    .transform((record) => Object.fromEntries(Object.entries(record ?? {}).flatMap(([locale, value]) => (value?.title ? [[locale, { title: value.title, detail: value.detail ?? "" }]] : [])))),
};

const windowNeedsLimit = {
  check: ({ maxDays, maxDaysWithin }: { maxDays: number | null; maxDaysWithin: number | null }) => maxDaysWithin === null || (maxDays !== null && maxDaysWithin >= maxDays),
  params: { path: ["maxDaysWithin"], message: "In any how many days: needs a longest lawful duration, and must be at least as long as it." },
};

export const CreateMeasureInput = z.object(facts).refine(windowNeedsLimit.check, windowNeedsLimit.params);
export const UpdateMeasureInput = z.object({ id: z.uuid(), version: z.coerce.number().int(), ...facts }).refine(windowNeedsLimit.check, windowNeedsLimit.params);
export const ArchiveMeasureInput = z.object({ id: z.uuid(), archived: z.enum(["yes", "no"]) });
