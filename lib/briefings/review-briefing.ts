import { eq, sql } from "drizzle-orm";
import type { z } from "zod";
import { briefings, reviews } from "@/db/schema";
import { audit } from "@/lib/audit/audit";
import { requirePermission } from "@/lib/auth/require-permission";
import { inTransaction, type StaffCtx } from "@/lib/context";
import { DomainError } from "@/lib/errors";
import { CHECKLIST_ITEMS, type ChecklistAnswer } from "./constants";
import { getWhole, stepFacts } from "./queries";
import { ReviewInput } from "./schema";
import { reasonsAgainst } from "./workflow";

/** The statement as it is shown and signed. */
export const statementOf = (facts: { version: number; locales: readonly string[]; reviewDate: string | null; hash: string }): string =>
  `I have read version ${facts.version} as the public will see it in ${facts.locales.join(", ")}. I did not write or translate it. I have answered every question of the checklist. In my view it may lawfully be published in this form until ${facts.reviewDate ?? "further notice"}. I know that any change to its text, figures, dates, translations or audience cancels this approval. Page fingerprint: ${facts.hash}.`;

/** Signs or returns exactly the version that was read. @throws DomainError "ownWork" | "conflict" | "wrongState" */
export async function reviewBriefing(ctx: StaffCtx, raw: z.input<typeof ReviewInput>): Promise<void> {
  requirePermission(ctx.actor, "briefing:review");
  const { briefingId, versionId, decision, comment, items } = ReviewInput.parse(raw);
  await inTransaction(ctx, async (tx) => {
    await tx.select({ id: briefings.id }).from(briefings).where(eq(briefings.id, briefingId)).for("update");
    const whole = await getWhole(briefingId, tx);
    const { row, version } = whole;
    if (!version || version.id !== versionId) throw new DomainError("conflict", { briefingId });
    const reasons = reasonsAgainst(decision, stepFacts(whole, ctx.actor.id));
    if (version.authors.includes(ctx.actor.id) && !reasons.includes("ownWork")) reasons.push("ownWork");
    if (reasons.length > 0) throw new DomainError(reasons.includes("ownWork") ? "ownWork" : "wrongState", { reasons });
    const checklist = Object.fromEntries(
      CHECKLIST_ITEMS.flatMap((n): [string, ChecklistAnswer][] => {
        const item = items?.[`i${n}`];
        return item?.answer ? [[String(n), { answer: item.answer, note: item.note }]] : [];
      }),
    );
    const statement = statementOf({ version: version.number, locales: row.locales, reviewDate: row.reviewDate, hash: version.contentHash });
    await tx.insert(reviews).values({
      versionId, decision: decision === "sign" ? "signed" : "returned", reviewer: ctx.actor.id, reviewerName: ctx.actor.name, reviewerRole: ctx.actor.role,
      checklist, comment, statement: decision === "sign" ? statement : "", contentHash: version.contentHash, at: ctx.now,
    });
    await tx.update(briefings).set({ state: decision === "sign" ? "approved" : "changesAsked", version: sql`${briefings.version} + 1`, updatedAt: ctx.now }).where(eq(briefings.id, briefingId));
    await audit(tx, ctx, { action: decision === "sign" ? "briefing.sign" : "briefing.return", subject: `briefing/${briefingId}`, objectHash: version.contentHash, facts: { version: version.number }, ...(comment ? { reason: comment } : {}) });
  });
}
