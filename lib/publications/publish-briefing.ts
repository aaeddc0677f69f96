import { and, desc, eq, sql } from "drizzle-orm";
import type { z } from "zod";
import { briefings, briefingTexts, publications, releaseEvents, releases } from "@/db/schema";
import { audit } from "@/lib/audit/audit";
import { requirePermission } from "@/lib/auth/require-permission";
import { getWhole, stepFacts } from "@/lib/briefings/queries";
import { PublishBriefingInput } from "@/lib/briefings/schema";
import { type VersionContent, versionContent } from "@/lib/briefings/submit-briefing";
import { reasonsAgainst } from "@/lib/briefings/workflow";
import { canonicalJson, sha256Hex } from "@/lib/canonical-json";
import { inTransaction, type StaffCtx } from "@/lib/context";
import { env } from "@/lib/env";
import { DomainError } from "@/lib/errors";
import { enqueueRelease } from "@/lib/jobs/enqueue";

/**
 * Releases the signed version in every language, closes the release before it, and puts one mail per subscriber in the
 * outbox: all of it or nothing. The caller refreshes the public pages after the commit.
 * @throws DomainError "notReady" with all reasons; "conflict"
 */
export async function publishBriefing(ctx: StaffCtx, raw: z.input<typeof PublishBriefingInput>): Promise<{ releaseId: string; slug: string; mails: number }> {
  requirePermission(ctx.actor, "briefing:publish");
  const { briefingId, version, urgency } = PublishBriefingInput.parse(raw);
  return inTransaction(ctx, async (tx) => {
    const [locked] = await tx.select({ version: briefings.version }).from(briefings).where(eq(briefings.id, briefingId)).for("update");
    if (locked && locked.version !== version) throw new DomainError("conflict", { briefingId });
    const whole = await getWhole(briefingId, tx);
    const { row, frozen, signature } = whole;
    const reasons = reasonsAgainst("publish", stepFacts(whole, ctx.actor.id));
    const live = await versionContent(whole);
    if (whole.version && live.contentHash !== whole.version.contentHash) reasons.push("contentChanged");
    if (reasons.length > 0 || !whole.version || !signature) throw new DomainError("notReady", { reasons });
    const [before] = await tx.select({ id: releases.id, number: releases.number }).from(releases).where(eq(releases.briefingId, briefingId)).orderBy(desc(releases.number)).limit(1);
    const kind = before ? (row.revision?.kind ?? "update") : "first";
    const { rendered, correction = {} } = JSON.parse(whole.version.content) as VersionContent;
    const [release] = await tx
      .insert(releases)
      .values({
        briefingId, versionId: whole.version.id, outbreakId: frozen.outbreakId, slug: row.slug, number: (before?.number ?? 0) + 1, kind,
        correction, urgency, assessmentHash: frozen.resultHash, contentHash: whole.version.contentHash, publishedBy: ctx.actor.id, publishedAt: ctx.now,
      })
      .returning({ id: releases.id, number: releases.number });
    if (!release) throw new Error("no release was written");
    await tx.insert(publications).values(
      rendered.map((each) => {
        const content = canonicalJson(each);
        return { releaseId: release.id, locale: each.locale, title: each.title, content, contentHash: sha256Hex(content) };
      }),
    );
    if (before) await tx.insert(releaseEvents).values({ releaseId: before.id, kind: kind === "correction" ? "corrected" : "superseded", byReleaseId: release.id, actor: ctx.actor.id, at: ctx.now });
    const mails = await enqueueRelease(tx, { releaseId: release.id, holdMinutes: env().MAIL_HOLD_MINUTES });
    await tx.update(briefings).set({ state: "published", revision: null, version: sql`${briefings.version} + 1`, updatedAt: ctx.now }).where(eq(briefings.id, briefingId));
    // Who wrote the next version counts anew from here.
    await tx.update(briefingTexts).set({ authors: [] }).where(and(eq(briefingTexts.briefingId, briefingId)));
    await audit(tx, ctx, { action: "briefing.publish", subject: `briefing/${briefingId}`, objectHash: whole.version.contentHash, facts: { release: release.number, kind, urgency, mails } });
    return { releaseId: release.id, slug: row.slug, mails };
  });
}
