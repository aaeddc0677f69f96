import { and, eq, sql } from "drizzle-orm";
import type { z } from "zod";
import { measures } from "@/db/schema";
import { audit } from "@/lib/audit/audit";
import { requirePermission } from "@/lib/auth/require-permission";
import { canonicalJson } from "@/lib/canonical-json";
import { inTransaction, type StaffCtx } from "@/lib/context";
import { DomainError } from "@/lib/errors";
import { codeTaken, holderOfCode, measureValues } from "./measure-values";
import { UpdateMeasureInput } from "./schema";

/**
 * Changes a measure; the register names what changed. Frozen assessments keep the copy that they were frozen with.
 * @throws DomainError "notFound"; "conflict" where somebody saved in between; "invalid" where another has the code
 */
export async function updateMeasure(ctx: StaffCtx, raw: z.input<typeof UpdateMeasureInput>): Promise<void> {
  requirePermission(ctx.actor, "measure:write");
  const { id, version, ...facts } = UpdateMeasureInput.parse(raw);
  const values = measureValues(facts);
  await inTransaction(ctx, async (tx) => {
    const [held] = await tx.select().from(measures).where(eq(measures.id, id)).for("update");
    if (!held) throw new DomainError("notFound", { measureId: id });
    if (held.code !== values.code && (await holderOfCode(tx, values.code)) !== null) throw codeTaken();
    const [row] = await tx
      .update(measures)
      .set({ ...values, version: sql`${measures.version} + 1`, updatedAt: ctx.now })
      .where(and(eq(measures.id, id), eq(measures.version, version)))
      .returning({ version: measures.version });
    if (!row) throw new DomainError("conflict", { measureId: id });
    const changed = Object.entries(values).flatMap(([key, value]) => (canonicalJson(value) === canonicalJson(held[key as keyof typeof values]) ? [] : [key]));
    await audit(tx, ctx, { action: "measure.update", subject: `measure/${id}`, facts: { version: row.version, changed: changed.join(",") } });
  });
}
