import { cookies, headers } from "next/headers";
import { findStaff, sessionCookie, staffCtx } from "@/app/(desk)/_lib/session";
import { signOut } from "@/lib/auth/sign-out";
import { env } from "@/lib/env";

/** POST only, from our own pages; works without JavaScript. */
export async function POST(): Promise<Response> {
  const origin = new URL(env().EBBMARK_URL).origin;
  if ((await headers()).get("origin") !== origin) return new Response(null, { status: 403 });
  const jar = await cookies();
  const token = jar.get(sessionCookie())?.value;
  const actor = await findStaff();
  if (actor && token) await signOut(await staffCtx(actor), token);
  jar.delete(sessionCookie());
  return new Response(null, { status: 303, headers: { Location: `${origin}/sign-in`, "Cache-Control": "no-store" } });
}
