import type { Locale } from "./locales";

/** A name at the beginning of a sentence; scripts without capitals stay as they are. */
export function capitalise(text: string, locale: Locale): string {
  const [first = "", ...rest] = text;
  return first.toLocaleUpperCase(locale) + rest.join("");
}
