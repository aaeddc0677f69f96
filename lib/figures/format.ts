import { threeFigures, wholePersons } from "./round";

/** Narrow no-break space: joins a number and its unit. */
const NARROW = "\u202f";
const formats = new Map<string, Intl.NumberFormat>();

function formatter(locale: string, options: Intl.NumberFormatOptions): Intl.NumberFormat {
  const key = `${locale} ${JSON.stringify(options)}`;
  const kept = formats.get(key) ?? new Intl.NumberFormat(locale, options);
  formats.set(key, kept);
  return kept;
}

/** Persons: three significant figures, grouped; a true minus sign. @param locale BCP 47, with Latin digits */
export const formatPersons = (value: number, locale: string): string => minus(formatter(locale, { maximumFractionDigits: 0 }).format(wholePersons(value)));

/** Threshold ratio or reproduction number: two decimals below 10, three figures above. */
export function formatRatio(value: number, locale: string): string {
  const options = Math.abs(value) < 9.995 ? { minimumFractionDigits: 2, maximumFractionDigits: 2 } : { maximumSignificantDigits: 3 };
  return minus(formatter(locale, options).format(value));
}

/** A share as whole per cent. @param share 0..1 */
export const formatPercent = (share: number, locale: string): string =>
  formatter(locale, { maximumFractionDigits: 0 }).format(Math.round(share * 100)) + NARROW + "%";

export type MoneyUnit = { power: 0 | 3 | 6 | 9 };
/** The unit of a row of amounts: thousand, million or billion, so that the largest has one to four digits before the point. */
export function moneyUnit(amounts: readonly number[]): MoneyUnit {
  const largest = Math.max(0, ...amounts.map(Math.abs));
  return { power: largest >= 1e10 ? 9 : largest >= 1e6 ? 6 : largest >= 1e4 ? 3 : 0 };
}

/** An amount in its row's unit, three significant figures with the last zero kept ("46.0"). */
export function formatMoney(amount: number, { power }: MoneyUnit, locale: string): string {
  const value = threeFigures(amount / 10 ** power);
  const decimals = value === 0 || Math.abs(value) >= 100 ? 0 : Math.abs(value) >= 10 ? 1 : 2;
  return minus(formatter(locale, { minimumFractionDigits: power === 0 ? 0 : decimals, maximumFractionDigits: decimals }).format(value));
}

/** An amount in full for running text, three significant figures: "€46,200,000". @param currency ISO 4217 */
export const formatMoneyInText = (amount: number, currency: string, locale: string): string =>
  minus(formatter(locale, { style: "currency", currency, maximumFractionDigits: 0 }).format(threeFigures(amount)));

const minus = (text: string) => text.replace(/^-/, "−");

/** A calendar day for tables: day and short month, the year only where asked for. @param iso yyyy-mm-dd */
export function formatShortDay(iso: string, locale: string, withYear = false): string {
  const tag = locale.replace(/^en(?=-|$)(?!-[A-Z]{2})/, "en-GB");
  const options: Intl.DateTimeFormatOptions = { timeZone: "UTC", day: "numeric", month: "short", ...(withYear ? { year: "numeric" } : {}) };
  return new Intl.DateTimeFormat(tag, options).format(new Date(`${iso}T00:00:00Z`)).replaceAll(" ", "\u00a0");
}
