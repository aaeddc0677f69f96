import { createHash } from "node:crypto";
import { canonicalJson } from "@/lib/canonical-json";

export const GENESIS = createHash("sha256").update("ebbmark-register-v1", "utf8").digest();

export type ChainEntry = { seq: number; at: Date; actor: string; action: string; subject: string; canonical: string; prevHash: Uint8Array; hash: Uint8Array };

/** SHA-256("v1" ‖ previous hash ‖ int64 seq ‖ canonical text). */
export function entryHash(previous: Uint8Array, seq: number, canonical: string): Buffer {
  const number = Buffer.alloc(8);
  number.writeBigInt64BE(BigInt(seq));
  return createHash("sha256").update("v1", "utf8").update(previous).update(number).update(canonical, "utf8").digest();
}

/** What is wrong with one entry, or null. `previous` is the hash of the entry before. */
export function entryFault(entry: ChainEntry, previous: Uint8Array | null): string | null {
  if (previous !== null && !Buffer.from(entry.prevHash).equals(Buffer.from(previous))) return "does not follow the entry before";
  if (!entryHash(entry.prevHash, entry.seq, entry.canonical).equals(Buffer.from(entry.hash))) return "has another content than its fingerprint";
  const body = JSON.parse(entry.canonical) as Record<string, unknown>;
  if (canonicalJson(body) !== entry.canonical) return "is not in canonical form";
  const members = { actor: entry.actor, action: entry.action, subject: entry.subject, at: entry.at.toISOString() };
  for (const [name, value] of Object.entries(members)) if (body[name] !== value) return `has another ${name} than its content`;
  return null;
}

/** First broken entry of an ascending run, or null. */
export function firstFault(entries: readonly ChainEntry[], before: Uint8Array | null): { seq: number; fault: string } | null {
  let previous = before;
  let seq = entries[0]?.seq;
  for (const entry of entries) {
    if (entry.seq !== seq) return { seq: seq ?? 0, fault: "is missing" };
    const fault = entryFault(entry, previous);
    if (fault) return { seq: entry.seq, fault };
    previous = entry.hash;
    seq = entry.seq + 1;
  }
  return null;
}
