import { z } from "zod";
import { LIMITS } from "../engine/limits";
import { numberIn } from "../outbreaks/quantity";
import { isoDate } from "../outbreaks/schema";

export const LETTERS = ["A", "B", "C", "D", "E", "F", "G", "H"] as const;

const name = z.string("Name is missing. Give 1 to 60 characters.").trim().min(1, "Name is missing. Give 1 to 60 characters.").max(60, "Name must have at most 60 characters.");

/** A line of the schedule as typed: whether it is in, uptake in per cent, first and last day in force as dates. */
const line = z
  .object({
    measureId: z.uuid(),
    included: z.preprocess((raw) => raw === "on" || raw === true, z.boolean()),
    uptakePercent: z.unknown(),
    from: z.unknown(),
    until: z.unknown(),
    never: z.preprocess((raw) => raw === "on" || raw === true, z.boolean()),
  })
  .transform((typed, context) => {
    if (!typed.included) return null;
    const read = <T>(schema: z.ZodType<T>, value: unknown, path: string): T | null => {
      const parsed = schema.safeParse(value);
      if (parsed.success) return parsed.data;
      context.addIssue({ code: "custom", path: [path], message: parsed.error.issues[0]?.message ?? "" });
      return null;
    };
    const uptakePercent = read(numberIn({ label: "Uptake", min: 0, max: 100, unit: "%" }) as z.ZodType<number>, typed.uptakePercent, "uptakePercent");
    const from = read(isoDate("First day in force"), typed.from, "from");
    const until = typed.never ? null : read(isoDate("Last day in force, or tick “never lifted”"), typed.until, "until");
    if (from !== null && until !== null && until < from) context.addIssue({ code: "custom", path: ["until"], message: "Last day in force: must be the first day in force or later." });
    return uptakePercent === null || from === null ? null : { measureId: typed.measureId, uptakePercent, from, until };
  });

export const CreatePackageInput = z.object({ outbreakId: z.uuid(), name, copyOf: z.uuid().optional() });
export const UpdatePackageInput = z.object({
  id: z.uuid(),
  version: z.coerce.number().int(),
  name,
  lines: z.array(line).max(LIMITS.measuresMax, `A package holds at most ${LIMITS.measuresMax} measures.`).optional(),
});
export const DeletePackageInput = z.object({ id: z.uuid(), confirmed: z.literal("yes", "Tick the box to confirm: the package is removed.") });
