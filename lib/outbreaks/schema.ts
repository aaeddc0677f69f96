import { z } from "zod";
import { LIMITS } from "../engine/limits";
import { LOCALE_CODES } from "../i18n/locales";
import { CURRENCIES, TRANSMISSION_WAYS } from "./constants";
import { numberIn, quantityIn } from "./quantity";

const words = (label: string, max: number) =>
  z.string(`${label} is missing. Give 1 to ${max} characters.`).trim().min(1, `${label} is missing. Give 1 to ${max} characters.`).max(max, `${label} must have at most ${max} characters.`);

export const isoDate = (label: string) =>
  z.string(`${label}: give a calendar date, year-month-day.`).refine((value) => {
    const date = new Date(`${value}T00:00:00Z`);
    return /^\d{4}-\d{2}-\d{2}$/.test(value) && !Number.isNaN(date.getTime()) && date.toISOString().startsWith(value);
  }, `${label}: give a calendar date, year-month-day.`);

const facts = {
  name: words("Illness", 200),
  place: words("Place", 200),
  populationPersons: numberIn({ label: "Population", above: 0, max: LIMITS.populationMax, unit: "persons", whole: true }),
  currency: z.enum(CURRENCIES, "Currency: choose one of the list (ISO 4217)."),
  priceYear: numberIn({ label: "Price year", min: 1900, max: 2200, whole: true }),
  dayZero: isoDate("Day 0"),
  languages: z
    .preprocess((raw) => (typeof raw === "string" ? [raw] : raw), z.array(z.enum(LOCALE_CODES), "Languages: choose at least English."))
    .refine((list) => list.includes("en"), "Languages: English must be among them; it is the language that the others are translated from."),
  publicNames: z
    .partialRecord(z.enum(LOCALE_CODES), z.object({ name: z.string().trim().max(200).optional(), place: z.string().trim().max(200).optional() }))
    .optional()
    .transform((record) =>
      Object.fromEntries(Object.entries(record ?? {}).flatMap(([locale, value]) => (value?.name && value.place ? [[locale, { name: value.name, place: value.place }]] : []))),
    ),
};

export const CreateOutbreakInput = z.object(facts);
export const UpdateOutbreakInput = z.object({ id: z.uuid(), version: z.coerce.number().int(), ...facts });

const persons = (label: string) => ({ label, min: 0, max: LIMITS.populationMax, unit: "persons" });
const period = (label: string) => ({ label, min: LIMITS.periodDaysMin, max: LIMITS.periodDaysMax, unit: "days" });
const ratio = { min: LIMITS.transmissionMin, max: LIMITS.reproductionNumberMax };

const TRANSMISSION_RANGE = {
  rate: { label: "Transmission rate β", min: LIMITS.transmissionMin, max: LIMITS.rateMax, unit: "per day" },
  reproductionNumber: { label: "Basic reproduction number", ...ratio },
  effectiveReproductionNumber: { label: "Effective reproduction number", ...ratio },
  growthRate: { label: "Growth rate", min: -100, max: 100, unit: "per day" },
  doublingTime: { label: "Doubling time", min: LIMITS.periodDaysMin, max: LIMITS.periodDaysMax, unit: "days" },
} as const;

const transmission = z.discriminatedUnion(
  "given",
  TRANSMISSION_WAYS.map((given) => z.object({ given: z.literal(given), value: quantityIn(TRANSMISSION_RANGE[given]) })) as unknown as [z.ZodObject<{ given: z.ZodLiteral<(typeof TRANSMISSION_WAYS)[number]>; value: ReturnType<typeof quantityIn> }>],
  { error: "Transmission: choose one of the five ways." },
);

/** The profile as typed; `exposedGiven` and `latentStage` decide whether their figures are read at all. */
export const SaveProfileInput = z
  .object({
    id: z.uuid(),
    version: z.coerce.number().int(),
    transmission,
    infectiousPeriodDays: quantityIn(period("Infectious period")),
    latentStage: z.enum(["yes", "no"], "Latent stage: choose yes or no."),
    latentPeriodDays: z.unknown().optional(),
    infectionFatalityPercent: quantityIn({ label: "Infection fatality", min: 0, max: 100, unit: "%" }),
    infectious: quantityIn(persons("Infectious on day 0")),
    removed: quantityIn(persons("Removed or immune before day 0")),
    exposedGiven: z.enum(["growth", "given"], "Latent on day 0: choose one of the two ways."),
    exposed: z.unknown().optional(),
  })
  .transform(({ latentPeriodDays, exposed, ...rest }, context) => {
    const read = <T extends z.ZodType>(schema: T, value: unknown, path: string): z.output<T> | null => {
      const parsed = schema.safeParse(value ?? {});
      if (parsed.success) return parsed.data;
      for (const issue of parsed.error.issues) context.addIssue({ code: "custom", path: [path, ...issue.path], message: issue.message });
      return null;
    };
    const latent = rest.latentStage === "yes";
    return {
      ...rest,
      latentPeriodDays: latent ? read(quantityIn(period("Latent period")), latentPeriodDays, "latentPeriodDays") : null,
      exposed: latent && rest.exposedGiven === "given" ? read(quantityIn(persons("Latent on day 0")), exposed, "exposed") : null,
    };
  })
  .refine(({ infectious, exposed }) => infectious.central + (exposed?.central ?? 0) > 0, {
    path: ["infectious", "central"],
    message: "Infectious on day 0, central: must be above 0 where nobody is latent; without anybody infected there is no outbreak.",
  });
