import { and, desc, eq, inArray, sql } from "drizzle-orm";
import { portalDb } from "@/db/client";
import { publications, releaseEvents, releases } from "@/db/schema";
import type { RenderedBriefing } from "../briefings/rendered";
import { isLocale, type Locale } from "../i18n/locales";
import type { PublishedRelease } from "./published";

/** Every release with its languages and what happened to it, newest first. Reads what residents may read and no more. */
export async function listReleases(): Promise<PublishedRelease[]> {
  const [rows, texts, events] = await Promise.all([
    portalDb
      .select({
        id: releases.id,
        briefingId: releases.briefingId,
        outbreakId: releases.outbreakId,
        slug: releases.slug,
        number: releases.number,
        kind: releases.kind,
        publishedAt: releases.publishedAt,
        assessmentHash: releases.assessmentHash,
        contentHash: releases.contentHash,
        correction: releases.correction,
      })
      .from(releases)
      .orderBy(desc(releases.publishedAt), desc(releases.number)),
    portalDb
      .select({
        releaseId: publications.releaseId,
        locale: publications.locale,
        title: publications.title,
        briefingNumber: sql<number>`(${publications.content}::jsonb->>'briefingNumber')::int`,
      })
      .from(publications),
    portalDb
      .select({
        releaseId: releaseEvents.releaseId,
        kind: releaseEvents.kind,
        at: releaseEvents.at,
        notice: releaseEvents.notice,
        byReleaseId: releaseEvents.byReleaseId,
      })
      .from(releaseEvents),
  ]);
  const textsOf = groupBy(texts.filter(({ locale }) => isLocale(locale)));
  const eventsOf = groupBy(events);
  return rows.map((row) => ({
    ...row,
    publishedAt: row.publishedAt.toISOString(),
    texts: (textsOf.get(row.id) ?? []).map(({ locale, title, briefingNumber }) => ({ locale, title, briefingNumber })),
    events: (eventsOf.get(row.id) ?? []).map(({ kind, at, notice, byReleaseId }) => ({ kind, at: at.toISOString(), notice, byReleaseId })),
  }));
}

function groupBy<T extends { releaseId: string }>(rows: T[]): Map<string, T[]> {
  const groups = new Map<string, T[]>();
  for (const row of rows) groups.set(row.releaseId, [...(groups.get(row.releaseId) ?? []), row]);
  return groups;
}

/** Exactly what residents see of one release in one language, or null. */
export async function findContent(releaseId: string, locale: Locale): Promise<RenderedBriefing | null> {
  const [row] = await portalDb
    .select({ content: publications.content })
    .from(publications)
    .where(and(eq(publications.releaseId, releaseId), eq(publications.locale, locale)));
  return row ? asRendered(row.content) : null;
}

/** The same for several releases at once, each in the language named with it. */
export async function listContents(wanted: { releaseId: string; locale: Locale }[]): Promise<Map<string, RenderedBriefing>> {
  if (wanted.length === 0) return new Map();
  const rows = await portalDb
    .select({ releaseId: publications.releaseId, locale: publications.locale, content: publications.content })
    .from(publications)
    .where(
      inArray(
        publications.releaseId,
        wanted.map(({ releaseId }) => releaseId),
      ),
    );
  const asked = new Set(wanted.map(({ releaseId, locale }) => `${releaseId} ${locale}`));
  return new Map(rows.filter((row) => asked.has(`${row.releaseId} ${row.locale}`)).map((row) => [row.releaseId, asRendered(row.content)]));
}

// Safe: the publishing command alone writes these rows, from a RenderedBriefing, and they never change.
const asRendered = (text: string): RenderedBriefing => JSON.parse(text) as RenderedBriefing;
