import { bigint, integer, jsonb, pgTable, text, uniqueIndex, uuid } from "drizzle-orm/pg-core";
import { at, createdAt, id, sha256, updatedAt, version } from "./columns";
import { outbreaks } from "./outbreaks";
import { users } from "./users";

/** One calculation over one outbreak and several packages; its live input is built from their current rows. */
export const assessments = pgTable(
  "assessments",
  {
    id: id(),
    outbreakId: uuid("outbreak_id")
      .notNull()
      .references(() => outbreaks.id),
    /** Counted per installation: "assessment 4". */
    number: integer("number").notNull(),
    title: text("title").notNull(),
    /** Letters of the packages compared, in order; up to eight. */
    packageLetters: text("package_letters").array().notNull(),
    draws: integer("draws").notNull().default(2000),
    seed: bigint("seed", { mode: "number" }).notNull(),
    horizonDays: integer("horizon_days").notNull().default(365),
    version: version(),
    createdBy: text("created_by")
      .notNull()
      .references(() => users.id),
    createdAt: createdAt(),
    updatedAt: updatedAt(),
  },
  (t) => [uniqueIndex("assessments_number").on(t.number)],
);

/** The two files of a frozen assessment and their hashes. Update, delete and truncate are refused by trigger. */
export const frozenAssessments = pgTable("frozen_assessments", {
  assessmentId: uuid("assessment_id")
    .primaryKey()
    .references(() => assessments.id),
  /** Canonical text (RFC 8785) of the input file. */
  input: text("input").notNull(),
  inputHash: sha256("input_hash").notNull(),
  /** Canonical text of the result file. */
  result: text("result").notNull(),
  resultHash: sha256("result_hash").notNull(),
  /** Canonical text of what the file format doesn't carry: MeasureSnapshot[], package letters, names. */
  context: text("context").notNull(),
  contextHash: sha256("context_hash").notNull(),
  engineVersion: text("engine_version").notNull(),
  snapshotVersion: integer("snapshot_version").notNull(),
  reason: text("reason").notNull(),
  frozenBy: text("frozen_by")
    .notNull()
    .references(() => users.id),
  frozenAt: at("frozen_at").notNull(),
});
