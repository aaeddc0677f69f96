import { and, eq, sql } from "drizzle-orm";
import { briefings, signatureVoids } from "@/db/schema";
import { audit } from "@/lib/audit/audit";
import type { StaffCtx, Tx } from "@/lib/context";
import { DomainError } from "@/lib/errors";
import { getWhole, stepFacts, type WholeBriefing } from "./queries";
import { reasonsAgainst } from "./workflow";

/**
 * Locks a briefing for a change. Where its present version was submitted, the change opens the next version, takes the
 * briefing back to draft and voids a signature that stood, with the reason.
 * @param version optimistic lock of the briefing, where the form carries it
 */
export async function beginEdit(tx: Tx, ctx: StaffCtx, briefingId: string, what: string, version?: number): Promise<WholeBriefing> {
  const [locked] = await tx.select({ version: briefings.version }).from(briefings).where(eq(briefings.id, briefingId)).for("update");
  if (!locked) throw new DomainError("notFound", { briefingId });
  if (version !== undefined && locked.version !== version) throw new DomainError("conflict", { briefingId });
  const whole = await getWhole(briefingId, tx);
  const reasons = reasonsAgainst("edit", stepFacts(whole, ctx.actor.id));
  if (reasons.length > 0) throw new DomainError("wrongState", { reasons });
  const reopened = whole.version !== null;
  await tx
    .update(briefings)
    .set({
      version: sql`${briefings.version} + 1`,
      updatedAt: ctx.now,
      ...(reopened ? { versionNumber: sql`${briefings.versionNumber} + 1`, state: whole.row.revision?.kind === "correction" ? "underCorrection" : "draft" } : {}),
    })
    .where(and(eq(briefings.id, briefingId)));
  if (whole.signature) {
    await tx.insert(signatureVoids).values({ reviewId: whole.signature.reviewId, reason: what, voidedBy: ctx.actor.id, at: ctx.now });
    await audit(tx, ctx, { action: "briefing.void", subject: `briefing/${briefingId}`, objectHash: whole.signature.contentHash, reason: what });
  }
  return whole;
}
