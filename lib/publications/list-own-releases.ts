import { desc, eq, inArray, sql } from "drizzle-orm";
import { db } from "@/db/client";
import { deliveries, releaseEvents, releases } from "@/db/schema";

/** Releases of one briefing with what happened to them and to their mail, newest first; for the desk. */
export async function listOwnReleases(briefingId: string) {
  const rows = await db
    .select({ id: releases.id, number: releases.number, kind: releases.kind, slug: releases.slug, publishedAt: releases.publishedAt })
    .from(releases)
    .where(eq(releases.briefingId, briefingId))
    .orderBy(desc(releases.number));
  if (rows.length === 0) return [];
  const ids = rows.map(({ id }) => id);
  const count = (states: string) => sql<number>`count(*) filter (where ${deliveries.state} in (${sql.raw(states)}))::int`;
  const [events, mails] = await Promise.all([
    db.select({ releaseId: releaseEvents.releaseId, kind: releaseEvents.kind, at: releaseEvents.at }).from(releaseEvents).where(inArray(releaseEvents.releaseId, ids)),
    db
      .select({ releaseId: deliveries.releaseId, accepted: count("'accepted'"), waiting: count("'queued','sending','deferred'"), failed: count("'rejected','unknown','suppressed'") })
      .from(deliveries)
      .where(inArray(deliveries.releaseId, ids))
      .groupBy(deliveries.releaseId),
  ]);
  return rows.map((row) => ({
    ...row,
    events: events.filter(({ releaseId }) => releaseId === row.id),
    mails: mails.find(({ releaseId }) => releaseId === row.id) ?? { accepted: 0, waiting: 0, failed: 0 },
  }));
}
