import NextAuth from "next-auth";
import { authOptions } from "@/lib/auth/options";

/** What the library may answer; its sign-in, callback and log routes act without our guards and stay closed. */
const OPEN = new Set(["session", "csrf"]);

type Context = { params: Promise<{ nextauth: string[] }> };

async function handle(request: Request, context: Context): Promise<Response> {
  const { nextauth } = await context.params;
  if (nextauth.length !== 1 || !OPEN.has(nextauth[0] ?? "")) return new Response(null, { status: 404 });
  return (NextAuth(authOptions()) as (request: Request, context: Context) => Promise<Response>)(request, context);
}

export { handle as GET, handle as POST };
