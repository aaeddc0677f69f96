import { and, eq, ne } from "drizzle-orm";
import type { z } from "zod";
import { users, verificationTokens } from "@/db/schema";
import { type Ctx, inTransaction } from "@/lib/context";
import { env } from "@/lib/env";
import { DomainError } from "@/lib/errors";
import { enqueueMail } from "@/lib/jobs/enqueue";
import { takePoint } from "@/lib/rate-limits";
import { LINKS_PER_ADDRESS, LINKS_PER_NETWORK, LINKS_WINDOW_MS, SIGN_IN_MINUTES } from "./constants";
import { RequestSignInInput } from "./schema";
import { counterKey, newToken, signInTokenHash } from "./tokens";

/**
 * Sends a sign-in link to invited people. The answer is the same for everybody else, and nothing is written for them.
 * Limits count per network and, apart, per address and network, so that nobody can lock somebody else out.
 * @param browser where the request came from, and the key that this browser keeps
 */
export async function requestSignIn(ctx: Ctx, raw: z.input<typeof RequestSignInInput>, browser: { network: string; key: string }): Promise<void> {
  const { email, locale } = RequestSignInInput.parse(raw);
  const limit = (kind: string, value: string, most: number) => takePoint(counterKey(kind, value), { limit: most, windowMs: LINKS_WINDOW_MS, now: ctx.now });
  const within = (await limit("sign-in-network", browser.network, LINKS_PER_NETWORK)) && (await limit("sign-in-address", `${email} ${browser.network}`, LINKS_PER_ADDRESS));
  if (!within) throw new DomainError("tooMany");
  const token = newToken();
  await inTransaction(ctx, async (tx) => {
    const [user] = await tx.select({ email: users.email, locale: users.locale }).from(users).where(and(eq(users.email, email), ne(users.status, "left")));
    if (!user) return;
    await tx.delete(verificationTokens).where(eq(verificationTokens.identifier, email));
    await tx.insert(verificationTokens).values({
      identifier: email,
      token: signInTokenHash(token, browser.key),
      expires: new Date(ctx.now.getTime() + SIGN_IN_MINUTES * 60_000),
    });
    // No register entry: asking is no act. The sign-in itself is recorded.
    await enqueueMail(tx, {
      kind: "signIn",
      recipient: email,
      locale: locale ?? user.locale,
      payload: { link: `${env().EBBMARK_URL}/sign-in/confirm?token=${token}`, minutes: String(SIGN_IN_MINUTES) },
    });
  });
}
