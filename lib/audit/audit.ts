import { sql } from "drizzle-orm";
import type { Ctx, Tx } from "@/lib/context";
import { canonicalJson } from "@/lib/canonical-json";
import type { AuditEntry } from "./entries";

/**
 * Appends to the register inside the transaction that it records; call it last, since it locks the chain's head.
 * The canonical text (RFC 8785) is what is stored and hashed.
 */
export async function audit(tx: Tx, ctx: Ctx, entry: AuditEntry): Promise<void> {
  const { actor } = ctx;
  const body = canonicalJson({
    v: 1,
    at: ctx.now.toISOString(),
    actor: actor.kind === "staff" ? actor.id : actor.kind === "system" ? `system:${actor.process}` : "visitor",
    role: actor.kind === "staff" ? actor.role : actor.kind,
    action: entry.action,
    subject: entry.subject,
    request_id: ctx.requestId,
    ...(entry.objectHash === undefined ? {} : { object_hash: entry.objectHash }),
    ...(entry.reason === undefined ? {} : { reason: entry.reason.normalize("NFC") }),
    ...(entry.facts === undefined ? {} : { facts: entry.facts }),
  });
  await tx.execute(sql`select audit.append(${body})`);
}
