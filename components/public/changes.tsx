import { getTranslations } from "next-intl/server";
import { formatDay } from "@/lib/i18n/dates";
import type { Locale } from "@/lib/i18n/locales";
import { type Change, chooseText } from "@/lib/publications/published";

/** What happened last, newest first. */
export async function Changes({ changes, locale }: { changes: Change[]; locale: Locale }) {
  const t = await getTranslations({ locale, namespace: "Public" });
  if (changes.length === 0) return null;
  return (
    <section className="changes">
      <h2>{t("changes.title")}</h2>
      <ul>
        {changes.map(({ at, kind, release }) => (
          <li key={`${release.id} ${kind}`}>
            <time className="mut" dateTime={at}>
              {formatDay(at, locale)}
            </time>
            <a href={`/${locale}/briefings/${release.slug}`}>{t(`changes.${kind}`, { number: String(chooseText(release, locale)?.briefingNumber ?? 0) })}</a>
          </li>
        ))}
      </ul>
      <a className="more" href={`/${locale}/releases`}>
        {t("changes.all")}
      </a>
    </section>
  );
}
