import { findStaff, staffCtx } from "@/app/(desk)/_lib/session";
import { can } from "@/lib/auth/permissions";
import { getDeliveryReport } from "@/lib/deliveries/queries";

export const dynamic = "force-dynamic";
const headers = { "Cache-Control": "no-store" };

/** Counts of deliveries, for the page that shows them while mail goes out. */
export async function GET(): Promise<Response> {
  const actor = await findStaff();
  if (!actor) return Response.json({ error: "signedOut" }, { status: 401, headers });
  if (!can(actor.role, "delivery:read")) return Response.json({ error: "forbidden" }, { status: 403, headers });
  return Response.json(await getDeliveryReport(await staffCtx(actor)), { headers });
}
