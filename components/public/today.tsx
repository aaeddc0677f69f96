import { getTranslations } from "next-intl/server";
import type { RenderedBriefing, RenderedMeasure } from "@/lib/briefings/rendered";
import { formatDay } from "@/lib/i18n/dates";
import type { Locale } from "@/lib/i18n/locales";
import type { PublishedRelease } from "@/lib/publications/published";

type Step = { measure: RenderedMeasure; slug: string; lang: Locale };

/** What is in force on this day, or what comes next. @param today ISO date */
export async function Today({
  briefings,
  today,
  locale,
}: {
  briefings: { release: PublishedRelease; content: RenderedBriefing }[];
  today: string;
  locale: Locale;
}) {
  const steps: Step[] = briefings.flatMap(({ release, content }) =>
    content.schedule.measures.map((measure) => ({ measure, slug: release.slug, lang: content.locale })),
  );
  if (steps.length === 0) return null;
  const t = await getTranslations({ locale, namespace: "Public" });
  const now = steps.filter(({ measure }) => measure.from <= today && (measure.to === null || measure.to >= today));
  const start = steps.map(({ measure }) => measure.from).filter((from) => from > today).sort()[0];
  const shown = now.length > 0 ? now : steps.filter(({ measure }) => measure.from === start);
  const day = formatDay(today, locale);
  const lead = now.length > 0 ? t("today.inForce", { day }) : start ? t("today.next", { day, start: formatDay(start, locale) }) : t("today.none", { day });
  return (
    <section className="today">
      <h2>{t("today.title")}</h2>
      <p>{lead}</p>
      {shown.length > 0 ? (
        <ul className="short">
          {shown.map(({ measure, slug, lang }) => (
            <li key={`${slug} ${measure.code}`}>
              <a className="q" href={`/${locale}/briefings/${slug}`} lang={lang === locale ? undefined : lang}>
                {measure.title}
              </a>{" "}
              <span className="mut">{measure.to ? t("today.until", { day: formatDay(measure.to, locale) }) : t("today.open")}</span>
            </li>
          ))}
        </ul>
      ) : null}
    </section>
  );
}
