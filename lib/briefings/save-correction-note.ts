import { eq } from "drizzle-orm";
import type { z } from "zod";
import { briefings } from "@/db/schema";
import { audit } from "@/lib/audit/audit";
import { requirePermission } from "@/lib/auth/require-permission";
import { inTransaction, type StaffCtx } from "@/lib/context";
import { DomainError } from "@/lib/errors";
import { beginEdit } from "./begin-edit";
import { recordAuthor } from "./record-author";
import { SaveCorrectionNoteInput } from "./schema";

/** What a correction tells residents in one language: what was wrong, and what it changes for them. @throws DomainError "conflict" | "wrongState" */
export async function saveCorrectionNote(ctx: StaffCtx, raw: z.input<typeof SaveCorrectionNoteInput>): Promise<void> {
  requirePermission(ctx.actor, "briefing:write");
  const { briefingId, version, locale, cause, effect } = SaveCorrectionNoteInput.parse(raw);
  await inTransaction(ctx, async (tx) => {
    const { row } = await beginEdit(tx, ctx, briefingId, `correction note changed (${locale})`, version);
    if (row.revision?.kind !== "correction" || !row.locales.includes(locale)) throw new DomainError("wrongState", { reasons: ["noCorrection"] });
    await tx
      .update(briefings)
      .set({ revision: { ...row.revision, notes: { ...row.revision.notes, [locale]: { cause, effect } } } })
      .where(eq(briefings.id, briefingId));
    await recordAuthor(tx, ctx, briefingId, locale);
    await audit(tx, ctx, { action: "briefing.update", subject: `briefing/${briefingId}`, facts: { correction: locale } });
  });
}
