import type { Metadata } from "next";
import { getTranslations } from "next-intl/server";
import { TextSections } from "@/components/public/text-sections";
import { readLocale } from "../../_lib/locale-param";
import { pageMetadata } from "../../_lib/metadata";
import { PublicPage } from "../../_lib/public-page";

type Props = { params: Promise<{ locale: string }> };

export async function generateMetadata({ params }: Props): Promise<Metadata> {
  const locale = await readLocale(params);
  const t = await getTranslations("Public.method");
  return pageMetadata({ title: t("title"), description: t("lead"), locale, path: "/method" });
}

export default async function Method({ params }: Props) {
  const locale = await readLocale(params);
  const t = await getTranslations("Public.method");
  return (
    <PublicPage locale={locale} path="/method">
      <h1>{t("title")}</h1>
      <p className="col plead">{t("lead")}</p>
      <TextSections sections={(["model", "inputs", "growth", "range", "assumptions", "rounding", "trace"] as const).map((key) => ({ key, title: t(`sections.${key}.title`), text: t(`sections.${key}.text`) }))} />
    </PublicPage>
  );
}
