import { eq } from "drizzle-orm";
import type { z } from "zod";
import { users } from "@/db/schema";
import { audit } from "@/lib/audit/audit";
import { requirePermission } from "@/lib/auth/require-permission";
import { inTransaction, type StaffCtx } from "@/lib/context";
import { DomainError } from "@/lib/errors";
import { keepAnAdministrator } from "./last-administrator";
import { ChangeRoleInput } from "./schema";

/** @throws DomainError "notReady" where it would leave nobody who can manage people */
export async function changeRole(ctx: StaffCtx, raw: z.input<typeof ChangeRoleInput>): Promise<void> {
  requirePermission(ctx.actor, "user:manage");
  const { userId, role } = ChangeRoleInput.parse(raw);
  await inTransaction(ctx, async (tx) => {
    const [user] = await tx.select({ role: users.role, status: users.status }).from(users).where(eq(users.id, userId)).for("update");
    if (!user || user.status === "left") throw new DomainError("notFound");
    if (user.role === role) return;
    if (role !== "administrator") await keepAnAdministrator(tx, userId);
    await tx.update(users).set({ role }).where(eq(users.id, userId));
    await audit(tx, ctx, { action: "user.changeRole", subject: `user/${userId}`, facts: { from: user.role, to: role } });
  });
}
