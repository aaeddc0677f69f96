import { and, eq } from "drizzle-orm";
import type { z } from "zod";
import { subscriptions } from "@/db/schema";
import { audit } from "@/lib/audit/audit";
import { type Ctx, inTransaction } from "@/lib/context";
import { DomainError } from "@/lib/errors";
import { ChangeSubscriptionInput } from "./schema";
import { pseudonym, readSubscriptionToken } from "./token";

/** Changes the language of the mails to come; those already waiting stay in the language they were written for. */
export async function changeSubscription(ctx: Ctx, raw: z.input<typeof ChangeSubscriptionInput>): Promise<void> {
  const { token, locale } = ChangeSubscriptionInput.parse(raw);
  const id = readSubscriptionToken(token);
  if (!id) throw new DomainError("notFound");
  await inTransaction(ctx, async (tx) => {
    const [row] = await tx
      .update(subscriptions)
      .set({ locale })
      .where(and(eq(subscriptions.id, id), eq(subscriptions.state, "active")))
      .returning({ id: subscriptions.id });
    if (!row) throw new DomainError("notFound");
    await audit(tx, ctx, { action: "subscription.change", subject: pseudonym(id), facts: { locale } });
  });
}
