import { eq, sql } from "drizzle-orm";
import type { z } from "zod";
import { measures } from "@/db/schema";
import { audit } from "@/lib/audit/audit";
import { requirePermission } from "@/lib/auth/require-permission";
import { inTransaction, type StaffCtx } from "@/lib/context";
import { DomainError } from "@/lib/errors";
import { ArchiveMeasureInput } from "./schema";

/** Takes a measure out of the catalogue, or back in. Packages and frozen assessments that hold it keep it. */
export async function archiveMeasure(ctx: StaffCtx, raw: z.input<typeof ArchiveMeasureInput>): Promise<void> {
  requirePermission(ctx.actor, "measure:write");
  const { id, archived } = ArchiveMeasureInput.parse(raw);
  await inTransaction(ctx, async (tx) => {
    const [row] = await tx
      .update(measures)
      .set({ archived: archived === "yes", version: sql`${measures.version} + 1`, updatedAt: ctx.now })
      .where(eq(measures.id, id))
      .returning({ version: measures.version });
    if (!row) throw new DomainError("notFound", { measureId: id });
    await audit(tx, ctx, { action: "measure.update", subject: `measure/${id}`, facts: { version: row.version, archived } });
  });
}
