import { formatDay } from "@/lib/i18n/dates";
import { LOCALES, type Locale } from "@/lib/i18n/locales";
import type { ArticleNotice, ArticleWords, NoticeText } from "./article-types";

/** What a reader must know before reading on: that this was corrected, withdrawn, or has a newer version. */
export function Notice({ notice, locale, foreign, t }: { notice: ArticleNotice; locale: Locale; foreign: boolean; t: ArticleWords }) {
  const day = formatDay(notice.at, locale);
  const own = foreign ? { lang: locale, dir: LOCALES[locale].dir } : {};
  if (notice.kind === "withdrawn") {
    return (
      <div className="ntc" {...own}>
        <p>
          <b>{t("notice.withdrawn", { day })}</b> <Said said={notice.text} locale={locale} /> {t("notice.withdrawnStill")}
        </p>
      </div>
    );
  }
  if (notice.kind === "outdated") {
    return (
      <div className="ntc" {...own}>
        <p>
          <b>{t(notice.corrected ? "notice.mistake" : "notice.outdated", { day })}</b> <a href={notice.newestHref}>{t("notice.newest")}</a>
        </p>
      </div>
    );
  }
  return (
    <div className="ntc" {...own}>
      <p>
        <b>{t("notice.corrected", { day })}</b> <Said said={notice.cause} locale={locale} /> <Said said={notice.effect} locale={locale} />{" "}
        {notice.earlierHref ? <a href={notice.earlierHref}>{t("notice.earlier")}</a> : null}
      </p>
      {notice.changed.length > 0 ? (
        <table className="figs">
          <caption>{t("notice.changed")}</caption>
          <thead>
            <tr>
              <th scope="col">{t("figures.figure")}</th>
              <th scope="col">{t("notice.before")}</th>
              <th scope="col">{t("notice.now")}</th>
            </tr>
          </thead>
          <tbody>
            {notice.changed.map(({ label, before, now }) => (
              <tr key={label}>
                <th scope="row">{label}</th>
                <td>
                  <bdi>{before}</bdi>
                </td>
                <td>
                  <bdi>{now}</bdi>
                </td>
              </tr>
            ))}
          </tbody>
        </table>
      ) : null}
    </div>
  );
}

/** A sentence that people wrote; marked with its own language where that isn't the page's. */
export function Said({ said, locale }: { said: NoticeText | null; locale: Locale }) {
  if (!said) return null;
  if (said.lang === locale) return said.text;
  return (
    <span lang={said.lang} dir={LOCALES[said.lang].dir}>
      {said.text}
    </span>
  );
}
