import type { Metadata } from "next";
import { getTranslations } from "next-intl/server";
import { TextSections } from "@/components/public/text-sections";
import { readLocale } from "../../_lib/locale-param";
import { pageMetadata } from "../../_lib/metadata";
import { PublicPage } from "../../_lib/public-page";
import { findSite } from "../../_lib/published";

type Props = { params: Promise<{ locale: string }> };

export async function generateMetadata({ params }: Props): Promise<Metadata> {
  const locale = await readLocale(params);
  const t = await getTranslations("Public.privacy");
  return pageMetadata({ title: t("title"), description: t("lead"), locale, path: "/privacy" });
}

export default async function Privacy({ params }: Props) {
  const locale = await readLocale(params);
  const t = await getTranslations("Public.privacy");
  const site = await findSite(locale);
  return (
    <PublicPage locale={locale} path="/privacy">
      <h1>{t("title")}</h1>
      <p className="col plead">{t("lead")}</p>
      <TextSections sections={(["reading", "updates", "consent", "leaving", "misuse", "rights"] as const).map((key) => ({ key, title: t(`sections.${key}.title`), text: t(`sections.${key}.text`) }))} />
      <p className="col pgap">
        {t("contact")}{" "}
        <a href={`mailto:${site.contact}`}>
          <bdi>{site.contact}</bdi>
        </a>
      </p>
    </PublicPage>
  );
}
