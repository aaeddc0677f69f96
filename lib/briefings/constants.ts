import type { Locale } from "../i18n/locales";

/** States of a briefing, from the first version on; the spine walks a part of them under the same names. */
export const BRIEFING_STATES = [
  "draft",
  "figureCheck",
  "legalReview",
  "changesAsked",
  "approved",
  "scheduled",
  "published",
  "underCorrection",
  "reviewDue",
  "withdrawn",
  "archived",
] as const;
export type BriefingState = (typeof BRIEFING_STATES)[number];

/** Named parts of the text, in the order in which residents read them. */
export const PART_KEYS = [
  "inShort",
  "whatToDo",
  "whatWeExpect",
  "howSure",
  "whatWeDontKnow",
  "howToObject",
] as const;
export type PartKey = (typeof PART_KEYS)[number];

/**
 * One paragraph. `text` is plain text with tokens: `{{F1}}` a bound figure, `{{start:eve}}` and `{{end:eve}}` the first
 * and last day in force of a measure, `{{from}}` and `{{to}}` those of the package, `{{review}}` the day of the next look.
 */
export type Paragraph = {
  /** Stable across languages. */
  id: string;
  part: PartKey;
  text: string;
  /** Translations: hash of the source paragraph that this was made from. */
  sourceHash?: string;
  /** Translations: that source paragraph itself, so that a translator sees what changed since. */
  madeFrom?: string;
};

/** A bound figure: a reference into the frozen assessment. `package` is a letter, or "none" for no further measures. */
export type FigureRef = { ref: string; figure: string; package: string; form: "value" | "interval" };

/** Per language: what was wrong, and what that changes for the reader. */
export type CorrectionNotes = Partial<Record<Locale, { cause: string; effect: string }>>;

/** Why a published briefing is written again; a correction says per language what was wrong and what it changes. */
export type Revision = { kind: "update" } | { kind: "correction"; notes: CorrectionNotes };

/** Items of the reviewer's checklist, 1 to 18. */
export const CHECKLIST_ITEMS = Array.from({ length: 18 }, (_, index) => index + 1);
export type ChecklistAnswer = { answer: "pass" | "fail" | "notApplicable"; note: string };
