import { getLocale, getTranslations } from "next-intl/server";
import { PublicPage } from "../_lib/public-page";

export default async function NotFound() {
  const locale = await getLocale();
  const t = await getTranslations("Public");
  return (
    <PublicPage locale={locale} path="">
      <h1>{t("notFound.title")}</h1>
      <p className="col plead">{t("notFound.lead")}</p>
      <p className="pgap">
        <a className="btn pri big-btn" href={`/${locale}`}>
          {t("notFound.home")}
        </a>
      </p>
    </PublicPage>
  );
}
