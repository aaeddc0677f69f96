import { eq, sql } from "drizzle-orm";
import type { z } from "zod";
import { briefings } from "@/db/schema";
import { findFrozen } from "@/lib/assessments/queries";
import { audit } from "@/lib/audit/audit";
import { requirePermission } from "@/lib/auth/require-permission";
import type { Revision } from "@/lib/briefings/constants";
import { getWhole, stepFacts } from "@/lib/briefings/queries";
import { recordAuthor } from "@/lib/briefings/record-author";
import { ReviseBriefingInput } from "@/lib/briefings/schema";
import { reasonsAgainst } from "@/lib/briefings/workflow";
import { inTransaction, type StaffCtx } from "@/lib/context";
import { DomainError } from "@/lib/errors";

/** Opens the next version of a published briefing, as an update or a correction, on the same or another frozen assessment. */
export async function reviseBriefing(ctx: StaffCtx, raw: z.input<typeof ReviseBriefingInput>): Promise<void> {
  requirePermission(ctx.actor, "briefing:publish");
  const { briefingId, version, kind, assessmentId, notes } = ReviseBriefingInput.parse(raw);
  await inTransaction(ctx, async (tx) => {
    const [locked] = await tx.select({ version: briefings.version }).from(briefings).where(eq(briefings.id, briefingId)).for("update");
    if (locked && locked.version !== version) throw new DomainError("conflict", { briefingId });
    const whole = await getWhole(briefingId, tx);
    const reasons = reasonsAgainst(kind === "correction" ? "correct" : "update", stepFacts(whole, ctx.actor.id));
    if (assessmentId) {
      const frozen = await findFrozen(assessmentId, tx);
      if (!frozen || frozen.outbreakId !== whole.frozen.outbreakId || !frozen.context.packages.some(({ letter }) => letter === whole.row.packageLetter)) reasons.push("otherAssessment");
    }
    if (reasons.length > 0) throw new DomainError("wrongState", { reasons });
    const given = Object.fromEntries(Object.entries(notes ?? {}).filter(([, note]) => note?.cause && note.effect));
    const revision: Revision = kind === "correction" ? { kind, notes: given } : { kind };
    await tx
      .update(briefings)
      .set({ state: kind === "correction" ? "underCorrection" : "draft", revision, versionNumber: sql`${briefings.versionNumber} + 1`, version: sql`${briefings.version} + 1`, updatedAt: ctx.now, ...(assessmentId ? { assessmentId } : {}) })
      .where(eq(briefings.id, briefingId));
    await recordAuthor(tx, ctx, briefingId, whole.row.sourceLocale);
    await audit(tx, ctx, { action: kind === "correction" ? "briefing.correct" : "briefing.update", subject: `briefing/${briefingId}`, facts: { kind } });
  });
}
