import { asc, desc, eq, inArray } from "drizzle-orm";
import { db } from "@/db/client";
import { assessments, frozenAssessments, measures, outbreaks, packages, users } from "@/db/schema";
import type { Tx } from "@/lib/context";
import type { AssessmentInput, AssessmentResult } from "@/lib/engine/types";
import { DomainError } from "@/lib/errors";
import { type ContextSnapshot, readContext } from "./snapshot";
import type { SourceMeasure, SourceOutbreak, SourcePackage } from "./to-input";

type Reader = Tx | typeof db;
const isId = (id: string) => /^[0-9a-f]{8}(-[0-9a-f]{4}){3}-[0-9a-f]{12}$/i.test(id);

const listed = {
  id: assessments.id,
  number: assessments.number,
  title: assessments.title,
  packageLetters: assessments.packageLetters,
  draws: assessments.draws,
  updatedAt: assessments.updatedAt,
  outbreakId: outbreaks.id,
  outbreakName: outbreaks.name,
  outbreakPlace: outbreaks.place,
  frozenAt: frozenAssessments.frozenAt,
};

/** Newest first; of one outbreak where one is named. */
export function listAssessments(outbreakId?: string) {
  if (outbreakId !== undefined && !isId(outbreakId)) return Promise.resolve([]);
  return db
    .select(listed)
    .from(assessments)
    .innerJoin(outbreaks, eq(outbreaks.id, assessments.outbreakId))
    .leftJoin(frozenAssessments, eq(frozenAssessments.assessmentId, assessments.id))
    .where(outbreakId === undefined ? undefined : eq(assessments.outbreakId, outbreakId))
    .orderBy(desc(assessments.number));
}

export type AssessmentRow = typeof assessments.$inferSelect;

/** The working row with everything that its input is made from, read in one transaction's view where one is given. */
export async function getAssessment(id: string, reader: Reader = db) {
  if (!isId(id)) throw new DomainError("notFound");
  const [row] = await reader.select().from(assessments).where(eq(assessments.id, id));
  if (!row) throw new DomainError("notFound");
  return { row, ...(await readSources(row.outbreakId, reader)) };
}

/** What assessments of this outbreak are made from. @throws DomainError "notFound" | "notReady" (no profile yet) */
export async function readSources(outbreakId: string, reader: Reader = db) {
  if (!isId(outbreakId)) throw new DomainError("notFound");
  const [found] = await reader.select().from(outbreaks).where(eq(outbreaks.id, outbreakId));
  if (!found) throw new DomainError("notFound");
  const { profile, ...outbreak } = found;
  if (profile === null) throw new DomainError("notReady", { reasons: ["profileMissing"] });
  const own: SourcePackage[] = await reader
    .select({ id: packages.id, letter: packages.letter, name: packages.name, version: packages.version, items: packages.items })
    .from(packages)
    .where(eq(packages.outbreakId, outbreakId))
    .orderBy(asc(packages.letter));
  const ids = [...new Set(own.flatMap(({ items }) => items.map(({ measureId }) => measureId)))];
  const named: SourceMeasure[] = ids.length === 0 ? [] : await reader.select().from(measures).where(inArray(measures.id, ids)).orderBy(asc(measures.code));
  return { outbreak: { ...outbreak, profile } satisfies SourceOutbreak, packages: own, measures: named };
}

/** A frozen assessment as everybody reads it: the two files, the context, their hashes, and who froze it when and why. */
export type FrozenAssessment = {
  assessmentId: string;
  number: number;
  title: string;
  outbreakId: string;
  input: AssessmentInput;
  inputText: string;
  inputHash: string;
  result: AssessmentResult;
  resultText: string;
  resultHash: string;
  context: ContextSnapshot;
  contextText: string;
  contextHash: string;
  engineVersion: string;
  reason: string;
  frozenBy: { id: string; name: string };
  frozenAt: Date;
};

/** null where it isn't frozen. */
export async function findFrozen(id: string, reader: Reader = db): Promise<FrozenAssessment | null> {
  if (!isId(id)) return null;
  const [found] = await reader
    .select({ frozen: frozenAssessments, number: assessments.number, title: assessments.title, outbreakId: assessments.outbreakId, by: users.name })
    .from(frozenAssessments)
    .innerJoin(assessments, eq(assessments.id, frozenAssessments.assessmentId))
    .innerJoin(users, eq(users.id, frozenAssessments.frozenBy))
    .where(eq(frozenAssessments.assessmentId, id));
  if (!found) return null;
  const { frozen, number, title, outbreakId, by } = found;
  return {
    assessmentId: frozen.assessmentId,
    number,
    title,
    outbreakId,
    // Safe: only freezeAssessment writes these texts, from values of these types.
    input: JSON.parse(frozen.input) as AssessmentInput,
    inputText: frozen.input,
    inputHash: frozen.inputHash,
    result: JSON.parse(frozen.result) as AssessmentResult,
    resultText: frozen.result,
    resultHash: frozen.resultHash,
    context: readContext(frozen.context, frozen.snapshotVersion),
    contextText: frozen.context,
    contextHash: frozen.contextHash,
    engineVersion: frozen.engineVersion,
    reason: frozen.reason,
    frozenBy: { id: frozen.frozenBy, name: by },
    frozenAt: frozen.frozenAt,
  };
}

export async function getFrozen(id: string, reader: Reader = db): Promise<FrozenAssessment> {
  const found = await findFrozen(id, reader);
  if (!found) throw new DomainError("notFound");
  return found;
}

/** Frozen ones, newest first: what a briefing can start from. */
export function listFrozen(outbreakId?: string) {
  if (outbreakId !== undefined && !isId(outbreakId)) return Promise.resolve([]);
  return db
    .select({
      id: assessments.id,
      number: assessments.number,
      title: assessments.title,
      packageLetters: assessments.packageLetters,
      outbreakId: outbreaks.id,
      outbreakName: outbreaks.name,
      outbreakPlace: outbreaks.place,
      frozenAt: frozenAssessments.frozenAt,
    })
    .from(frozenAssessments)
    .innerJoin(assessments, eq(assessments.id, frozenAssessments.assessmentId))
    .innerJoin(outbreaks, eq(outbreaks.id, assessments.outbreakId))
    .where(outbreakId === undefined ? undefined : eq(assessments.outbreakId, outbreakId))
    .orderBy(desc(assessments.number));
}
