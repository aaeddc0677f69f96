import { count, desc, eq, sql } from "drizzle-orm";
import { db } from "@/db/client";
import { assessments, briefings, frozenAssessments, measures, outbreaks, packages, releases } from "@/db/schema";
import { DomainError } from "@/lib/errors";
import type { BriefingState } from "./constants";

/** How far an outbreak has come, for the stage line. */
export type ChainStatus = {
  outbreakId: string;
  name: string;
  place: string;
  populationPersons: number;
  hasProfile: boolean;
  measures: number;
  packages: number;
  /** The newest one. */
  assessment: { id: string; number: number; frozenAt: Date | null } | null;
  /** The newest one on any of the outbreak's assessments. */
  briefing: { id: string; number: number; versionNumber: number; state: BriefingState; releasedAt: Date | null } | null;
};

/** @throws DomainError "notFound" */
export async function getChain(outbreakId: string): Promise<ChainStatus> {
  const [[outbreak], [inCatalogue], [toCompare], [assessment], [briefing]] = await Promise.all([
    db
      .select({ name: outbreaks.name, place: outbreaks.place, populationPersons: outbreaks.populationPersons, hasProfile: sql<boolean>`${outbreaks.profile} is not null` })
      .from(outbreaks)
      .where(eq(outbreaks.id, outbreakId)),
    db.select({ n: count() }).from(measures).where(eq(measures.archived, false)),
    db.select({ n: count() }).from(packages).where(eq(packages.outbreakId, outbreakId)),
    db
      .select({ id: assessments.id, number: assessments.number, frozenAt: frozenAssessments.frozenAt })
      .from(assessments)
      .leftJoin(frozenAssessments, eq(frozenAssessments.assessmentId, assessments.id))
      .where(eq(assessments.outbreakId, outbreakId))
      .orderBy(desc(assessments.number))
      .limit(1),
    db
      .select({
        id: briefings.id,
        number: briefings.number,
        versionNumber: briefings.versionNumber,
        state: briefings.state,
        releasedAt: sql<Date | null>`(select max(${releases.publishedAt}) from ${releases} where ${releases.briefingId} = ${briefings.id})`.mapWith((value) => (value === null ? null : new Date(value as string))),
      })
      .from(briefings)
      .innerJoin(assessments, eq(assessments.id, briefings.assessmentId))
      .where(eq(assessments.outbreakId, outbreakId))
      .orderBy(desc(briefings.number))
      .limit(1),
  ]);
  if (!outbreak) throw new DomainError("notFound", { outbreakId });
  return {
    outbreakId,
    ...outbreak,
    measures: inCatalogue?.n ?? 0,
    packages: toCompare?.n ?? 0,
    assessment: assessment ?? null,
    briefing: briefing ?? null,
  };
}
