import type { Metadata } from "next";
import { getTranslations } from "next-intl/server";
import { Said } from "@/components/briefings/article-notice";
import { formatDay } from "@/lib/i18n/dates";
import { LOCALES } from "@/lib/i18n/locales";
import { changesOf, chooseSaid, chooseText, withdrawalOf } from "@/lib/publications/published";
import { readLocale } from "../../_lib/locale-param";
import { pageMetadata } from "../../_lib/metadata";
import { PublicPage } from "../../_lib/public-page";
import { findSite, listReleases } from "../../_lib/published";

type Props = { params: Promise<{ locale: string }> };

export async function generateMetadata({ params }: Props): Promise<Metadata> {
  const locale = await readLocale(params);
  const t = await getTranslations("Public.corrections");
  return pageMetadata({ title: t("title"), description: t("lead"), locale, path: "/corrections" });
}

/** The public log of mistakes and withdrawals. */
export default async function Corrections({ params }: Props) {
  const locale = await readLocale(params);
  const [t, words, article, releases, site] = await Promise.all([
    getTranslations("Public.corrections"),
    getTranslations("Public.card"),
    getTranslations("Article.notice"),
    listReleases(),
    findSite(locale),
  ]);
  const entries = changesOf(releases).filter(({ kind }) => kind === "corrected" || kind === "withdrawn");
  return (
    <PublicPage locale={locale} path="/corrections">
      <h1>{t("title")}</h1>
      <p className="col mut plead">{t("lead")}</p>
      {entries.length === 0 ? <p className="pgap">{t("none")}</p> : null}
      <ul className="cards pgap">
        {entries.map(({ at, kind, release }) => {
          const text = chooseText(release, locale);
          const foreign = text && text.locale !== locale ? { lang: text.locale, dir: LOCALES[text.locale].dir } : {};
          const correction = kind === "corrected" ? chooseSaid(release.correction, locale) : null;
          const notice = kind === "withdrawn" ? chooseSaid(withdrawalOf(release)?.notice ?? {}, locale) : null;
          const said = correction
            ? { text: `${correction.value.cause} ${correction.value.effect}`, lang: correction.lang }
            : notice && { text: notice.value, lang: notice.lang };
          return (
            <li key={`${release.id} ${kind}`}>
              <h2 className="h3" {...foreign}>
                <a href={`/${locale}/briefings/${release.slug}/v/${release.number}`}>{text?.title}</a>
              </h2>
              <p>
                <b>{article(kind === "corrected" ? "corrected" : "withdrawn", { day: formatDay(at, locale) })}</b> <Said said={said} locale={locale} />
              </p>
              <p className="meta">
                <span>{words("version", { number: String(text?.briefingNumber ?? 0), version: String(release.number) })}</span>
              </p>
            </li>
          );
        })}
      </ul>
      <p className="col pgap">
        {t("report")}{" "}
        <a href={`mailto:${site.contact}`}>
          <bdi>{site.contact}</bdi>
        </a>
      </p>
    </PublicPage>
  );
}
