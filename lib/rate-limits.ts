import { sql } from "drizzle-orm";
import { db } from "@/db/client";
import { rateLimits } from "@/db/schema";

/**
 * Counts one try against a limit. Stands outside the command's transaction, so that a refused try counts too.
 * @param limit tries allowed in one window
 * @returns whether this one is still within the limit
 */
export async function takePoint(key: string, { limit, windowMs, now }: { limit: number; windowMs: number; now: Date }): Promise<boolean> {
  const at = now.toISOString();
  const ends = new Date(now.getTime() + windowMs);
  const [row] = await db
    .insert(rateLimits)
    .values({ key, points: 1, windowEnds: ends })
    .onConflictDoUpdate({
      target: rateLimits.key,
      set: {
        points: sql`case when ${rateLimits.windowEnds} <= ${at}::timestamptz then 1 else ${rateLimits.points} + 1 end`,
        windowEnds: sql`case when ${rateLimits.windowEnds} <= ${at}::timestamptz then ${ends.toISOString()}::timestamptz else ${rateLimits.windowEnds} end`,
      },
    })
    .returning({ points: rateLimits.points });
  return (row?.points ?? 1) <= limit;
}
