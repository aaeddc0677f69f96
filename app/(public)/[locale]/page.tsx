import type { Metadata } from "next";
import { getTranslations } from "next-intl/server";
import { BriefingCard } from "@/components/public/briefing-card";
import { Changes } from "@/components/public/changes";
import { Today } from "@/components/public/today";
import { capitalise } from "@/lib/i18n/capitalise";
import { changesOf, withdrawalOf } from "@/lib/publications/published";
import { readLocale } from "../_lib/locale-param";
import { pageMetadata } from "../_lib/metadata";
import { PublicPage } from "../_lib/public-page";
import { findSite, listCurrent, listReleases } from "../_lib/published";

type Props = { params: Promise<{ locale: string }> };

// The page names the day. Publishing refreshes it at once; otherwise it is made anew at midnight, and hourly at least.
export const revalidate = 3600;

export async function generateMetadata({ params }: Props): Promise<Metadata> {
  const locale = await readLocale(params);
  const [t, site] = await Promise.all([getTranslations("Public"), findSite(locale)]);
  return pageMetadata({ title: t("home.metaTitle", { authority: site.authority }), description: t("home.lead"), locale, path: "" });
}

export default async function Home({ params }: Props) {
  const locale = await readLocale(params);
  const [t, current, releases] = await Promise.all([getTranslations("Public"), listCurrent(locale), listReleases()]);
  const inForce = current.filter(({ release }) => !withdrawalOf(release));
  const withdrawn = current.filter(({ release }) => withdrawalOf(release));
  const contents = inForce.map(({ content }) => content);
  const oneOutbreak = new Set(inForce.map(({ release }) => release.outbreakId)).size === 1;
  // Place and illness as the reader's language names them, where any briefing has that language.
  const only = oneOutbreak ? (contents.find((content) => content.locale === locale) ?? contents[0]) : undefined;
  const today = new Date().toISOString().slice(0, 10);
  return (
    <PublicPage locale={locale} path="" demonstration={only ? { place: only.place, illness: only.outbreakName } : undefined}>
      <h1>{only ? t("home.titleOf", { illness: capitalise(only.outbreakName, only.locale), place: only.place }) : t("home.title")}</h1>
      <p className="col mut plead">{t("home.lead")}</p>
      <div className="pgrid pgap">
        <div>
          {current.length === 0 ? <p className="col">{t("home.none")}</p> : null}
          <Today briefings={inForce} today={today} locale={locale} />
          <ul className="cards">
            {[...inForce, ...withdrawn].map(({ release, content }) => (
              <BriefingCard key={release.id} release={release} content={content} today={today} locale={locale} />
            ))}
          </ul>
        </div>
        <aside>
          <Changes changes={changesOf(releases).slice(0, 6)} locale={locale} />
          <div className="updates">
            <b>{t("home.updates")}</b>
            <p className="mut">{t("home.updatesLead")}</p>
            <a className="btn pri big-btn" href={`/${locale}/subscribe`}>
              {t("home.subscribe")}
            </a>
          </div>
        </aside>
      </div>
    </PublicPage>
  );
}
