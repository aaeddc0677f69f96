import type { z } from "zod";
import { measures } from "@/db/schema";
import { audit } from "@/lib/audit/audit";
import { requirePermission } from "@/lib/auth/require-permission";
import { inTransaction, type StaffCtx } from "@/lib/context";
import { codeTaken, measureValues } from "./measure-values";
import { CreateMeasureInput } from "./schema";

/** A new measure in the catalogue. @throws DomainError "invalid" where another measure has the code */
export async function createMeasure(ctx: StaffCtx, raw: z.input<typeof CreateMeasureInput>): Promise<{ id: string }> {
  requirePermission(ctx.actor, "measure:write");
  const facts = CreateMeasureInput.parse(raw);
  return inTransaction(ctx, async (tx) => {
    const [row] = await tx
      .insert(measures)
      .values({ ...measureValues(facts), createdBy: ctx.actor.id })
      .onConflictDoNothing({ target: measures.code })
      .returning({ id: measures.id });
    if (!row) throw codeTaken();
    await audit(tx, ctx, { action: "measure.create", subject: `measure/${row.id}`, facts: { code: facts.code } });
    return row;
  });
}
