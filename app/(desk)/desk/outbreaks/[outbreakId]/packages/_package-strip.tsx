import { getFormatter, getTranslations } from "next-intl/server";
import { ScheduleStripChart } from "@/components/charts/schedule-strip-chart";
import { listMeasuresById } from "@/lib/measures/queries";
import { dateOf } from "@/lib/packages/days";
import type { Package } from "@/lib/packages/queries";

/** The schedule of one package, drawn on the server. */
export async function PackageStrip({ row, dayZero }: { row: Package; dayZero: string }) {
  const [t, format, measures] = await Promise.all([getTranslations("Packages"), getFormatter(), listMeasuresById(row.items.map(({ measureId }) => measureId))]);
  if (row.items.length === 0) return <p className="mut">{t("nothing")}</p>;
  const items = row.items.map(({ measureId, startDay, endDay }, index) => {
    const measure = measures.find(({ id }) => id === measureId);
    return { key: `${measureId}-${index}`, name: measure?.name ?? "?", startDay, endDay, leadTimeDays: measure?.leadTimeDays ?? 0, maxDays: measure?.maxDays ?? null };
  });
  const day = (iso: string, options: Intl.DateTimeFormatOptions) => format.dateTime(new Date(`${iso}T00:00:00Z`), options as never);
  return (
    <figure>
      <ScheduleStripChart
        items={items}
        dayZero={dayZero}
        letter={row.letter}
        title={t("strip", { letter: row.letter })}
        description={t("stripDesc")}
        monthOf={(iso) => day(iso, { month: "short" })}
        dateOfDay={(n) => day(dateOf(dayZero, n), { day: "numeric", month: "short" })}
      />
      <p className="how">{t("stripKey")}</p>
    </figure>
  );
}
