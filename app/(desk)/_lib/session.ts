import { cookies, headers } from "next/headers";
import { redirect } from "next/navigation";
import { getServerSession } from "next-auth";
import { cache } from "react";
import { sessionCookieName } from "@/lib/auth/constants";
import { authOptions } from "@/lib/auth/options";
import { can, type Permission } from "@/lib/auth/permissions";
import type { Actor, StaffCtx } from "@/lib/context";
import { env } from "@/lib/env";

export const sessionCookie = (): string => sessionCookieName(env().EBBMARK_URL.startsWith("https:"));

/** The signed-in member of staff, or null. Read once per request. */
export const findStaff = cache(async (): Promise<Actor | null> => {
  // The library would look for its cookie anyway; without one there is nothing to ask the database.
  if (!(await cookies()).get(sessionCookie())) return null;
  const session = await getServerSession(authOptions());
  return session?.staff ? { kind: "staff", ...session.staff } : null;
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
