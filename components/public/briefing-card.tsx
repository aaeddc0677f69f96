import { getTranslations } from "next-intl/server";
import { Said } from "@/components/briefings/article-notice";
import { Inlines } from "@/components/briefings/article-text";
import type { RenderedBriefing } from "@/lib/briefings/rendered";
import { formatDay, formatTime } from "@/lib/i18n/dates";
import { LOCALES, type Locale } from "@/lib/i18n/locales";
import { chooseSaid, type PublishedRelease, withdrawalOf } from "@/lib/publications/published";
import { ScheduleLine } from "./schedule-line";

/** One briefing on the first page: what is decided in two sentences, from when until when, and what became of it. */
export async function BriefingCard({ release, content, today, locale }: { release: PublishedRelease; content: RenderedBriefing; today: string; locale: Locale }) {
  const [t, article] = await Promise.all([getTranslations({ locale, namespace: "Public" }), getTranslations({ locale, namespace: "Article" })]);
  const foreign = content.locale === locale ? {} : { lang: content.locale, dir: LOCALES[content.locale].dir };
  const withdrawal = withdrawalOf(release);
  const notice = withdrawal ? chooseSaid(withdrawal.notice, locale) : null;
  const correction = release.kind === "correction" ? chooseSaid(release.correction, locale) : null;
  const short = content.parts.find(({ part }) => part === "inShort")?.paragraphs.slice(0, 2) ?? [];
  const { measures } = content.schedule;
  const day = (iso: string) => formatDay(iso, locale);
  const name = release.number > 1 ? t("card.version", { number: String(content.briefingNumber), version: String(release.number) }) : t("card.briefing", { number: String(content.briefingNumber) });
  return (
    <li>
      <h2 className="h3" {...foreign}>
        <a href={`/${locale}/briefings/${release.slug}`}>{content.title}</a>
      </h2>
      {withdrawal ? (
        <p>
          <b>{article("notice.withdrawn", { day: day(withdrawal.at) })}</b>{" "}
          <span className="mut">
            <Said said={notice && { text: notice.value, lang: notice.lang }} locale={locale} /> {article("notice.withdrawnStill")}
          </span>
        </p>
      ) : (
        <>
          {short.map((paragraph) => (
            <p key={paragraph.id} {...foreign}>
              <Inlines inlines={paragraph.inlines} linked={false} />
            </p>
          ))}
          {correction ? (
            <p className="ntc">
              <b>{article("notice.corrected", { day: day(release.publishedAt) })}</b>{" "}
              <Said said={{ text: `${correction.value.cause} ${correction.value.effect}`, lang: correction.lang }} locale={locale} />
            </p>
          ) : null}
          {measures.length > 0 ? (
            <>
              <ScheduleLine measures={measures} today={today} rtl={LOCALES[locale].dir === "rtl"} />
              <p className="meta">
                <span>{article("facts.from", { day: day(content.inForce.from) })}</span>
                <span>{content.inForce.to ? t("today.until", { day: day(content.inForce.to) }) : t("today.open")}</span>
              </p>
            </>
          ) : null}
        </>
      )}
      <p className="meta">
        <span>{name}</span>
        <span>{article("released", { day: day(release.publishedAt), time: formatTime(release.publishedAt) })}</span>
      </p>
    </li>
  );
}
