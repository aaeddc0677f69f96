import { z } from "zod";
import { dayOf } from "@/lib/packages/days";
import {
  DRAWS_MAX, DRAWS_MIN, HORIZON_DAYS_MAX, HORIZON_DAYS_MIN, PACKAGE_LETTERS, PACKAGES_MAX, REASON_MAX, REASON_MIN,
  SCHEDULE_DAYS_MAX, SEED_MAX, SHIFT_DAYS_MAX, TITLE_MAX,
} from "./constants";

const digits = (value: number) => value.toLocaleString("en-GB");

/** A typed number: spaces and narrow spaces between digits are fine, and so is a comma as decimal mark. */
const plain = (value: unknown) => {
  if (typeof value !== "string") return value;
  const text = value.replace(/[\s\u00a0\u202f]/g, "").replace(/^(\d+),(\d{1,2})$/, "$1.$2");
  return text === "" ? undefined : /^-?\d+(\.\d+)?$/.test(text) ? Number(text) : Number.NaN;
};
const range = (min: number, max: number, what: string) => `Must be ${what} from ${digits(min)} to ${digits(max)}.`;
const wholeNumber = (min: number, max: number) => {
  const words = range(min, max, "a whole number");
  return z.number(words).refine((value) => Number.isInteger(value) && value >= min && value <= max, words);
};
const whole = (min: number, max: number) => z.preprocess(plain, wholeNumber(min, max));

const id = z.uuid("This assessment doesn't exist.");
const version = z.coerce.number("Reload the page: it doesn't say which state you saw.").int().min(1);

const letters = z
  .preprocess(
    (value) => (value === undefined ? [] : Array.isArray(value) ? value : [value]),
    z.array(z.enum(PACKAGE_LETTERS, "Must be the letter of a package.")),
  )
  .transform((chosen) => [...new Set(chosen)].sort())
  .refine((chosen) => chosen.length >= 1 && chosen.length <= PACKAGES_MAX, `Choose 1 to ${PACKAGES_MAX} packages. “No further measures” is always there.`);

const settings = {
  draws: whole(DRAWS_MIN, DRAWS_MAX),
  seed: whole(0, SEED_MAX),
  horizonDays: whole(HORIZON_DAYS_MIN, HORIZON_DAYS_MAX),
};
const title = z
  .string("Give the assessment a title.")
  .trim()
  .min(1, "Give the assessment a title.")
  .max(TITLE_MAX, `The title may have at most ${TITLE_MAX} characters.`);

export const CreateAssessmentInput = z.object({ outbreakId: z.uuid("Choose an outbreak."), title, packageLetters: letters, ...settings });
export type CreateAssessmentInput = z.infer<typeof CreateAssessmentInput>;

const percentWords = range(0, 100, "a number");
const percent = z.preprocess(plain, z.number(percentWords).min(0, percentWords).max(100, percentWords));
const isoDate = z.preprocess(
  (value) => (value === "" ? undefined : value),
  z.iso.date("Must be a date, year-month-day.").optional(),
);

/** One line of a package as edited beside the result; dates are calendar dates, the last one still in force. */
const EditedItem = z.object({
  measureId: z.uuid(),
  /** Left out where uptake has a low and a high end: those are edited with the package. */
  uptakePercent: percent.optional(),
  from: isoDate.refine((value) => value !== undefined, "Give the first day in force."),
  /** Empty: never lifted. */
  to: isoDate,
});
export type EditedItem = z.infer<typeof EditedItem>;

const EditedPackage = z.object({
  letter: z.enum(PACKAGE_LETTERS),
  version: z.coerce.number().int().min(1),
  /** Moves every date of the package; minus is earlier. */
  shiftDays: z.preprocess((value) => plain(typeof value === "string" ? value.replace("−", "-") : value), wholeNumber(-SHIFT_DAYS_MAX, SHIFT_DAYS_MAX).default(0)),
  items: z.array(EditedItem).max(200).default([]),
});
export type EditedPackage = z.infer<typeof EditedPackage>;

/** What the desk recalculates while somebody edits, and what saving stores. */
export const EditAssessmentInput = z
  .object({
    id,
    version,
    title,
    packageLetters: letters,
    ...settings,
    /** As the page showed it, so that a date before it is named beside its field. */
    dayZero: z.iso.date("Reload the page: it doesn't say when day 0 is."),
    packages: z.array(EditedPackage).max(PACKAGES_MAX).default([]),
  })
  .superRefine(({ dayZero, packages }, context) => {
    packages.forEach(({ items, shiftDays }, p) => {
      items.forEach(({ from, to }, i) => {
        const refuse = (field: "from" | "to", message: string) => context.addIssue({ code: "custom", path: ["packages", p, "items", i, field], message });
        const moved = shiftDays === 0 ? "" : ", moved dates included";
        if (from !== undefined && dayOf(dayZero, from) + shiftDays < 0) refuse("from", `Must be on or after day 0, ${dayZero}${moved}.`);
        for (const [field, date] of [["from", from], ["to", to]] as const) {
          if (date !== undefined && dayOf(dayZero, date) + shiftDays > SCHEDULE_DAYS_MAX) refuse(field, `Must be within ${digits(SCHEDULE_DAYS_MAX)} days of day 0, ${dayZero}${moved}.`);
        }
        if (from !== undefined && to !== undefined && to < from) refuse("to", `Must be on or after the first day in force, ${from}.`);
      });
    });
  });
export type EditAssessmentInput = z.infer<typeof EditAssessmentInput>;

export const FreezeAssessmentInput = z.object({
  id,
  version,
  reason: z
    .string("Say why it is frozen now.")
    .trim()
    .min(REASON_MIN, `Say why it is frozen now, in ${REASON_MIN} to ${digits(REASON_MAX)} characters.`)
    .max(REASON_MAX, `The reason may have at most ${digits(REASON_MAX)} characters.`),
});
export type FreezeAssessmentInput = z.infer<typeof FreezeAssessmentInput>;

