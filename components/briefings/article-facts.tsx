import type { RenderedBriefing } from "@/lib/briefings/rendered";
import { formatDay } from "@/lib/i18n/dates";
import type { ArticleRelease, ArticleWords } from "./article-types";

/** Beside the text: from when, until when, on what ground, whom to ask, which version. */
export function Facts({ content, release, t }: { content: RenderedBriefing; release: ArticleRelease | undefined; t: ArticleWords }) {
  const { locale, inForce, reviewDate, authorityContact, schedule } = content;
  const later = countByDay(schedule.measures.map((measure) => measure.from).filter((day) => day !== inForce.from));
  const sooner = countByDay(schedule.measures.flatMap(({ to }) => (to === null || to === inForce.to ? [] : [to])));
  const bases = new Map(schedule.measures.filter(({ legalBasis }) => legalBasis).map(({ legalBasis, legalLink }) => [legalBasis, legalLink]));
  const day = (iso: string, year = true) => formatDay(iso, locale, { year });
  return (
    <>
      <dl className="facts">
        {schedule.measures.length > 0 ? (
          <>
            <div>
              <dt>{t("facts.inForce")}</dt>
              <dd>
                {t("facts.from", { day: day(inForce.from) })}
                {later.map(([iso, count]) => (
                  <small key={iso}>{t("facts.stepsFrom", { count, day: day(iso, iso.slice(0, 4) !== inForce.from.slice(0, 4)) })}</small>
                ))}
              </dd>
            </div>
            <div>
              <dt>{t("facts.until")}</dt>
              <dd>
                {inForce.to ? day(inForce.to) : t("facts.noEnd")}
                {sooner.map(([iso, count]) => (
                  <small key={iso}>{t("facts.stepsUntil", { count, day: day(iso, iso.slice(0, 4) !== (inForce.to ?? "").slice(0, 4)) })}</small>
                ))}
              </dd>
            </div>
          </>
        ) : null}
        {reviewDate ? (
          <div>
            <dt>{t("facts.review")}</dt>
            <dd>{day(reviewDate)}</dd>
          </div>
        ) : null}
        {bases.size > 0 ? (
          <div>
            <dt>{t("facts.legalBasis")}</dt>
            {[...bases].map(([basis, link]) => (
              <dd key={basis}>
                {basis}
                {link ? (
                  <small>
                    <a href={link}>{t("facts.order")}</a>
                  </small>
                ) : null}
              </dd>
            ))}
          </div>
        ) : null}
        <div>
          <dt>{t("facts.questions")}</dt>
          <dd>
            <a href={`mailto:${authorityContact}`}>
              <bdi>{authorityContact}</bdi>
            </a>
            <small>{t("facts.mistakes")}</small>
          </dd>
        </div>
      </dl>
      {release ? <Release release={release} content={content} t={t} /> : null}
    </>
  );
}

function Release({ release, content, t }: { release: ArticleRelease; content: RenderedBriefing; t: ArticleWords }) {
  const day = (iso: string) => formatDay(iso, content.locale);
  const corrected = release.versions.some(({ kind }) => kind === "correction");
  return (
    <>
      <div className="updates">
        <b>{t("subscribe.title")}</b>
        <p className="mut">{t("subscribe.lead")}</p>
        <a className="btn pri big-btn" href={release.subscribeHref}>
          {t("subscribe.button")}
        </a>
      </div>
      <div className="versions">
        <b>{t("versions.title")}</b>
        <ul>
          {release.versions.map(({ number, publishedAt, href, kind }) => {
            const name = t(kind === "correction" ? "versions.correction" : "versions.item", { number: String(number), day: day(publishedAt) });
            return <li key={number}>{href ? <a href={href}>{name}</a> : name}</li>;
          })}
        </ul>
        {corrected ? null : <p className="mut">{t("versions.noCorrections")}</p>}
        <p className="mut screen">{t("print")}</p>
      </div>
    </>
  );
}

function countByDay(days: string[]): [iso: string, count: number][] {
  const counts = new Map<string, number>();
  for (const day of [...days].sort()) counts.set(day, (counts.get(day) ?? 0) + 1);
  return [...counts];
}
