import { z } from "zod";
import { domainFaults } from "./domain";
import { EngineError, type Fault } from "./errors";
import { LIMITS } from "./limits";
import { inWords } from "./numeric";
import type { AssessmentInput, TransmissionGiven } from "./types";

/** Range of a number or quantity, with the words of its refusal. */
type Range = { min?: number; above?: number; max?: number; below?: number; what?: string };

function allowed({ min, above, max, below }: Range): string {
  const low = min !== undefined ? `at least ${inWords(min)}` : above !== undefined ? `above ${inWords(above)}` : "";
  const high = max !== undefined ? `at most ${inWords(max)}` : below !== undefined ? `below ${inWords(below)}` : "";
  return `must be ${[low, high].filter(Boolean).join(" and ")}`;
}
const inside = (value: number, { min, above, max, below }: Range) =>
  Number.isFinite(value) &&
  (min === undefined || value >= min) &&
  (above === undefined || value > above) &&
  (max === undefined || value <= max) &&
  (below === undefined || value < below);

const number = (range: Range) => z.number(`${range.what ?? "must be a number"}; ${allowed(range)}`).refine((value) => inside(value, range), allowed(range));
const whole = (range: Range) => number(range).refine(Number.isInteger, "must be a whole number");
const text = (max: number, min = 1) => z.string("must be text").min(min, `must have ${min} character${min === 1 ? "" : "s"} or more`).max(max, `must have at most ${max} characters`);

const quantity = (range: Range) =>
  z.union(
    [
      number(range),
      z
        .strictObject({ low: number(range), central: number(range), high: number(range), source: text(2000, 0).optional() })
        .refine(({ low, central, high }) => low <= central && central <= high, "must be in order: low at most central, central at most high"),
    ],
    { error: `must be a number or {"low", "central", "high"}; ${allowed(range)}` },
  );

const persons: Range = { min: 0, max: LIMITS.populationMax };
const share: Range = { min: 0, max: 1 };
const period: Range = { min: LIMITS.periodDaysMin, max: LIMITS.periodDaysMax };
const cost: Range = { min: 0, max: LIMITS.costMax };

/** What may be given, per way of giving transmission. */
export const TRANSMISSION_RANGE: Record<TransmissionGiven, Range> = {
  rate: { min: LIMITS.transmissionMin, max: LIMITS.rateMax },
  reproductionNumber: { min: LIMITS.transmissionMin, max: LIMITS.reproductionNumberMax },
  effectiveReproductionNumber: { min: LIMITS.transmissionMin, max: LIMITS.reproductionNumberMax },
  growthRate: { min: -LIMITS.growthRateMax, max: LIMITS.growthRateMax },
  doublingTime: { min: LIMITS.periodDaysMin, max: LIMITS.periodDaysMax },
};

const isoDate = z.string("must be a date").refine((value) => {
  const date = new Date(`${value}T00:00:00Z`);
  return /^\d{4}-\d{2}-\d{2}$/.test(value) && !Number.isNaN(date.getTime()) && date.toISOString().startsWith(value);
}, "must be a calendar date, yyyy-mm-dd");

const transmission = z
  .strictObject({
    given: z.enum(Object.keys(TRANSMISSION_RANGE) as TransmissionGiven[], `must be one of ${Object.keys(TRANSMISSION_RANGE).join(", ")}`),
    value: quantity({ min: -LIMITS.growthRateMax, max: LIMITS.growthRateMax }),
  })
  .superRefine(({ given, value }, context) => {
    const range = TRANSMISSION_RANGE[given];
    const ends = typeof value === "number" ? [value] : [value.low, value.central, value.high];
    if (!ends.every((end) => inside(end, range))) context.addIssue({ code: "custom", path: ["value"], message: allowed(range) });
  });

const measureCost = z.strictObject({
  payer: z.enum(["public", "business", "household"], "must be one of public, business, household"),
  setUp: quantity(cost).optional(),
  perDay: quantity(cost).optional(),
  perResidentDay: quantity(cost).optional(),
  transfer: z.boolean("must be true or false").optional(),
});

const days: Range = { min: 1, max: LIMITS.dayMax };
const measure = z.strictObject({
  id: text(64),
  name: text(200),
  cut: quantity({ min: LIMITS.cutMin, below: LIMITS.cutMax }),
  ladder: text(64).nullable(),
  maxDays: number(days).nullable(),
  maxDaysWithin: number(days).optional(),
  daysUsed: number({ min: 0, max: LIMITS.dayMax }).optional(),
  reviewEveryDays: number(days).optional(),
  costs: z.array(measureCost, "must be a list").max(40, "must have at most 40 lines"),
  legalBasis: text(2000, 0).optional(),
  evidence: text(10_000, 0).optional(),
});

