import { eq } from "drizzle-orm";
import { sessions } from "@/db/schema";
import { audit } from "@/lib/audit/audit";
import { inTransaction, type StaffCtx } from "@/lib/context";

/** Ends one session. */
export async function signOut(ctx: StaffCtx, token: string): Promise<void> {
  await inTransaction(ctx, async (tx) => {
    await tx.delete(sessions).where(eq(sessions.sessionToken, token));
    await audit(tx, ctx, { action: "user.signOut", subject: `user/${ctx.actor.id}` });
  });
}
