import { useLocale, useTranslations } from "next-intl";
import type { Range } from "@/lib/charts/axes";
import { dateOf } from "@/lib/packages/days";
import { formatMoney, formatPercent, formatPersons, formatRatio, formatShortDay, type MoneyUnit } from "@/lib/figures/format";
import { isFew } from "@/lib/figures/round";
import { type Locale, numberLocale } from "@/lib/i18n/locales";

/** How this desk writes numbers, intervals and days; one place, so that a figure reads the same in sentence, table and chart. */
export function useShown(outbreak: { dayZero: string; currency: string }) {
  const t = useTranslations("Assessments");
  const tag = numberLocale(useLocale() as Locale);
  const year = outbreak.dayZero.slice(0, 4);
  const interval = ({ low, high }: Range, write: (value: number) => string) => (low === null || high === null ? null : t("interval", { low: write(low), high: write(high) }));
  const persons = (value: number) => formatPersons(value, tag);
  const ratio = (value: number) => formatRatio(value, tag);
  /** The day itself; the year only where it isn't that of day 0. */
  const day = (number: number) => {
    const iso = dateOf(outbreak.dayZero, number);
    return formatShortDay(iso, tag, !iso.startsWith(year));
  };
  return {
    tag,
    persons,
    ratio,
    day,
    /** Last day in force of something that ends: `endDay` is the first day not in force. */
    lastDay: (endDay: number) => day(endDay - 1),
    percent: (share: number) => formatPercent(share, tag),
    count: (range: Range) => ({ value: isFew(range.mid) ? t("few") : persons(range.mid), interval: interval(range, persons) }),
    ratioOf: (range: Range) => ({ value: ratio(range.mid), interval: interval(range, ratio) }),
    dayOf: (range: Range) => ({ value: day(range.mid), interval: interval(range, day) }),
    money: (range: Range, unit: MoneyUnit) => {
      const write = (value: number) => formatMoney(value, unit, tag);
      // Costs without a spread have an interval of no width: it would only look like knowledge.
      return { value: write(range.mid), interval: range.low === range.high ? null : interval(range, write) };
    },
    /** An amount in running text: "€30.5 million", the currency where the language puts it. */
    amount: (value: number) => {
      const words = new Intl.NumberFormat(tag, { notation: "compact", compactDisplay: "long", maximumSignificantDigits: 3 }).format(value);
      return new Intl.NumberFormat(tag, { style: "currency", currency: outbreak.currency, maximumFractionDigits: 0 }).format(1).replace("1", words.replaceAll(" ", "\u00a0"));
    },
  };
}
export type Shown = ReturnType<typeof useShown>;
