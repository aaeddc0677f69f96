import { bigint, date, integer, jsonb, pgTable, text, uuid } from "drizzle-orm/pg-core";
import type { Locale } from "../../lib/i18n/locales";
import type { OutbreakProfile } from "../../lib/outbreaks/profile";
import { createdAt, id, updatedAt, version } from "./columns";
import { users } from "./users";

export const outbreaks = pgTable("outbreaks", {
  id: id(),
  /** Name of the illness, for example "Sedge fever". */
  name: text("name").notNull(),
  place: text("place").notNull(),
  populationPersons: bigint("population_persons", { mode: "number" }).notNull(),
  currency: text("currency").notNull(),
  priceYear: integer("price_year").notNull(),
  /** Calendar date of day 0. */
  dayZero: date("day_zero", { mode: "string" }).notNull(),
  languages: text("languages").array().$type<Locale[]>().notNull(),
  /** Names for residents, per language; the working name stands in where one is missing. */
  publicNames: jsonb("public_names").$type<Partial<Record<Locale, { name: string; place: string }>>>().notNull().default({}),
  /** null until the adviser has described it. */
  profile: jsonb("profile").$type<OutbreakProfile>(),
  version: version(),
  createdBy: text("created_by")
    .notNull()
    .references(() => users.id),
  createdAt: createdAt(),
  updatedAt: updatedAt(),
});

export const packages = pgTable("packages", {
  id: id(),
  outbreakId: uuid("outbreak_id")
    .notNull()
    .references(() => outbreaks.id, { onDelete: "cascade" }),
  /** "A" to "H": colour, letter and dash on every screen, and the id in the assessment file. */
  letter: text("letter").notNull(),
  name: text("name").notNull(),
  items: jsonb("items").$type<PackageItem[]>().notNull().default([]),
  version: version(),
  createdBy: text("created_by")
    .notNull()
    .references(() => users.id),
  createdAt: createdAt(),
  updatedAt: updatedAt(),
});

export type PackageItem = {
  measureId: string;
  uptake: number | { low: number; central: number; high: number };
  startDay: number;
  /** First day no longer in force; null: never lifted. */
  endDay: number | null;
};
