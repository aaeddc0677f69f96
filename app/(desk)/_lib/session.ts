import { and, eq, gt } from "drizzle-orm";
import { cookies, headers } from "next/headers";
import { redirect } from "next/navigation";
import { cache } from "react";
import { db } from "@/db/client";
import { sessions, users } from "@/db/schema";
import { can, type Permission } from "@/lib/auth/permissions";
import type { Actor, StaffCtx } from "@/lib/context";

export const SESSION_COOKIE = "ebbmark.session";

/** The signed-in member of staff, or null. One query per request. */
export const findStaff = cache(async (): Promise<Actor | null> => {
  const token = (await cookies()).get(SESSION_COOKIE)?.value;
  if (!token) return null;
  const [row] = await db
    .select({ id: users.id, name: users.name, email: users.email, role: users.role, locale: users.locale })
    .from(sessions)
    .innerJoin(users, eq(users.id, sessions.userId))
    .where(and(eq(sessions.sessionToken, token), gt(sessions.expires, new Date()), eq(users.status, "active")));
  return row ? { kind: "staff", ...row } : null;
});

/** For pages: sends a signed-out reader to sign-in, and one without the permission to the page that says so. */
export async function requireStaff(permission: Permission = "desk:read"): Promise<Actor> {
  const actor = await findStaff();
  if (!actor) redirect("/sign-in");
  if (!can(actor.role, permission)) redirect(`/desk/not-allowed?needs=${encodeURIComponent(permission)}`);
  return actor;
}

/** Context of a command that a page, action or route runs for a member of staff. */
export async function staffCtx(actor: Actor): Promise<StaffCtx> {
  return { actor, now: new Date(), requestId: (await headers()).get("x-request-id") ?? crypto.randomUUID() };
}
