import { createHmac, timingSafeEqual } from "node:crypto";
import { revalidateTag } from "next/cache";
import { env } from "@/lib/env";

const WITHIN_MS = 30_000;

/** Our own processes ask for fresh public pages; signed with the installation's secret, good for half a minute. */
export async function POST(request: Request): Promise<Response> {
  const at = request.headers.get("x-at") ?? "";
  const given = Buffer.from(request.headers.get("x-signature") ?? "", "hex");
  const wanted = createHmac("sha256", env().EBBMARK_SECRET).update(`revalidate:${at}`).digest();
  const fresh = Math.abs(Date.now() - Number(at)) < WITHIN_MS;
  if (!fresh || given.length !== wanted.length || !timingSafeEqual(given, wanted)) return new Response(null, { status: 404 });
  revalidateTag("publications", { expire: 0 });
  return new Response(null, { status: 204 });
}
