"use client";
import { useLocale, useTranslations } from "next-intl";
import { useEffect, useState } from "react";
import { ScheduleStripChart } from "@/components/charts/schedule-strip-chart";
import { formatShortDay } from "@/lib/figures/format";
import { type Locale, numberLocale } from "@/lib/i18n/locales";
import { dateOf } from "@/lib/packages/days";

export type StripLine = { key: string; index: number; name: string; startDay: number; endDay: number | null; leadTimeDays: number; maxDays: number | null };

/** A package's schedule. Where it may be moved and script runs, arrow keys move a bar. */
export function PackageStrip({ lines, dayZero, letter, last, onMove }: { lines: StripLine[]; dayZero: string; letter: string; /** Last day shown, where strips share a scale. */ last?: number; onMove?: (line: StripLine, days: number) => void }) {
  const t = useTranslations("Packages");
  const locale = useLocale() as Locale;
  const [alive, setAlive] = useState(false);
  useEffect(() => setAlive(true), []);
  if (lines.length === 0) return <p className="mut">{t("nothing")}</p>;
  const shortDay = (day: number) => formatShortDay(dateOf(dayZero, day), numberLocale(locale));
  const month = new Intl.DateTimeFormat(numberLocale(locale), { month: "short", timeZone: "UTC" });
  const movable = onMove !== undefined && alive;
  return (
    <figure>
      <ScheduleStripChart
        items={lines}
        dayZero={dayZero}
        letter={letter}
        title={t("strip", { letter })}
        description={t("stripDesc")}
        monthOf={(iso) => month.format(new Date(`${iso}T00:00:00Z`))}
        dateOfDay={shortDay}
        {...(last === undefined ? {} : { last })}
        spanOf={({ startDay, endDay }) => (endDay === null ? t("spanOpen", { from: shortDay(startDay) }) : t("span", { from: shortDay(startDay), to: shortDay(endDay - 1) }))}
        {...(movable ? { onMove: (index: number, days: number) => onMove(lines[index] as StripLine, days) } : {})}
      />
      <p className="how">{movable ? t("stripKeyMove") : t("stripKey")}</p>
    </figure>
  );
}
