import { eq } from "drizzle-orm";
import { subscriptions } from "@/db/schema";
import { audit } from "@/lib/audit/audit";
import { type Ctx, inTransaction } from "@/lib/context";
import { DomainError } from "@/lib/errors";
import { hashConfirmToken, isConfirmToken, pseudonym } from "./token";

/**
 * Uses a confirmation link, once and in time.
 * @throws DomainError "expired" for a link that is unknown, used, replaced by a newer one, or older than 48 hours
 */
export async function confirmSubscription(ctx: Ctx, token: string): Promise<{ id: string }> {
  if (!isConfirmToken(token)) throw new DomainError("expired");
  return inTransaction(ctx, async (tx) => {
    const [row] = await tx
      .select({ id: subscriptions.id, state: subscriptions.state, expires: subscriptions.confirmExpires })
      .from(subscriptions)
      .where(eq(subscriptions.confirmTokenHash, hashConfirmToken(token)))
      .for("update");
    if (!row?.expires || row.expires <= ctx.now) throw new DomainError("expired");
    const used = { confirmTokenHash: null, confirmExpires: null };
    // Whoever opened a mail at this address has shown that it takes mail.
    const begins = row.state === "active" ? {} : { state: "active" as const, confirmedAt: ctx.now, leftAt: null };
    await tx
      .update(subscriptions)
      .set({ ...used, ...begins, suppressedAt: null })
      .where(eq(subscriptions.id, row.id));
    await audit(tx, ctx, { action: "subscription.confirm", subject: pseudonym(row.id) });
    return { id: row.id };
  });
}
