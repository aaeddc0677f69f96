import type { Locale } from "../i18n/locales";
import type { PartKey } from "./constants";

/** A run of text as residents read it. A figure keeps its reference so that it can be traced and marked. */
export type Inline =
  | { kind: "text"; text: string }
  | { kind: "figure"; ref: string; text: string; interval: boolean }
  | { kind: "date"; token: string; text: string; iso: string };

export type RenderedParagraph = { id: string; inlines: Inline[] };

/** One measure on the schedule: ISO dates; `to` is the last day in force, null where it is never lifted. */
export type RenderedMeasure = {
  code: string;
  title: string;
  detail: string;
  from: string;
  to: string | null;
  startDay: number;
  endDay: number | null;
  legalBasis: string;
  legalLink: string;
};

/** Of 1,000 residents, rounded; the middle estimate of the draws. */
export type PeopleShare = { infected: number; died: number };

/** Exactly what one language of one version shows; stored with the publication and never computed again. */
export type RenderedBriefing = {
  locale: Locale;
  briefingNumber: number;
  versionNumber: number;
  slug: string;
  title: string;
  outbreakName: string;
  place: string;
  authorityName: string;
  authorityContact: string;
  parts: { part: PartKey; paragraphs: RenderedParagraph[] }[];
  schedule: { dayZero: string; endDay: number; measures: RenderedMeasure[] };
  /** ISO dates over the whole package; `to` is the last day in force. */
  inForce: { from: string; to: string | null };
  reviewDate: string | null;
  people: { without: PeopleShare; with: PeopleShare } | null;
  /** Every bound figure in the text: what is shown and where it comes from. */
  figures: { ref: string; text: string; label: string; figure: string; package: string; form: "value" | "interval" }[];
  /** Set where rounded parts don't add up. */
  roundingNote: boolean;
  /** The range of the threshold ratio includes 1: a stronger caution is shown. */
  nearThreshold: boolean;
  /** The package ends: what is said holds while it is in force. */
  demonstration: boolean;
};