const item = z
  .strictObject({
    measure: text(64),
    uptake: quantity(share).optional(),
    startDay: number({ min: 0, max: LIMITS.dayMax }),
    endDay: number({ min: 0, max: LIMITS.dayMax }).nullable(),
  })
  .refine(({ startDay, endDay }) => endDay === null || endDay > startDay, { path: ["endDay"], message: "must be after startDay, or null where the measure is never lifted" });

const assessmentPackage = z.strictObject({
  id: text(64).refine((id) => id !== "none", "must not be none, which is reserved for no further measures"),
  name: text(200),
  items: z.array(item, "must be a list").max(200, "must have at most 200 items"),
});

/** The assessment file's input, as a schema; `domain.ts` adds what needs more than one field. */
export const AssessmentInputSchema = z.strictObject({
  format: z.literal("ebbmark.assessment-input/1", 'must be "ebbmark.assessment-input/1"'),
  outbreak: z.strictObject({
    name: text(200),
    place: text(200),
    dayZero: isoDate,
    population: number({ above: 0, max: LIMITS.populationMax }),
    susceptible: number({ above: 0, max: LIMITS.populationMax }).optional(),
    exposed: quantity(persons).optional(),
    infectious: quantity(persons),
    removed: quantity(persons).optional(),
    transmission,
    infectiousPeriod: quantity(period),
    latentPeriod: quantity(period).nullable(),
    infectionFatality: quantity(share),
    currency: z.string("must be text").regex(/^[A-Z]{3}$/, "must be three capital letters (ISO 4217)"),
    priceYear: whole({ min: 1900, max: 2200 }),
  }),
  measures: z.array(measure, "must be a list").max(LIMITS.measuresMax, `must have at most ${LIMITS.measuresMax} measures`),
  packages: z.array(assessmentPackage, "must be a list").max(LIMITS.packagesMax, `must have at most ${LIMITS.packagesMax} packages`),
  horizonDays: whole({ min: 1, max: LIMITS.horizonDaysMax }).optional(),
  uncertainty: z
    .strictObject({ draws: whole({ min: LIMITS.drawsMin, max: LIMITS.drawsMax }), seed: whole({ min: 0, max: LIMITS.seedMax }) }, 'must be null or {"draws", "seed"}')
    .nullable(),
});

/** @throws EngineError "outsideDomain" with every fault, each naming its field and what is allowed */
export function parseAssessmentInput(raw: unknown): AssessmentInput {
  const parsed = AssessmentInputSchema.safeParse(raw);
  if (!parsed.success) throw new EngineError("outsideDomain", parsed.error.issues.flatMap((issue) => faultsOf(issue, raw)));
  const input = raw as AssessmentInput;
  const faults = domainFaults(input);
  if (faults.length > 0) throw new EngineError("outsideDomain", faults);
  return input;
}

function faultsOf(issue: z.core.$ZodIssue, raw: unknown): Fault[] {
  const path = pathOf(issue.path);
  if (issue.code === "unrecognized_keys") return issue.keys.map((key) => ({ path: path ? `${path}.${key}` : key, message: "is unknown; remove it or check its spelling" }));
  if (issue.code === "invalid_union") {
    // A quantity: name the fault inside the form that was meant.
    const value = issue.path.reduce<unknown>((at, key) => (at as Record<PropertyKey, unknown> | undefined)?.[key], raw);
    const inner = issue.errors[typeof value === "object" && value !== null ? 1 : 0] ?? [];
    if (typeof value === "number" || (typeof value === "object" && value !== null && !Array.isArray(value))) {
      return inner.flatMap((each) => faultsOf({ ...each, path: [...issue.path, ...each.path] } as z.core.$ZodIssue, raw));
    }
  }
  if (issue.code === "invalid_type" && issue.message.startsWith("Invalid input")) {
    const missing = issue.path.reduce<unknown>((at, key) => (at as Record<PropertyKey, unknown> | undefined)?.[key], raw) === undefined;
    return [{ path: path || "(file)", message: missing ? "is missing" : `must be ${issue.expected === "object" ? "an object" : `of type ${issue.expected}`}` }];
  }
  return [{ path: path || "(file)", message: issue.message }];
}

const pathOf = (keys: readonly PropertyKey[]) =>
  keys.reduce<string>((path, key) => (typeof key === "number" ? `${path}[${key}]` : path ? `${path}.${String(key)}` : String(key)), "");
