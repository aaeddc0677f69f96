import { sql } from "drizzle-orm";
import { check, integer, jsonb, pgTable, primaryKey, text, uniqueIndex, uuid } from "drizzle-orm/pg-core";
import type { BriefingState, FigureRef, Paragraph, Revision } from "../../lib/briefings/constants";
import type { Locale } from "../../lib/i18n/locales";
import { at, createdAt, id, sha256, updatedAt, version } from "./columns";
import { assessments, frozenAssessments } from "./assessments";
import { users } from "./users";

export const briefings = pgTable(
  "briefings",
  {
    id: id(),
    number: integer("number").notNull().unique(),
    /** Part of the public address; fixed once published. */
    slug: text("slug").notNull().unique(),
    assessmentId: uuid("assessment_id")
      .notNull()
      .references(() => frozenAssessments.assessmentId),
    /** Letter of the package that was decided. */
    packageLetter: text("package_letter").notNull(),
    sourceLocale: text("source_locale").$type<Locale>().notNull().default("en"),
    locales: text("locales").array().$type<Locale[]>().notNull(),
    state: text("state").$type<BriefingState>().notNull().default("draft"),
    /** F1, F2 …: each names a figure of the frozen assessment. */
    figures: jsonb("figures").$type<FigureRef[]>().notNull().default([]),
    /** ISO date on which the authority looks again. */
    reviewDate: text("review_date"),
    /** What the version being written is to the one that residents read; null before the first release. */
    revision: jsonb("revision").$type<Revision>(),
    /** Number of the version being written; a submission snapshots it, a return opens the next. */
    versionNumber: integer("version_number").notNull().default(1),
    version: version(),
    createdBy: text("created_by")
      .notNull()
      .references(() => users.id),
    createdAt: createdAt(),
    updatedAt: updatedAt(),
  },
  (t) => [
    check(
      "briefings_state",
      sql`${t.state} in ('draft','figureCheck','legalReview','changesAsked','approved','scheduled','published','underCorrection','reviewDue','withdrawn','archived')`,
    ),
  ],
);

export const briefingTexts = pgTable(
  "briefing_texts",
  {
    briefingId: uuid("briefing_id")
      .notNull()
      .references(() => briefings.id, { onDelete: "cascade" }),
    locale: text("locale").$type<Locale>().notNull(),
    title: text("title").notNull().default(""),
    /** Hash of the source title that a translated title was made from; null in the source language. */
    titleSourceHash: sha256("title_source_hash"),
    paragraphs: jsonb("paragraphs").$type<Paragraph[]>().notNull().default([]),
    /** Everyone who changed this text since the last publication. */
    authors: text("authors").array().notNull().default([]),
    version: version(),
    updatedBy: text("updated_by").references(() => users.id),
    updatedAt: updatedAt(),
  },
  (t) => [primaryKey({ columns: [t.briefingId, t.locale] })],
);

/** What was submitted: the exact rendering of every language. Immutable. */
export const briefingVersions = pgTable(
  "briefing_versions",
  {
    id: id(),
    briefingId: uuid("briefing_id")
      .notNull()
      .references(() => briefings.id),
    number: integer("number").notNull(),
    /** Canonical text: {figures, texts, rendered: {locale: RenderedBriefing}}. */
    content: text("content").notNull(),
    contentHash: sha256("content_hash").notNull(),
    /** Everyone who wrote or translated any of it; none of them may sign. */
    authors: text("authors").array().notNull(),
    submittedBy: text("submitted_by")
      .notNull()
      .references(() => users.id),
    submittedAt: at("submitted_at").notNull(),
  },
  (t) => [uniqueIndex("briefing_versions_number").on(t.briefingId, t.number)],
);

/** A legal reviewer's answer to one version. Immutable; a trigger refuses an author and a hash that isn't the version's. */
export const reviews = pgTable(
  "reviews",
  {
    id: id(),
    versionId: uuid("version_id")
      .notNull()
      .references(() => briefingVersions.id),
    decision: text("decision").$type<"signed" | "returned">().notNull(),
    reviewer: text("reviewer")
      .notNull()
      .references(() => users.id),
    reviewerName: text("reviewer_name").notNull(),
    reviewerRole: text("reviewer_role").notNull(),
    /** item number → {answer, note}. */
    checklist: jsonb("checklist").$type<Record<string, { answer: "pass" | "fail" | "notApplicable"; note: string }>>().notNull(),
    comment: text("comment").notNull().default(""),
    /** The statement as shown and signed. */
    statement: text("statement").notNull(),
    contentHash: sha256("content_hash").notNull(),
    at: at("at").notNull(),
  },
  (t) => [
    uniqueIndex("reviews_one_signature").on(t.versionId).where(sql`${t.decision} = 'signed'`),
    check("reviews_decision", sql`${t.decision} in ('signed','returned')`),
  ],
);

/** A signature that no longer counts, and why. Immutable. */
export const signatureVoids = pgTable("signature_voids", {
  reviewId: uuid("review_id")
    .primaryKey()
    .references(() => reviews.id),
  reason: text("reason").notNull(),
  voidedBy: text("voided_by")
    .notNull()
    .references(() => users.id),
  at: at("at").notNull(),
});
