import { isLocale, type Locale, SOURCE_LOCALE } from "./locales";

/**
 * The first of our languages that a reader's browser asks for, by weight; a region counts as its language.
 * @param header `Accept-Language`
 */
export function negotiateLocale(header: string | null): Locale {
  const wanted = (header ?? "")
    .slice(0, 1000)
    .split(",")
    .map((part, index) => {
      const [tag = "", ...parameters] = part.trim().split(";");
      const weight = parameters.map((p) => /^\s*q=([\d.]+)\s*$/.exec(p)?.[1]).find((q) => q !== undefined);
      return { language: tag.trim().toLowerCase().split("-")[0] ?? "", weight: weight === undefined ? 1 : Number(weight), index };
    })
    .filter(({ weight }) => weight > 0)
    .sort((a, b) => b.weight - a.weight || a.index - b.index);
  for (const { language } of wanted) if (isLocale(language)) return language;
  return SOURCE_LOCALE;
}
