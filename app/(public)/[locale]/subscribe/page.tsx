import type { Metadata } from "next";
import { getTranslations } from "next-intl/server";
import { errorWords } from "../../_lib/error-words";
import { readLocale } from "../../_lib/locale-param";
import { pageMetadata } from "../../_lib/metadata";
import { PublicPage } from "../../_lib/public-page";
import { SubscribeForm } from "./_subscribe-form";

type Props = { params: Promise<{ locale: string }> };

export async function generateMetadata({ params }: Props): Promise<Metadata> {
  const locale = await readLocale(params);
  const t = await getTranslations("Subscribe");
  return pageMetadata({ title: t("title"), description: t("lead"), locale, path: "/subscribe" });
}

export default async function Subscribe({ params }: Props) {
  const locale = await readLocale(params);
  const t = await getTranslations("Subscribe");
  return (
    <PublicPage locale={locale} path="/subscribe">
      <h1>{t("title")}</h1>
      <section className="pbox">
        <h2>{t("heading")}</h2>
        <p className="mut">{t("lead")}</p>
        <SubscribeForm
          locale={locale}
          words={{ email: t("email"), language: t("language"), button: t("button"), summary: t("summary"), errors: await errorWords(locale) }}
        />
        <p className="mut fine">
          {t("consent")} <a href={`/${locale}/privacy`}>{t("privacy")}</a>
        </p>
      </section>
    </PublicPage>
  );
}
