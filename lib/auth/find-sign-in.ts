import { and, eq, gt } from "drizzle-orm";
import { db } from "@/db/client";
import { verificationTokens } from "@/db/schema";
import { maskAddress } from "./normalize-identifier";
import { signInTokenHash } from "./tokens";

/** The masked address that a link is for, without using it; null where it expired, was used, or is another browser's. */
export async function findSignIn(token: string, browserKey: string, now: Date): Promise<string | null> {
  const [row] = await db
    .select({ email: verificationTokens.identifier })
    .from(verificationTokens)
    .where(and(eq(verificationTokens.token, signInTokenHash(token, browserKey)), gt(verificationTokens.expires, now)));
  return row ? maskAddress(row.email) : null;
}
