import { and, eq, gt, isNotNull } from "drizzle-orm";
import { subscriptions } from "@/db/schema";
import { audit } from "@/lib/audit/audit";
import { type Ctx, inTransaction } from "@/lib/context";
import { DomainError } from "@/lib/errors";
import { UNDO_WITHIN_MINUTES } from "./constants";
import { pseudonym, readSubscriptionToken } from "./token";

/** Puts somebody who just left back on the list, within the hour. Mails held back in between are not sent after all. */
export async function undoLeaving(ctx: Ctx, token: string): Promise<void> {
  const id = readSubscriptionToken(token);
  if (!id) throw new DomainError("notFound");
  await inTransaction(ctx, async (tx) => {
    const [row] = await tx
      .update(subscriptions)
      .set({ state: "active", leftAt: null })
      .where(
        and(
          eq(subscriptions.id, id),
          eq(subscriptions.state, "left"),
          isNotNull(subscriptions.confirmedAt),
          gt(subscriptions.leftAt, new Date(ctx.now.getTime() - UNDO_WITHIN_MINUTES * 60_000)),
        ),
      )
      .returning({ id: subscriptions.id });
    if (!row) throw new DomainError("expired");
    await audit(tx, ctx, { action: "subscription.change", subject: pseudonym(id), facts: { undone: "leave" } });
  });
}
