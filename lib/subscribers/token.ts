import { createHash, createHmac, randomBytes, timingSafeEqual } from "node:crypto";
import { env } from "../env";

const keyed = (purpose: string, ...parts: (string | Uint8Array)[]): Buffer => {
  const hmac = createHmac("sha256", env().EBBMARK_SECRET).update(`${purpose}\0`);
  for (const part of parts) hmac.update(part);
  return hmac.digest();
};

const ID_BYTES = 16;
const MAC_BYTES = 32;
const TOKEN = /^[A-Za-z0-9_-]{64}$/;

/**
 * The token of manage and unsubscribe links: base64url of the subscription's id and its HMAC. It needs no row of its
 * own, never expires, names one subscription, and can't be made without the installation's secret.
 */
export function subscriptionToken(id: string): string {
  const bytes = Buffer.from(id.replaceAll("-", ""), "hex");
  return Buffer.concat([bytes, keyed("subscription-link", bytes)]).toString("base64url");
}

/** The id in a token that we made, or null. */
export function readSubscriptionToken(token: string): string | null {
  if (!TOKEN.test(token)) return null;
  const bytes = Buffer.from(token, "base64url");
  if (bytes.length !== ID_BYTES + MAC_BYTES) return null;
  const id = bytes.subarray(0, ID_BYTES);
  if (!timingSafeEqual(bytes.subarray(ID_BYTES), keyed("subscription-link", id))) return null;
  return id.toString("hex").replace(/^(.{8})(.{4})(.{4})(.{4})(.{12})$/, "$1-$2-$3-$4-$5");
}

export type ConfirmToken = { token: string; hash: string };
/** A one-time confirmation token and what is stored of it. */
export function newConfirmToken(): ConfirmToken {
  const token = randomBytes(32).toString("base64url");
  return { token, hash: hashConfirmToken(token) };
}
export const hashConfirmToken = (token: string): string => createHash("sha256").update(token).digest("hex");
export const isConfirmToken = (token: string): boolean => /^[A-Za-z0-9_-]{43}$/.test(token);

/** How a subscription appears in the register: always the same, and no way back to the address. */
export const pseudonym = (id: string): string => `subscription/${keyed("pseudonym", id).toString("hex").slice(0, 32)}`;
/** Key of a counter: never the address or network itself. */
export const counterKey = (kind: string, value: string): string => `${kind}:${keyed("counter", kind, "\0", value).toString("hex")}`;
