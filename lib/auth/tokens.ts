import { createHash, createHmac, randomBytes } from "node:crypto";
import { env } from "@/lib/env";

export const newToken = (): string => randomBytes(32).toString("base64url");

/** What is stored of a sign-in link: useless without the link, the secret, and the browser that asked. */
export const signInTokenHash = (token: string, browserKey: string): string =>
  createHmac("sha256", env().EBBMARK_SECRET).update(`sign-in:${token}:${browserKey}`).digest("hex");

/** Key of a counter; the network or address itself is nowhere stored. */
export const counterKey = (kind: string, value: string): string =>
  `${kind}:${createHash("sha256").update(`${env().EBBMARK_SECRET}:${value}`).digest("hex").slice(0, 32)}`;
