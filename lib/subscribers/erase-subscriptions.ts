import { and, eq, lt, or } from "drizzle-orm";
import { rateLimits, subscriptions } from "@/db/schema";
import { audit } from "@/lib/audit/audit";
import { type Ctx, inTransaction } from "@/lib/context";
import { FORGET_UNCONFIRMED_DAYS, HOUR_MS, UNDO_WITHIN_MINUTES } from "./constants";

/**
 * Erases the addresses of those who left an hour ago or more and of requests that nobody confirmed, and counters that
 * have run out. The worker runs it every few minutes. What stays are deliveries without a name, and the register.
 * @returns how many subscriptions were erased
 */
export async function eraseSubscriptions(ctx: Ctx): Promise<number> {
  const ago = (ms: number) => new Date(ctx.now.getTime() - ms);
  return inTransaction(ctx, async (tx) => {
    await tx.delete(rateLimits).where(lt(rateLimits.windowEnds, ago(HOUR_MS)));
    const erased = await tx
      .delete(subscriptions)
      .where(
        or(
          and(eq(subscriptions.state, "left"), lt(subscriptions.leftAt, ago(UNDO_WITHIN_MINUTES * 60_000))),
          and(eq(subscriptions.state, "pending"), lt(subscriptions.requestedAt, ago(FORGET_UNCONFIRMED_DAYS * 24 * HOUR_MS))),
        ),
      )
      .returning({ id: subscriptions.id });
    if (erased.length > 0) {
      await audit(tx, ctx, { action: "subscription.erase", subject: "subscriptions", facts: { erased: erased.length } });
    }
    return erased.length;
  });
}
