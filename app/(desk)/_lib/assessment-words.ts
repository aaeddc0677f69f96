import { getLocale, getTranslations } from "next-intl/server";
import type { ChartWords } from "@/lib/assessments/view";
import { type Locale, numberLocale } from "@/lib/i18n/locales";

/** The few words that drawings of an assessment carry, in the reader's language. */
export async function chartWords(): Promise<ChartWords> {
  const [t, locale] = await Promise.all([getTranslations("Charts.settling"), getLocale()]);
  return {
    noMeasures: t("noMeasures"),
    asScheduled: t("asScheduled"),
    heldFromDayZero: t("heldFromDayZero"),
    few: t("few"),
    numberLocale: numberLocale(locale as Locale),
  };
}
