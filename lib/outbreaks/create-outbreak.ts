import type { z } from "zod";
import { outbreaks } from "@/db/schema";
import { audit } from "@/lib/audit/audit";
import { requirePermission } from "@/lib/auth/require-permission";
import { inTransaction, type StaffCtx } from "@/lib/context";
import { CreateOutbreakInput } from "./schema";

export async function createOutbreak(ctx: StaffCtx, raw: z.input<typeof CreateOutbreakInput>): Promise<{ id: string }> {
  requirePermission(ctx.actor, "outbreak:write");
  const input = CreateOutbreakInput.parse(raw);
  return inTransaction(ctx, async (tx) => {
    const [row] = await tx
      .insert(outbreaks)
      .values({ ...input, createdBy: ctx.actor.id })
      .returning({ id: outbreaks.id });
    if (!row) throw new Error("no outbreak was written");
    await audit(tx, ctx, { action: "outbreak.create", subject: `outbreak/${row.id}` });
    return row;
  });
}
