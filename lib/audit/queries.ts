import { sql } from "drizzle-orm";
import { db } from "@/db/client";
import { requirePermission } from "@/lib/auth/require-permission";
import type { StaffCtx } from "@/lib/context";
import type { ChainEntry } from "./verify";

export const PAGE_ROWS = 50;

type Raw = { seq: string | number; at: string | Date; actor: string; action: string; subject: string; canonical: string; prev_hash: Uint8Array; hash: Uint8Array; name: string | null };
export type RegisterEntry = ChainEntry & { actorName: string | null };

const entryOf = ({ seq, at, prev_hash, name, ...rest }: Raw): RegisterEntry => ({ ...rest, seq: Number(seq), at: new Date(at), prevHash: prev_hash, actorName: name });

/** Entries newest first, at most a page, older than `before`. */
export async function listRegister(ctx: StaffCtx, { action, subject, before }: { action?: string | undefined; subject?: string | undefined; before?: number | undefined }): Promise<RegisterEntry[]> {
  requirePermission(ctx.actor, "register:read");
  const rows = await db.execute(sql`
    select e.seq, e.at, e.actor, e.action, e.subject, e.canonical, e.prev_hash, e.hash, u.name
    from audit.entry e left join users u on u.id = e.actor
    where ${action ? sql`e.action = ${action}` : sql`true`}
      and ${subject ? sql`e.subject = ${subject}` : sql`true`}
      and ${before ? sql`e.seq < ${before}` : sql`true`}
    order by e.seq desc limit ${PAGE_ROWS}`);
  return (rows as unknown as Raw[]).map(entryOf);
}

/** An unbroken ascending run of entries, for checking the chain. */
export async function readChain(from: number, to: number): Promise<ChainEntry[]> {
  const rows = await db.execute(sql`
    select seq, at, actor, action, subject, canonical, prev_hash, hash, null as name from audit.entry where seq between ${from} and ${to} order by seq`);
  return (rows as unknown as Raw[]).map(entryOf);
}
