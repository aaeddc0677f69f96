import { sql } from "drizzle-orm";
import { briefingTexts } from "@/db/schema";
import type { StaffCtx, Tx } from "@/lib/context";
import type { Locale } from "@/lib/i18n/locales";

/** Notes that somebody changed what one language shows without typing in its text: they may not sign it either. */
export async function recordAuthor(tx: Tx, { actor }: StaffCtx, briefingId: string, locale: Locale): Promise<void> {
  await tx
    .update(briefingTexts)
    .set({ authors: sql`array_append(${briefingTexts.authors}, ${actor.id})` })
    .where(sql`${briefingTexts.briefingId} = ${briefingId} and ${briefingTexts.locale} = ${locale} and not (${actor.id} = any (${briefingTexts.authors}))`);
}
