import { boolean, integer, jsonb, pgTable, text } from "drizzle-orm/pg-core";
import type { MeasureCostInput } from "../../lib/engine/types";
import type { Locale } from "../../lib/i18n/locales";
import { createdAt, id, updatedAt, version } from "./columns";
import { users } from "./users";

/** The catalogue: one for the installation. */
export const measures = pgTable("measures", {
  id: id(),
  /** Short stable id, also the id in the assessment file: "sick", "eve". */
  code: text("code").notNull().unique(),
  name: text("name").notNull(),
  /** Two or three words for charts and tables. */
  shortName: text("short_name").notNull(),
  /** What people must do. */
  instruction: text("instruction").notNull(),
  cut: jsonb("cut").$type<{ low: number; central: number; high: number; source?: string }>().notNull(),
  evidence: text("evidence").notNull().default(""),
  legalBasis: text("legal_basis").notNull().default(""),
  legalLink: text("legal_link").notNull().default(""),
  /** Measures that share a ladder exclude each other on any day. */
  ladder: text("ladder"),
  maxDays: integer("max_days"),
  maxDaysWithin: integer("max_days_within"),
  daysUsed: integer("days_used"),
  reviewEveryDays: integer("review_every_days"),
  leadTimeDays: integer("lead_time_days").notNull().default(0),
  costs: jsonb("costs").$type<MeasureCostInput[]>().notNull().default([]),
  /** Words for residents per language: what to do, and one line of detail. */
  publicTexts: jsonb("public_texts").$type<Partial<Record<Locale, { title: string; detail: string }>>>().notNull().default({}),
  archived: boolean("archived").notNull().default(false),
  version: version(),
  createdBy: text("created_by")
    .notNull()
    .references(() => users.id),
  createdAt: createdAt(),
  updatedAt: updatedAt(),
});
