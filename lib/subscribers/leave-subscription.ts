import { and, eq, inArray } from "drizzle-orm";
import { deliveries, subscriptions } from "@/db/schema";
import { audit } from "@/lib/audit/audit";
import { type Ctx, inTransaction } from "@/lib/context";
import { pseudonym, readSubscriptionToken } from "./token";

/**
 * Takes a subscriber off the list at once: in the same transaction every mail that still waits for them is held back.
 * Doing it again changes nothing. A link that we didn't make, and one whose subscription is erased, are answered alike.
 * @returns whether there is, or was until now, such a subscription
 */
export async function leaveSubscription(ctx: Ctx, token: string, method: "link" | "oneClick"): Promise<boolean> {
  const id = readSubscriptionToken(token);
  if (!id) return false;
  return inTransaction(ctx, async (tx) => {
    // The row lock orders this before or after the dispatcher's last look at the subscription.
    const [row] = await tx.select({ state: subscriptions.state }).from(subscriptions).where(eq(subscriptions.id, id)).for("update");
    if (!row) return false;
    if (row.state === "left") return true;
    await tx
      .update(subscriptions)
      .set({ state: "left", leftAt: ctx.now, confirmTokenHash: null, confirmExpires: null })
      .where(eq(subscriptions.id, id));
    const held = await tx
      .update(deliveries)
      .set({ state: "suppressed", finishedAt: ctx.now })
      .where(and(eq(deliveries.subscriptionId, id), inArray(deliveries.state, ["queued", "deferred"])))
      .returning({ id: deliveries.id });
    await audit(tx, ctx, { action: "subscription.leave", subject: pseudonym(id), facts: { method, heldBack: held.length } });
    return true;
  });
}
