import type en from "../../messages/en.json";
import type { Locale } from "./locales";

export type Messages = typeof en;

/** One language's catalogue. Desk namespaces that aren't translated yet fall back to English, whole. */
export async function loadMessages(locale: Locale): Promise<Messages> {
  const source = (await import("../../messages/en.json")).default;
  if (locale === "en") return source;
  const own = (await import(`../../messages/${locale}.json`)).default as Partial<Messages>;
  return { ...source, ...own };
}
