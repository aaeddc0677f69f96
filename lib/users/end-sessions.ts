import { and, eq, ne } from "drizzle-orm";
import { sessions } from "@/db/schema";
import { audit } from "@/lib/audit/audit";
import { requirePermission } from "@/lib/auth/require-permission";
import { inTransaction, type StaffCtx } from "@/lib/context";

/** Ends every own session but the one in use. */
export async function endOtherSessions(ctx: StaffCtx, current: string): Promise<void> {
  requirePermission(ctx.actor, "desk:read");
  await inTransaction(ctx, async (tx) => {
    const ended = await tx
      .delete(sessions)
      .where(and(eq(sessions.userId, ctx.actor.id), ne(sessions.sessionToken, current)))
      .returning({ expires: sessions.expires });
    if (ended.length > 0) await audit(tx, ctx, { action: "user.signOut", subject: `user/${ctx.actor.id}`, facts: { sessions: ended.length } });
  });
}
