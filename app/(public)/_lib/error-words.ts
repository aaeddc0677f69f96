import { getTranslations } from "next-intl/server";
import type { Locale } from "@/lib/i18n/locales";

const KEYS = ["emailMissing", "emailLong", "emailAt", "emailBefore", "emailAfter", "languageMissing", "link", "tooMany", "expired", "notFound", "forbidden"] as const;

/** Every error that a public form can come back with, in the page's language. */
export async function errorWords(locale: Locale): Promise<Record<string, string>> {
  const t = await getTranslations({ locale, namespace: "Subscribe.errors" });
  return Object.fromEntries(KEYS.map((key) => [key, t(key)]));
}
