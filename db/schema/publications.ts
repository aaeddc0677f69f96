import { sql } from "drizzle-orm";
import { check, integer, jsonb, pgTable, text, uniqueIndex, uuid } from "drizzle-orm/pg-core";
import type { Locale } from "../../lib/i18n/locales";
import { at, id, sha256 } from "./columns";
import { briefings, briefingVersions } from "./briefings";
import { outbreaks } from "./outbreaks";
import { users } from "./users";

/** One published version of a briefing. Immutable. */
export const releases = pgTable(
  "releases",
  {
    id: id(),
    briefingId: uuid("briefing_id")
      .notNull()
      .references(() => briefings.id),
    versionId: uuid("version_id")
      .notNull()
      .unique()
      .references(() => briefingVersions.id),
    outbreakId: uuid("outbreak_id")
      .notNull()
      .references(() => outbreaks.id),
    slug: text("slug").notNull(),
    /** Counted per briefing: 1 is the first release. */
    number: integer("number").notNull(),
    kind: text("kind").$type<"first" | "update" | "correction">().notNull(),
    /** Per language: what was wrong, what it changes. Empty unless a correction. */
    correction: jsonb("correction").$type<Partial<Record<Locale, { cause: string; effect: string }>>>().notNull().default({}),
    /** Decides what happens to deliveries whose outcome is unknown: urgent ones are sent again. */
    urgency: text("urgency").$type<"urgent" | "routine">().notNull(),
    assessmentHash: sha256("assessment_hash").notNull(),
    contentHash: sha256("content_hash").notNull(),
    publishedBy: text("published_by")
      .notNull()
      .references(() => users.id),
    publishedAt: at("published_at").notNull(),
  },
  (t) => [
    uniqueIndex("releases_number").on(t.briefingId, t.number),
    check("releases_kind", sql`${t.kind} in ('first','update','correction')`),
    check("releases_urgency", sql`${t.urgency} in ('urgent','routine')`),
  ],
);

/** One language of one release: the exact content residents see. Immutable. */
export const publications = pgTable(
  "publications",
  {
    id: id(),
    releaseId: uuid("release_id")
      .notNull()
      .references(() => releases.id),
    locale: text("locale").$type<Locale>().notNull(),
    title: text("title").notNull(),
    /** Canonical text of a RenderedBriefing. */
    content: text("content").notNull(),
    contentHash: sha256("content_hash").notNull(),
  },
  (t) => [uniqueIndex("publications_locale").on(t.releaseId, t.locale)],
);

/** What happened to a release afterwards; withdrawing and superseding are new rows, never edits. Immutable. */
export const releaseEvents = pgTable(
  "release_events",
  {
    id: id(),
    releaseId: uuid("release_id")
      .notNull()
      .references(() => releases.id),
    kind: text("kind").$type<"superseded" | "corrected" | "withdrawn">().notNull(),
    /** Per language, what residents are told. */
    notice: jsonb("notice").$type<Partial<Record<Locale, string>>>().notNull().default({}),
    /** The release that took its place. */
    byReleaseId: uuid("by_release_id").references(() => releases.id),
    actor: text("actor")
      .notNull()
      .references(() => users.id),
    at: at("at").notNull(),
  },
  (t) => [
    uniqueIndex("release_events_once").on(t.releaseId, t.kind),
    check("release_events_kind", sql`${t.kind} in ('superseded','corrected','withdrawn')`),
  ],
);
