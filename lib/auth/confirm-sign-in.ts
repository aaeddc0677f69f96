import { and, eq, gt } from "drizzle-orm";
import type { z } from "zod";
import { sessions, users, verificationTokens } from "@/db/schema";
import { audit } from "@/lib/audit/audit";
import { type Actor, type Ctx, inTransaction, type Tx } from "@/lib/context";
import { env } from "@/lib/env";
import { DomainError } from "@/lib/errors";
import { SESSION_HOURS } from "./constants";
import { ConfirmSignInInput, DemonstrationSignInInput } from "./schema";
import { newToken, signInTokenHash } from "./tokens";

export type NewSession = { token: string; expires: Date };

/** Uses a link once: token row, user, session and register in one transaction. @throws DomainError "expired" */
export async function confirmSignIn(ctx: Ctx, raw: z.input<typeof ConfirmSignInInput>, browser: { key: string; oldSession: string | undefined }): Promise<NewSession> {
  const { token } = ConfirmSignInInput.parse(raw);
  return inTransaction(ctx, async (tx) => {
    const [used] = await tx
      .delete(verificationTokens)
      .where(and(eq(verificationTokens.token, signInTokenHash(token, browser.key)), gt(verificationTokens.expires, ctx.now)))
      .returning({ email: verificationTokens.identifier });
    if (!used) throw new DomainError("expired");
    const [user] = await tx.select().from(users).where(eq(users.email, used.email)).for("update");
    if (!user || user.status === "left") throw new DomainError("expired");
    if (user.status === "invited") await tx.update(users).set({ status: "active", emailVerified: ctx.now }).where(eq(users.id, user.id));
    return openSession(tx, ctx, user, browser.oldSession, "link");
  });
}

/** One-click sign-in of the demonstration; the caller has made sure that the request came straight over loopback. */
export async function signInForDemonstration(ctx: Ctx, raw: z.input<typeof DemonstrationSignInInput>, oldSession: string | undefined): Promise<NewSession> {
  const { userId } = DemonstrationSignInInput.parse(raw);
  if (!env().demo) throw new DomainError("notFound");
  return inTransaction(ctx, async (tx) => {
    const [user] = await tx.select().from(users).where(and(eq(users.id, userId), eq(users.status, "active")));
    if (!user) throw new DomainError("notFound");
    return openSession(tx, ctx, user, oldSession, "demonstration");
  });
}

type User = typeof users.$inferSelect;

async function openSession(tx: Tx, ctx: Ctx, user: User, oldSession: string | undefined, how: string): Promise<NewSession> {
  if (oldSession) await tx.delete(sessions).where(eq(sessions.sessionToken, oldSession));
  const session = { token: newToken(), expires: new Date(ctx.now.getTime() + SESSION_HOURS * 3_600_000) };
  await tx.insert(sessions).values({ sessionToken: session.token, userId: user.id, expires: session.expires });
  const actor: Actor = { kind: "staff", id: user.id, name: user.name, email: user.email, role: user.role, locale: user.locale };
  await audit(tx, { ...ctx, actor }, { action: "user.signIn", subject: `user/${user.id}`, facts: { how } });
  return session;
}
