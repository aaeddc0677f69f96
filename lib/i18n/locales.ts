/** The languages of the product: code, own name, direction. Adding one is one line here and one message file. */
export const LOCALES = {
  en: { name: "English", dir: "ltr" },
  es: { name: "Español", dir: "ltr" },
  fr: { name: "Français", dir: "ltr" },
  uk: { name: "Українська", dir: "ltr" },
  vi: { name: "Tiếng Việt", dir: "ltr" },
  hi: { name: "हिन्दी", dir: "ltr" },
  ar: { name: "العربية", dir: "rtl" },
} as const satisfies Record<string, { name: string; dir: "ltr" | "rtl" }>;

export type Locale = keyof typeof LOCALES;
export const LOCALE_CODES = Object.keys(LOCALES) as Locale[];
export const SOURCE_LOCALE: Locale = "en";
/** Digits stay Latin in every language so that figures can be compared. */
export const numberLocale = (locale: Locale): string => `${locale}-u-nu-latn`;

export function isLocale(value: unknown): value is Locale {
  return typeof value === "string" && Object.hasOwn(LOCALES, value);
}
