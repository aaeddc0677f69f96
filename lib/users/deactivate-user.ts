import { eq } from "drizzle-orm";
import type { z } from "zod";
import { sessions, users, verificationTokens } from "@/db/schema";
import { audit } from "@/lib/audit/audit";
import { requirePermission } from "@/lib/auth/require-permission";
import { inTransaction, type StaffCtx } from "@/lib/context";
import { DomainError } from "@/lib/errors";
import { keepAnAdministrator } from "./last-administrator";
import { DeactivateUserInput } from "./schema";

/** Ends somebody's access at once: sessions and open links go, signatures and texts stay. */
export async function deactivateUser(ctx: StaffCtx, raw: z.input<typeof DeactivateUserInput>): Promise<void> {
  requirePermission(ctx.actor, "user:manage");
  const { userId } = DeactivateUserInput.parse(raw);
  await inTransaction(ctx, async (tx) => {
    const [user] = await tx.select({ email: users.email, status: users.status }).from(users).where(eq(users.id, userId)).for("update");
    if (!user) throw new DomainError("notFound");
    if (user.status === "left") return;
    await keepAnAdministrator(tx, userId);
    await tx.update(users).set({ status: "left" }).where(eq(users.id, userId));
    await tx.delete(sessions).where(eq(sessions.userId, userId));
    await tx.delete(verificationTokens).where(eq(verificationTokens.identifier, user.email));
    await audit(tx, ctx, { action: "user.deactivate", subject: `user/${userId}` });
  });
}
