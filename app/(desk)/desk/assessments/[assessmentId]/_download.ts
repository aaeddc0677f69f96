import { findStaff } from "../../../_lib/session";

/** One file of an assessment for a member of staff; the bytes are exactly those that were hashed. */
export async function download(id: string, file: (id: string) => Promise<{ name: string; text: string } | null>): Promise<Response> {
  const headers = { "Content-Type": "text/plain; charset=utf-8", "Cache-Control": "no-store" };
  if (!(await findStaff())) return new Response("Sign in first.", { status: 401, headers });
  const found = await file(id);
  if (!found) return new Response("This file doesn't exist, or not yet: a result is kept once the assessment is frozen.", { status: 404, headers });
  return new Response(found.text, {
    headers: { "Content-Type": "application/json; charset=utf-8", "Content-Disposition": `attachment; filename="${found.name}"`, "Cache-Control": "no-store" },
  });
}
