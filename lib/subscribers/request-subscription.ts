import { eq } from "drizzle-orm";
import type { z } from "zod";
import { subscriptions } from "@/db/schema";
import { audit } from "@/lib/audit/audit";
import { type Ctx, inTransaction } from "@/lib/context";
import { env } from "@/lib/env";
import { enqueueMail } from "@/lib/jobs/enqueue";
import { takePoint } from "@/lib/rate-limits";
import { CONFIRM_WITHIN_HOURS, CONSENT_TEXT_VERSION, HOUR_MS, MAILS_PER_ADDRESS } from "./constants";
import { RequestSubscriptionInput } from "./schema";
import { counterKey, newConfirmToken, pseudonym } from "./token";

/**
 * Asks for the one confirmation mail. The outcome and the work are the same whether or not the address is known: a new
 * address gets a row, a known one a new token. Somebody already on the list gets the same mail; confirming it changes
 * nothing for them. Above the limit per address nothing is sent, and the answer is still the same.
 */
export async function requestSubscription(ctx: Ctx, raw: z.input<typeof RequestSubscriptionInput>): Promise<void> {
  const { email, locale } = RequestSubscriptionInput.parse(raw);
  const within = await takePoint(counterKey("subscribe-address", email), { limit: MAILS_PER_ADDRESS, windowMs: HOUR_MS, now: ctx.now });
  if (!within) return;
  const { token, hash } = newConfirmToken();
  const asked = { confirmTokenHash: hash, confirmExpires: new Date(ctx.now.getTime() + CONFIRM_WITHIN_HOURS * HOUR_MS) };
  await inTransaction(ctx, async (tx) => {
    await tx
      .insert(subscriptions)
      .values({ email, locale, consentText: CONSENT_TEXT_VERSION, requestedAt: ctx.now })
      .onConflictDoNothing();
    const [row] = await tx
      .select({ id: subscriptions.id, state: subscriptions.state })
      .from(subscriptions)
      .where(eq(subscriptions.email, email))
      .for("update");
    if (!row) throw new Error("a subscription vanished while it was asked for");
    // Somebody on the list keeps their language and their consent as they gave it.
    const anew = row.state === "active" ? {} : { state: "pending" as const, locale, consentText: CONSENT_TEXT_VERSION, requestedAt: ctx.now, leftAt: null };
    await tx
      .update(subscriptions)
      .set({ ...asked, ...anew })
      .where(eq(subscriptions.id, row.id));
    await enqueueMail(tx, {
      kind: "confirmSubscription",
      recipient: email,
      locale,
      payload: { link: `${env().EBBMARK_URL}/${locale}/confirm/${token}`, hours: String(CONFIRM_WITHIN_HOURS) },
    });
    await audit(tx, ctx, { action: "subscription.request", subject: pseudonym(row.id), facts: { locale, consentText: CONSENT_TEXT_VERSION } });
  });
}
