import { z } from "zod";
import { FIGURE_KEYS } from "../figures/catalogue";
import { LOCALE_CODES } from "../i18n/locales";
import { isoDate } from "../outbreaks/schema";
import { CHECKLIST_ITEMS, PART_KEYS } from "./constants";

const words = (label: string, max: number, min = 0) => z.string().trim().min(min, `${label} is missing. Give ${min} to ${max} characters.`).max(max, `${label} must have at most ${max} characters.`);
const version = z.coerce.number().int();
const id = z.uuid();

export const CreateBriefingInput = z.object({ assessmentId: id, packageLetter: z.string("Choose the package that was decided.").regex(/^[A-H]$/, "Choose the package that was decided.") });

const paragraph = z.object({
  id: z.string().regex(/^(?:p\d{1,4}|new)$/),
  part: z.enum(PART_KEYS),
  text: words("A paragraph", 2000).optional().transform((text) => text ?? ""),
  /** Translations: ticked where an unchanged text still says the same as the changed source. */
  current: z.preprocess((raw) => raw === "on" || raw === true, z.boolean()),
});

export const SaveTextInput = z.object({
  briefingId: id,
  locale: z.enum(LOCALE_CODES),
  version,
  title: words("Title", 160).optional().transform((text) => text ?? ""),
  titleCurrent: z.preprocess((raw) => raw === "on" || raw === true, z.boolean()),
  paragraphs: z.array(paragraph).max(80, "A briefing has at most 80 paragraphs."),
  /** Source language: a paragraph to put before the one above it in its part, after saving. */
  raise: z
    .string()
    .regex(/^p\d{1,4}$/)
    .optional(),
});

export const SaveBriefingSettingsInput = z.object({
  briefingId: id,
  version,
  reviewDate: z.preprocess((raw) => (raw === "" ? undefined : raw), isoDate("We look again").optional()).transform((value) => value ?? null),
});
export const AddFigureInput = z.object({
  briefingId: id,
  version,
  figure: z.enum(FIGURE_KEYS, "Choose a figure of the list."),
  package: z.string().regex(/^(?:none|[A-H])$/, "Choose a package of the assessment, or no further measures."),
  form: z.enum(["value", "interval"]),
});
export const SaveCorrectionNoteInput = z.object({
  briefingId: id,
  version,
  locale: z.enum(LOCALE_CODES),
  cause: words("What was wrong", 1000, 1),
  effect: words("What it changes", 1000, 1),
});
export const SubmitBriefingInput = z.object({ briefingId: id, version });

export const ReviewInput = z
  .object({
    briefingId: id,
    versionId: id,
    decision: z.enum(["sign", "return"]),
    comment: words("Comment", 5000).optional().transform((text) => text ?? ""),
    items: z.record(z.string(), z.object({ answer: z.enum(["pass", "fail", "notApplicable"]).optional(), note: words("A note", 1000).optional().transform((text) => text ?? "") })).optional(),
  })
  .superRefine(({ decision, comment, items }, context) => {
    const item = (n: number) => items?.[`i${n}`];
    if (decision === "sign") {
      const open = CHECKLIST_ITEMS.filter((n) => item(n)?.answer === undefined);
      const failed = CHECKLIST_ITEMS.filter((n) => item(n)?.answer === "fail");
      const bare = CHECKLIST_ITEMS.filter((n) => item(n)?.answer === "notApplicable" && !item(n)?.note);
      if (open.length) context.addIssue({ code: "custom", path: [], message: `To sign, answer every question; open: ${open.join(", ")}.` });
      if (failed.length) context.addIssue({ code: "custom", path: [], message: `A version with failed questions can't be signed; failed: ${failed.join(", ")}. Return it.` });
      if (bare.length) context.addIssue({ code: "custom", path: [], message: `“Not applicable” needs its reason; missing: ${bare.join(", ")}.` });
    } else if (!comment && !CHECKLIST_ITEMS.some((n) => item(n)?.answer === "fail" && item(n)?.note)) {
      context.addIssue({ code: "custom", path: ["comment"], message: "To return it, say what must change: a comment, or a failed question with a note." });
    }
  });

export const PublishBriefingInput = z.object({ briefingId: id, version, urgency: z.enum(["urgent", "routine"], "Choose whether the mailing is urgent or routine.") });
const perLanguage = <S extends z.ZodType>(value: S) => z.partialRecord(z.enum(LOCALE_CODES), value);
export const WithdrawBriefingInput = z.object({
  briefingId: id,
  version,
  reason: words("Reason", 2000, 1),
  notice: perLanguage(words("Notice", 1000, 1)),
  confirmed: z.literal("yes", "Tick the box to confirm: residents see the notice at once."),
});
export const ReviseBriefingInput = z
  .object({
    briefingId: id,
    version,
    kind: z.enum(["update", "correction"]),
    assessmentId: z.preprocess((raw) => (raw === "" ? undefined : raw), id.optional()),
    notes: perLanguage(z.object({ cause: words("What was wrong", 1000).optional().transform((t) => t ?? ""), effect: words("What it changes", 1000).optional().transform((t) => t ?? "") })).optional(),
  })
  .superRefine(({ kind, notes }, context) => {
    if (kind === "correction" && !(notes?.en?.cause && notes.en.effect)) {
      context.addIssue({ code: "custom", path: ["notes", "en", "cause"], message: "A correction says, in English at least, what was wrong and what it changes." });
    }
  });
