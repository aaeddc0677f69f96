import { type Locale, numberLocale } from "./locales";

const NO_BREAK = "\u00a0";
/** Day before month, as the other languages of the product have it. */
const dateLocale = (locale: Locale): string => numberLocale(locale).replace(/^en-/, "en-GB-");

/** The second set of month names, used east of Egypt; both are shown so that nobody has to guess. */
const LEVANTINE = ["كانون الثاني", "شباط", "آذار", "نيسان", "أيار", "حزيران", "تموز", "آب", "أيلول", "تشرين الأول", "تشرين الثاني", "كانون الأول"];

type Repair = (text: string, date: Date, withYear: boolean) => string;
/** Where the platform's wording isn't what a reader expects in running text. */
const REPAIR: Partial<Record<Locale, Repair>> = {
  ar: (text, date) => text.replace(/(\p{L}+)/u, `$1 (${LEVANTINE[date.getUTCMonth()]})`),
  fr: (text) => text.replace(/^1(?=\s)/, "1er"),
  uk: (text) => text.replace(/ р\.$/, " року"),
  vi: (_, date, withYear) => `ngày ${date.getUTCDate()} tháng ${date.getUTCMonth() + 1}${withYear ? ` năm ${date.getUTCFullYear()}` : ""}`,
};

/**
 * A calendar day in words, month in letters.
 * @param iso "2027-03-08", or a moment, of which the UTC day counts
 */
export function formatDay(iso: string, locale: Locale, { year = true }: { year?: boolean } = {}): string {
  const date = new Date(iso);
  const text = new Intl.DateTimeFormat(dateLocale(locale), {
    timeZone: "UTC",
    day: "numeric",
    month: "long",
    ...(year ? { year: "numeric" } : {}),
  }).format(date);
  const repaired = REPAIR[locale]?.(text, date, year) ?? text;
  return repaired.replace(/(\d(?:er)?) (?=\p{L})/u, `$1${NO_BREAK}`);
}

/** Hours and minutes of a moment with the zone named: "16:00 UTC". */
export function formatTime(iso: string): string {
  return `${new Date(iso).toISOString().slice(11, 16)}${NO_BREAK}UTC`;
}

/** Short name of a month for an axis. @param iso first day of the month */
export function monthName(iso: string, locale: Locale): string {
  return new Intl.DateTimeFormat(numberLocale(locale), { timeZone: "UTC", month: "short" }).format(new Date(iso));
}
