import { z } from "zod";
import { LIMITS } from "../engine/limits";
import { plainOrQuantityIn } from "../outbreaks/quantity";
import { isoDate } from "../outbreaks/schema";
import { dayOf } from "./days";

export const LETTERS = ["A", "B", "C", "D", "E", "F", "G", "H"] as const;

const name = z.string("Name is missing. Give 1 to 60 characters.").trim().min(1, "Name is missing. Give 1 to 60 characters.").max(60, "Name must have at most 60 characters.");

const UPTAKE = plainOrQuantityIn({ label: "Uptake", min: 0, max: 100, unit: "%" });

/** A line of the schedule as typed: whether it is in, uptake in per cent, first and last day in force as dates. */
const line = z
  .object({
    measureId: z.uuid(),
    included: z.preprocess((raw) => raw === "on" || raw === true, z.boolean()),
    uptakePercent: z.unknown().optional(),
    from: z.unknown().optional(),
    until: z.unknown().optional(),
    never: z.preprocess((raw) => raw === "on" || raw === true, z.boolean()),
  })
  .transform((typed, context) => {
    if (!typed.included) return null;
    const read = <T>(schema: z.ZodType<T>, value: unknown, path: string): T | null => {
      const parsed = schema.safeParse(value);
      if (parsed.success) return parsed.data;
      for (const issue of parsed.error.issues) context.addIssue({ code: "custom", path: [path, ...issue.path], message: issue.message });
      return null;
    };
    const uptakePercent = read(UPTAKE, typed.uptakePercent, "uptakePercent");
    const from = read(isoDate("First day in force"), typed.from, "from");
    const until = typed.never ? null : read(isoDate("Last day in force, or tick “never lifted”"), typed.until, "until");
    if (from !== null && until !== null && until < from) context.addIssue({ code: "custom", path: ["until"], message: "Last day in force: must be the first day in force or later." });
    return uptakePercent === null || from === null ? null : { measureId: typed.measureId, uptakePercent, from, until };
  });

export const CreatePackageInput = z.object({ outbreakId: z.uuid(), name, copyOf: z.uuid().optional() });
export const UpdatePackageInput = z
  .object({
    id: z.uuid(),
    version: z.coerce.number().int(),
    name,
    /** As the page showed it, so that a date before it is named beside its field. */
    dayZero: isoDate("Day 0"),
    lines: z.array(line).optional(),
  })
  .superRefine(({ dayZero, lines = [] }, context) => {
    const days = LIMITS.dayMax.toLocaleString("en-GB");
    if (lines.filter((each) => each !== null).length > LIMITS.measuresMax) context.addIssue({ code: "custom", path: ["lines"], message: `A package holds at most ${LIMITS.measuresMax} measures. Untick some.` });
    lines.forEach((each, index) => {
      if (!each) return;
      const refuse = (field: "from" | "until", message: string) => context.addIssue({ code: "custom", path: ["lines", index, field], message });
      if (each.from < dayZero) refuse("from", `First day in force: must be day 0, ${dayZero}, or later.`);
      else if (dayOf(dayZero, each.from) > LIMITS.dayMax) refuse("from", `First day in force: must be within ${days} days of day 0, ${dayZero}.`);
      if (each.until !== null && dayOf(dayZero, each.until) + 1 > LIMITS.dayMax) refuse("until", `Last day in force: must be within ${days} days of day 0, ${dayZero}.`);
    });
  });
export const DeletePackageInput = z.object({ id: z.uuid(), confirmed: z.literal("yes", "Tick the box to confirm: the package is removed.") });
