import { headers } from "next/headers";
import { isLocale, type Locale, LOCALE_CODES, SOURCE_LOCALE } from "@/lib/i18n/locales";

/** The language of a page outside /{locale}: the one chosen by link, else the browser's first that we have. */
export async function accessLocale(): Promise<Locale> {
  const given = await headers();
  const chosen = given.get("x-ebbmark-lang");
  if (isLocale(chosen)) return chosen;
  const wanted = (given.get("accept-language") ?? "").split(",").map((part) => part.trim().slice(0, 2).toLowerCase());
  return wanted.find((code): code is Locale => (LOCALE_CODES as string[]).includes(code)) ?? SOURCE_LOCALE;
}
