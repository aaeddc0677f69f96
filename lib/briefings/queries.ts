import { and, asc, desc, eq } from "drizzle-orm";
import { db } from "@/db/client";
import { assessments, briefings, briefingTexts, briefingVersions, outbreaks, releases, reviews, signatureVoids, users } from "@/db/schema";
import { findFrozen, type FrozenAssessment } from "@/lib/assessments/queries";
import type { Tx } from "@/lib/context";
import { env } from "@/lib/env";
import { DomainError } from "@/lib/errors";
import { isFigureKey } from "@/lib/figures/catalogue";
import { checkSource, checkTranslation, type TextFinding } from "@/lib/figures/check";
import type { Locale } from "@/lib/i18n/locales";
import { sourceHash } from "./hash";
import { type RenderFacts, resolvableTokens } from "./render";
import type { StepFacts } from "./workflow";

type Reader = Tx | typeof db;
export type Briefing = typeof briefings.$inferSelect;
export type BriefingText = typeof briefingTexts.$inferSelect;
export type Signature = { reviewId: string; reviewer: string; reviewerName: string; at: Date; contentHash: string };
export type WholeBriefing = {
  row: Briefing;
  texts: BriefingText[];
  source: BriefingText;
  frozen: FrozenAssessment;
  findings: Map<Locale, TextFinding[]>;
  /** Present version where it was submitted. */
  version: typeof briefingVersions.$inferSelect | null;
  signature: Signature | null;
  released: boolean;
};

const isId = (id: string) => /^[0-9a-f-]{36}$/.test(id);

/** Every briefing with its state, newest first. */
export const listBriefings = () =>
  db
    .select({
      id: briefings.id, number: briefings.number, state: briefings.state, locales: briefings.locales, versionNumber: briefings.versionNumber, updatedAt: briefings.updatedAt,
      title: briefingTexts.title, assessmentNumber: assessments.number, outbreakName: outbreaks.name, place: outbreaks.place, packageLetter: briefings.packageLetter,
    })
    .from(briefings)
    .innerJoin(assessments, eq(assessments.id, briefings.assessmentId))
    .innerJoin(outbreaks, eq(outbreaks.id, assessments.outbreakId))
    .innerJoin(briefingTexts, and(eq(briefingTexts.briefingId, briefings.id), eq(briefingTexts.locale, briefings.sourceLocale)))
    .orderBy(desc(briefings.number));

/** Everything that decides what a briefing says and which step it may take. @throws DomainError "notFound" */
export async function getWhole(id: string, reader: Reader = db): Promise<WholeBriefing> {
  const [row] = isId(id) ? await reader.select().from(briefings).where(eq(briefings.id, id)) : [];
  if (!row) throw new DomainError("notFound", { briefingId: id });
  const texts = await reader.select().from(briefingTexts).where(eq(briefingTexts.briefingId, id));
  const frozen = await findFrozen(row.assessmentId, reader);
  const source = texts.find(({ locale }) => locale === row.sourceLocale);
  if (!frozen || !source) throw new DomainError("notFound", { briefingId: id });
  const [version] = await reader.select().from(briefingVersions).where(and(eq(briefingVersions.briefingId, id), eq(briefingVersions.number, row.versionNumber)));
  const [signature] = version
    ? await reader
        .select({ reviewId: reviews.id, reviewer: reviews.reviewer, reviewerName: reviews.reviewerName, at: reviews.at, contentHash: reviews.contentHash, voided: signatureVoids.at })
        .from(reviews)
        .leftJoin(signatureVoids, eq(signatureVoids.reviewId, reviews.id))
        .where(and(eq(reviews.versionId, version.id), eq(reviews.decision, "signed")))
    : [];
  const [release] = await reader.select({ id: releases.id }).from(releases).where(eq(releases.briefingId, id)).limit(1);
  return {
    row, texts, source, frozen,
    findings: new Map(row.locales.map((locale) => [locale, findingsOf(row, source, texts.find((text) => text.locale === locale), frozen)])),
    version: version ?? null,
    signature: signature && signature.voided === null ? signature : null,
    released: release !== undefined,
  };
}

function findingsOf(row: Briefing, source: BriefingText, text: BriefingText | undefined, frozen: FrozenAssessment): TextFinding[] {
  if (text?.locale === row.sourceLocale) {
    const interval = (ref: string) => {
      const own = row.figures.find((figure) => figure.ref === ref);
      return own?.form === "value" ? (row.figures.find((each) => each.form === "interval" && each.figure === own.figure && each.package === own.package)?.ref ?? null) : null;
    };
    return checkSource(source.title, source.paragraphs, resolvableTokens(frozen, row), interval, source.locale);
  }
  return checkTranslation(
    { title: source.title, paragraphs: source.paragraphs, hashOf: sourceHash },
    { title: text?.title ?? "", titleSourceHash: text?.titleSourceHash ?? null, paragraphs: text?.paragraphs ?? [] },
  );
}

/** What the workflow table asks for. */
export function stepFacts({ row, texts, findings, frozen, signature, released }: WholeBriefing, actorId: string): StepFacts {
  const decided = frozen.context.packages.find(({ letter }) => letter === row.packageLetter);
  const { revision } = row;
  const codes = new Set(decided?.items.map(({ measureCode }) => measureCode));
  return {
    state: row.state,
    actorId,
    authors: [...new Set(texts.flatMap(({ authors }) => authors))],
    stops: [...findings.values()].flat().filter(({ level }) => level === "stops").length,
    reviewDate: row.reviewDate,
    deliverable: decided?.deliverable ?? false,
    localesWithoutMeasures: row.locales.filter((locale) => frozen.context.measures.some(({ code, publicTexts }) => codes.has(code) && !publicTexts[locale]?.title)),
    localesWithoutNote: revision?.kind === "correction" ? row.locales.filter((locale) => !revision.notes[locale]?.cause || !revision.notes[locale]?.effect) : [],
    signature,
    released,
  };
}

export function renderFacts(row: Briefing): RenderFacts {
  const { AUTHORITY_NAME: name, AUTHORITY_CONTACT: contact, demo } = env();
  return {
    number: row.number, versionNumber: row.versionNumber, slug: row.slug, packageLetter: row.packageLetter, reviewDate: row.reviewDate,
    figures: row.figures.filter(({ figure }) => isFigureKey(figure)), authority: { name, contact }, demonstration: demo,
  };
}

/** Versions that were submitted, newest first, with the answers to them. */
export const listVersions = (briefingId: string) =>
  db
    .select({ id: briefingVersions.id, number: briefingVersions.number, content: briefingVersions.content, submittedAt: briefingVersions.submittedAt, submittedBy: users.name })
    .from(briefingVersions)
    .innerJoin(users, eq(users.id, briefingVersions.submittedBy))
    .where(eq(briefingVersions.briefingId, briefingId))
    .orderBy(desc(briefingVersions.number));

export const listReviews = (briefingId: string) =>
  db
    .select({
      id: reviews.id, versionNumber: briefingVersions.number, decision: reviews.decision, reviewerName: reviews.reviewerName, comment: reviews.comment, checklist: reviews.checklist,
      contentHash: reviews.contentHash, at: reviews.at, voidReason: signatureVoids.reason, voidedAt: signatureVoids.at,
    })
    .from(reviews)
    .innerJoin(briefingVersions, eq(briefingVersions.id, reviews.versionId))
    .leftJoin(signatureVoids, eq(signatureVoids.reviewId, reviews.id))
    .where(eq(briefingVersions.briefingId, briefingId))
    .orderBy(asc(reviews.at));
