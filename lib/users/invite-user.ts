import { eq } from "drizzle-orm";
import type { z } from "zod";
import { users } from "@/db/schema";
import { audit } from "@/lib/audit/audit";
import { requirePermission } from "@/lib/auth/require-permission";
import { inTransaction, type StaffCtx } from "@/lib/context";
import { env } from "@/lib/env";
import { DomainError } from "@/lib/errors";
import { enqueueMail } from "@/lib/jobs/enqueue";
import { InviteUserInput } from "./schema";

/** Invites somebody, or invites again whoever left. @throws DomainError "conflict" where the address works here already */
export async function inviteUser(ctx: StaffCtx, raw: z.input<typeof InviteUserInput>): Promise<{ id: string }> {
  requirePermission(ctx.actor, "user:manage");
  const { name, email, role, locale } = InviteUserInput.parse(raw);
  return inTransaction(ctx, async (tx) => {
    const [known] = await tx.select({ id: users.id, status: users.status }).from(users).where(eq(users.email, email)).for("update");
    if (known && known.status !== "left") throw new DomainError("conflict", { reasons: ["addressInUse"] });
    const [row] = known
      ? await tx.update(users).set({ name, role, locale, status: "invited", invitedBy: ctx.actor.id }).where(eq(users.id, known.id)).returning({ id: users.id })
      : await tx.insert(users).values({ name, email, role, locale, invitedBy: ctx.actor.id }).returning({ id: users.id });
    if (!row) throw new Error("no user was written");
    await enqueueMail(tx, { kind: "invitation", recipient: email, locale, payload: { link: `${env().EBBMARK_URL}/sign-in`, inviter: ctx.actor.name, role } });
    await audit(tx, ctx, { action: "user.invite", subject: `user/${row.id}`, facts: { role } });
    return row;
  });
}
