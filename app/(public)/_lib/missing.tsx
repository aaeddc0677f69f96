import { getTranslations } from "next-intl/server";
import type { Locale } from "@/lib/i18n/locales";
import { PublicPage } from "./public-page";

/** There is no such page, in the reader's language. */
export async function Missing({ locale }: { locale: Locale }) {
  const t = await getTranslations({ locale, namespace: "Public.notFound" });
  return (
    <PublicPage locale={locale} path="">
      <h1>{t("title")}</h1>
      <p className="col plead">{t("lead")}</p>
      <p className="pgap">
        <a className="btn pri big-btn" href={`/${locale}`}>
          {t("home")}
        </a>
      </p>
    </PublicPage>
  );
}
