import { getTranslations } from "next-intl/server";
import type { Locale } from "@/lib/i18n/locales";

/** The text isn't there in the reader's language: said in their language, with the language that stands in for it. */
export async function FallbackNote({ locale, shown }: { locale: Locale; shown: Locale }) {
  const t = await getTranslations({ locale, namespace: "Locale" });
  return <p className="ntc">{t("fallback", { shown: t(`names.${shown}`) })}</p>;
}
