import { desc, eq, sql } from "drizzle-orm";
import type { z } from "zod";
import { briefings, deliveries, releaseEvents, releases } from "@/db/schema";
import { audit } from "@/lib/audit/audit";
import { requirePermission } from "@/lib/auth/require-permission";
import { getWhole, stepFacts } from "@/lib/briefings/queries";
import { WithdrawBriefingInput } from "@/lib/briefings/schema";
import { reasonsAgainst } from "@/lib/briefings/workflow";
import { inTransaction, type StaffCtx } from "@/lib/context";
import { DomainError } from "@/lib/errors";
import { enqueueWithdrawal } from "@/lib/jobs/enqueue";

/** Says on the public page that a briefing no longer stands, and stops its mail; the page keeps its address. */
export async function withdrawBriefing(ctx: StaffCtx, raw: z.input<typeof WithdrawBriefingInput>): Promise<{ slug: string }> {
  requirePermission(ctx.actor, "briefing:withdraw");
  const { briefingId, version, reason, notice } = WithdrawBriefingInput.parse(raw);
  return inTransaction(ctx, async (tx) => {
    const [locked] = await tx.select({ version: briefings.version }).from(briefings).where(eq(briefings.id, briefingId)).for("update");
    if (locked && locked.version !== version) throw new DomainError("conflict", { briefingId });
    const whole = await getWhole(briefingId, tx);
    const reasons = reasonsAgainst("withdraw", stepFacts(whole, ctx.actor.id));
    if (reasons.length > 0) throw new DomainError("wrongState", { reasons });
    const [release] = await tx.select({ id: releases.id, contentHash: releases.contentHash }).from(releases).where(eq(releases.briefingId, briefingId)).orderBy(desc(releases.number)).limit(1);
    if (!release) throw new DomainError("notFound", { briefingId });
    await tx.insert(releaseEvents).values({ releaseId: release.id, kind: "withdrawn", notice, actor: ctx.actor.id, at: ctx.now });
    await tx
      .update(deliveries)
      .set({ state: "suppressed", finishedAt: ctx.now })
      .where(sql`${deliveries.releaseId} = ${release.id} and ${deliveries.state} in ('queued', 'deferred')`);
    await enqueueWithdrawal(tx, { releaseId: release.id });
    await tx.update(briefings).set({ state: "withdrawn", revision: null, version: sql`${briefings.version} + 1`, updatedAt: ctx.now }).where(eq(briefings.id, briefingId));
    await audit(tx, ctx, { action: "briefing.withdraw", subject: `briefing/${briefingId}`, objectHash: release.contentHash, reason });
    return { slug: whole.row.slug };
  });
}
