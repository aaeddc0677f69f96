import type { Metadata } from "next";
import { getTranslations } from "next-intl/server";
import { formatDay } from "@/lib/i18n/dates";
import { LOCALES } from "@/lib/i18n/locales";
import { chooseText, ofSlug, type PublishedRelease, withdrawalOf } from "@/lib/publications/published";
import { readLocale } from "../../_lib/locale-param";
import { pageMetadata } from "../../_lib/metadata";
import { PublicPage } from "../../_lib/public-page";
import { listReleases } from "../../_lib/published";

type Props = { params: Promise<{ locale: string }> };

export async function generateMetadata({ params }: Props): Promise<Metadata> {
  const locale = await readLocale(params);
  const t = await getTranslations("Public.releases");
  return pageMetadata({ title: t("title"), description: t("lead"), locale, path: "/releases" });
}

export default async function Releases({ params }: Props) {
  const locale = await readLocale(params);
  const [t, words, releases] = await Promise.all([getTranslations("Public.releases"), getTranslations("Public.card"), listReleases()]);
  return (
    <PublicPage locale={locale} path="/releases">
      <h1>{t("title")}</h1>
      <p className="col mut plead">{t("lead")}</p>
      {releases.length === 0 ? (
        <p className="pgap">{t("none")}</p>
      ) : (
        <table className="list pgap">
          <thead>
            <tr>
              <th scope="col">{t("day")}</th>
              <th scope="col">{t("briefing")}</th>
              <th scope="col">{t("state")}</th>
            </tr>
          </thead>
          <tbody>
            {releases.map((release) => {
              const text = chooseText(release, locale);
              const foreign = text && text.locale !== locale ? { lang: text.locale, dir: LOCALES[text.locale].dir } : {};
              return (
                <tr key={release.id}>
                  <td>
                    <time dateTime={release.publishedAt}>{formatDay(release.publishedAt, locale)}</time>
                  </td>
                  <th scope="row">
                    <a href={`/${locale}/briefings/${release.slug}/v/${release.number}`} {...foreign}>
                      {text?.title}
                    </a>
                    <small>{words("version", { number: String(text?.briefingNumber ?? 0), version: String(release.number) })}</small>
                  </th>
                  <td>{t(`states.${standing(release, releases)}`)}</td>
                </tr>
              );
            })}
          </tbody>
        </table>
      )}
    </PublicPage>
  );
}

function standing(release: PublishedRelease, releases: PublishedRelease[]): "newest" | "superseded" | "corrected" | "withdrawn" {
  const versions = ofSlug(releases, release.slug);
  if (withdrawalOf(versions[0] ?? release)) return "withdrawn";
  const next = versions.filter(({ number }) => number > release.number).at(-1);
  return next ? (next.kind === "correction" ? "corrected" : "superseded") : "newest";
}
