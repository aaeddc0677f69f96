import type { Metadata } from "next";
import { env } from "@/lib/env";
import { LOCALE_CODES, type Locale } from "@/lib/i18n/locales";

export const addressOf = (locale: Locale, path: string): string => `${env().EBBMARK_URL}/${locale}${path}`;

/** Title, description, the one address, and the same page in the languages that it exists in. */
export function pageMetadata({
  title,
  description,
  locale,
  path,
  locales = LOCALE_CODES,
}: {
  title: string;
  description: string;
  locale: Locale;
  path: string;
  locales?: readonly Locale[];
}): Metadata {
  const languages = Object.fromEntries(locales.map((each) => [each, addressOf(each, path)]));
  const fallback = locales.includes("en") ? "en" : locales[0];
  const shown = locales.includes(locale) ? locale : (fallback ?? locale);
  return {
    title,
    description,
    alternates: {
      canonical: addressOf(shown, path),
      languages: path === "" ? { ...languages, "x-default": `${env().EBBMARK_URL}/` } : { ...languages, ...(fallback ? { "x-default": addressOf(fallback, path) } : {}) },
    },
  };
}

/** Pages that belong to one person: no search engine, and their address goes nowhere. */
export const privateMetadata = (title: string): Metadata => ({ title, robots: { index: false, follow: false }, referrer: "same-origin" });
