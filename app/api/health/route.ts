import { sql } from "drizzle-orm";
import { db } from "@/db/client";

export const dynamic = "force-dynamic";

/** 200 where the process and its database answer; 503 otherwise. Says nothing else. */
export async function GET(): Promise<Response> {
  const ready = await db.execute(sql`select 1`).then(
    () => true,
    () => false,
  );
  return Response.json({ ready }, { status: ready ? 200 : 503, headers: { "Cache-Control": "no-store" } });
}
