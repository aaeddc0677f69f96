import { and, asc, count, desc, eq, like, max } from "drizzle-orm";
import { db } from "@/db/client";
import { sessions, users } from "@/db/schema";
import { requirePermission } from "@/lib/auth/require-permission";
import type { StaffCtx } from "@/lib/context";

/** Everybody who works here, with when they last signed in. */
export async function listUsers(ctx: StaffCtx) {
  requirePermission(ctx.actor, "user:manage");
  return db
    .select({ id: users.id, name: users.name, email: users.email, role: users.role, status: users.status, locale: users.locale, lastSignIn: max(sessions.createdAt) })
    .from(users)
    .leftJoin(sessions, eq(sessions.userId, users.id))
    .groupBy(users.id)
    .orderBy(asc(users.status), asc(users.role), asc(users.name));
}

/** One's own open sessions, newest first. The tokens stay here. */
export const listOwnSessions = (ctx: StaffCtx) =>
  db.select({ createdAt: sessions.createdAt, expires: sessions.expires }).from(sessions).where(eq(sessions.userId, ctx.actor.id)).orderBy(desc(sessions.createdAt));

/** The invented people whom the demonstration offers on its sign-in page; nobody else, however many work here. */
export const listDemonstrationPeople = () =>
  db
    .select({ id: users.id, name: users.name, role: users.role })
    .from(users)
    .where(and(eq(users.status, "active"), like(users.id, "demo-%")))
    .orderBy(asc(users.role), asc(users.name));

export async function countUsers(): Promise<number> {
  const [row] = await db.select({ n: count() }).from(users);
  return row?.n ?? 0;
}
