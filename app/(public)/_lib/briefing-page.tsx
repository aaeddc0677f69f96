import type { Metadata } from "next";
import { notFound } from "next/navigation";
import { getTranslations } from "next-intl/server";
import type { ArticleNotice } from "@/components/briefings/article-types";
import { BriefingArticle } from "@/components/briefings/briefing-article";
import { FallbackNote } from "@/components/public/fallback-note";
import type { RenderedBriefing } from "@/lib/briefings/rendered";
import { capitalise } from "@/lib/i18n/capitalise";
import type { Locale } from "@/lib/i18n/locales";
import { changedFigures } from "@/lib/publications/changed-figures";
import { chooseSaid, chooseText, type PublishedRelease, withdrawalOf } from "@/lib/publications/published";
import { pageMetadata } from "./metadata";
import { PublicPage } from "./public-page";
import { findContent } from "./published";

export async function briefingMetadata(release: PublishedRelease, locale: Locale, path: string): Promise<Metadata> {
  const text = chooseText(release, locale);
  const content = text ? await findContent(release.id, text.locale) : null;
  if (!text || !content) return {};
  const t = await getTranslations({ locale: text.locale, namespace: "Article" });
  return pageMetadata({
    title: text.title,
    description: t("meta", { illness: capitalise(content.outbreakName, content.locale), place: content.place, number: String(content.briefingNumber) }),
    locale,
    path,
    locales: release.texts.map((each) => each.locale),
  });
}

/** One version of a briefing under its own or the moving address, with what a reader must know about its standing. */
export async function BriefingPage({
  release,
  versions,
  locale,
  path,
}: {
  release: PublishedRelease;
  /** Every release of this briefing, newest first. */
  versions: PublishedRelease[];
  locale: Locale;
  path: string;
}) {
  const text = chooseText(release, locale);
  const content = text ? await findContent(release.id, text.locale) : null;
  if (!content) notFound();
  const versionHref = (number: number) => `/${locale}/briefings/${release.slug}/v/${number}`;
  return (
    <PublicPage locale={locale} path={path} demonstration={{ place: content.place, illness: content.outbreakName }}>
      {content.locale === locale ? null : <FallbackNote locale={locale} shown={content.locale} />}
      <BriefingArticle
        content={content}
        readerLocale={locale}
        notice={await noticeOf(release, versions, content, locale)}
        release={{
          publishedAt: release.publishedAt,
          number: release.number,
          assessmentHash: release.assessmentHash,
          versions: versions.map(({ number, kind, publishedAt }) => ({ number, kind, publishedAt, href: number === release.number ? null : versionHref(number) })),
          methodHref: `/${locale}/method`,
          subscribeHref: `/${locale}/subscribe`,
        }}
      />
    </PublicPage>
  );
}

async function noticeOf(release: PublishedRelease, versions: PublishedRelease[], content: RenderedBriefing, locale: Locale): Promise<ArticleNotice | undefined> {
  const said = (value: Partial<Record<Locale, string>>) => {
    const chosen = chooseSaid(value, locale);
    return chosen && chosen.value !== "" ? { text: chosen.value, lang: chosen.lang } : null;
  };
  const withdrawal = withdrawalOf(versions[0] ?? release);
  if (withdrawal) return { kind: "withdrawn", at: withdrawal.at, text: said(withdrawal.notice) };
  const next = [...versions].reverse().find(({ number }) => number > release.number);
  const newest = versions[0];
  if (next && newest) {
    return { kind: "outdated", at: next.publishedAt, corrected: next.kind === "correction", newestHref: `/${locale}/briefings/${newest.slug}` };
  }
  if (release.kind !== "correction") return undefined;
  const before = versions.find(({ number }) => number < release.number);
  const beforeContent = before ? await findContent(before.id, content.locale) : null;
  const chosen = chooseSaid(release.correction, locale);
  return {
    kind: "corrected",
    at: release.publishedAt,
    cause: chosen ? { text: chosen.value.cause, lang: chosen.lang } : null,
    effect: chosen ? { text: chosen.value.effect, lang: chosen.lang } : null,
    earlierHref: before ? `/${locale}/briefings/${before.slug}/v/${before.number}` : null,
    changed: beforeContent ? changedFigures(beforeContent, content) : [],
  };
}
