import type { Metadata } from "next";
import Link from "next/link";
import { notFound } from "next/navigation";
import { getTranslations } from "next-intl/server";
import { requireStaff } from "@/app/(desk)/_lib/session";
import { BriefingArticle } from "@/components/briefings/briefing-article";
import { getWhole, renderFacts } from "@/lib/briefings/queries";
import { pairedParagraphs, renderBriefing } from "@/lib/briefings/render";
import { isLocale, LOCALES } from "@/lib/i18n/locales";

export const metadata: Metadata = { title: "Preview" };

export default async function PreviewPage({ params }: { params: Promise<{ briefingId: string; locale: string }> }) {
  await requireStaff();
  const { briefingId, locale } = await params;
  if (!isLocale(locale)) notFound();
  const { row, texts, source, frozen } = await getWhole(briefingId).catch(() => notFound());
  const text = texts.find((each) => each.locale === locale);
  if (!text) notFound();
  const [t, content] = await Promise.all([getTranslations("Briefings"), renderBriefing(frozen, renderFacts(row), { ...text, paragraphs: pairedParagraphs(source.paragraphs, text.paragraphs) })]);
  return (
    <main id="main">
      <div className="wrap">
        <p className="sm">
          <Link href={`/desk/briefings/${briefingId}?locale=${locale}`}>{t("back")}</Link>
        </p>
        <nav className="tabs mt-3" aria-label={t("tabs")}>
          {row.locales.map((code) => (
            <Link key={code} href={`/desk/briefings/${briefingId}/preview/${code}`} aria-current={code === locale ? "page" : undefined} lang={code}>
              {LOCALES[code].name}
            </Link>
          ))}
        </nav>
      </div>
      <div className="pub" lang={locale} dir={LOCALES[locale].dir}>
        <div className="wrap mt-8">
          <BriefingArticle content={content} withCaution />
        </div>
      </div>
    </main>
  );
}
