import { getTranslations } from "next-intl/server";
import type { PartKey } from "@/lib/briefings/constants";
import type { RenderedBriefing } from "@/lib/briefings/rendered";
import { capitalise } from "@/lib/i18n/capitalise";
import { formatDay, formatTime } from "@/lib/i18n/dates";
import { LOCALES, type Locale } from "@/lib/i18n/locales";
import { Facts } from "./article-facts";
import { Notice } from "./article-notice";
import { Schedule } from "./article-schedule";
import { Inlines, Paragraphs } from "./article-text";
import type { ArticleNotice, ArticleRelease, ArticleWords } from "./article-types";
import { Caution } from "./caution";
import { PeopleGrids } from "./people-grid";

/**
 * A briefing exactly as residents see it: for the public page, the desk's preview and the review. Its words come from
 * the catalogue of the text's own language, whatever language surrounds it. Stand it inside an element with class "pub".
 */
export async function BriefingArticle({
  content,
  notice,
  release,
  readerLocale = content.locale,
  withCaution = false,
}: {
  content: RenderedBriefing;
  notice?: ArticleNotice | undefined;
  /** Absent in previews: nothing is released yet. */
  release?: ArticleRelease | undefined;
  /** Language of the page around it: the notice speaks it, also where the text stands in another. */
  readerLocale?: Locale;
  /** Public pages have the caution in their foot; a preview shows it under the text. */
  withCaution?: boolean;
}) {
  const t = await getTranslations({ locale: content.locale, namespace: "Article" });
  const { locale } = content;
  const day = (iso: string) => formatDay(iso, locale);
  return (
    <article lang={locale} dir={LOCALES[locale].dir}>
      <h1>{content.title}</h1>
      <p className="pmeta">
        {t("meta", { illness: capitalise(content.outbreakName, locale), place: content.place, number: String(content.briefingNumber) })}
        {" · "}
        {release ? t("released", { day: day(release.publishedAt), time: formatTime(release.publishedAt) }) : t("notReleased")}
        {release && release.number > 1 ? ` · ${t("version", { number: String(release.number) })}` : null}
      </p>
      {notice ? <Notice notice={notice} locale={readerLocale} foreign={readerLocale !== locale} t={await getTranslations({ locale: readerLocale, namespace: "Article" })} /> : null}
      <div className="pgrid">
        <div>
          {PARTS.map((part) => (
            <Part key={part} part={part} content={content} t={t} />
          ))}
          <Figures content={content} release={release} t={t} />
          {withCaution ? (
            <section className="psec">
              <Caution locale={locale} demonstration={content.demonstration ? { place: content.place, illness: content.outbreakName } : null} />
            </section>
          ) : null}
        </div>
        <aside aria-label={t("facts.title")}>
          <Facts content={content} release={release} t={t} />
        </aside>
      </div>
    </article>
  );
}

const PARTS: PartKey[] = ["inShort", "whatToDo", "whatWeExpect", "howSure", "whatWeDontKnow", "howToObject"];

function Part({ part, content, t }: { part: PartKey; content: RenderedBriefing; t: ArticleWords }) {
  const paragraphs = content.parts.find((each) => each.part === part)?.paragraphs ?? [];
  const scheduled = part === "whatToDo" && content.schedule.measures.length > 0;
  const peopled = part === "whatWeExpect" && content.people !== null;
  const near = part === "howSure" && content.nearThreshold;
  if (paragraphs.length === 0 && !scheduled && !peopled && !near) return null;
  return (
    <section className="psec">
      <h2>{t(`parts.${part}`)}</h2>
      {part === "inShort" ? (
        <ul className="short">
          {paragraphs.map((paragraph) => (
            <li key={paragraph.id}>
              <Inlines inlines={paragraph.inlines} />
            </li>
          ))}
        </ul>
      ) : (
        <Paragraphs paragraphs={paragraphs} />
      )}
      {scheduled ? <Schedule content={content} t={t} /> : null}
      {peopled ? <PeopleGrids content={content} t={t} /> : null}
      {near ? <p className="ntc col">{t("near")}</p> : null}
    </section>
  );
}

/** Every bound figure with what it is: the place that the figures in the text lead to. */
function Figures({ content, release, t }: { content: RenderedBriefing; release: ArticleRelease | undefined; t: ArticleWords }) {
  if (content.figures.length === 0) return null;
  return (
    <section className="psec" id="figures">
      <h2>{t("figures.title")}</h2>
      <p className="col">
        {t("figures.lead")} {content.roundingNote ? t("figures.rounding") : null}
      </p>
      <table className="figs">
        <thead>
          <tr>
            <th scope="col">{t("figures.figure")}</th>
            <th scope="col">{t("figures.shown")}</th>
          </tr>
        </thead>
        <tbody>
          {byOrigin(content.figures).map(([first, ...others]) => (
            <tr key={first.ref} id={first.ref}>
              <th scope="row">{first.label}</th>
              <td>
                <bdi>{first.text}</bdi>
                {others.map(({ ref, text }) => (
                  <bdi key={ref} id={ref} className="iv">
                    {" "}
                    {text}
                  </bdi>
                ))}
              </td>
            </tr>
          ))}
        </tbody>
      </table>
      {release ? (
        <p className="mut figs-end">
          {t("figures.calculation")} <bdi className="hash">{release.assessmentHash.slice(0, 16)}</bdi>. <a href={release.methodHref}>{t("figures.method")}</a>
        </p>
      ) : null}
    </section>
  );
}

type Shown = RenderedBriefing["figures"][number];

/** A figure and its interval share a row. */
function byOrigin(figures: readonly Shown[]): [Shown, ...Shown[]][] {
  const rows = new Map<string, [Shown, ...Shown[]]>();
  for (const figure of [...figures].sort((a, b) => Number(a.form === "interval") - Number(b.form === "interval"))) {
    const key = `${figure.figure} ${figure.package}`;
    const row = rows.get(key);
    if (row) row.push(figure);
    else rows.set(key, [figure]);
  }
  return [...rows.values()];
}
