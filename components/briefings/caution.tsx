import { getTranslations } from "next-intl/server";
import { capitalise } from "@/lib/i18n/capitalise";
import type { Locale } from "@/lib/i18n/locales";

/** What no page of figures goes without: orders and emergency instructions first, then what the figures are. */
export async function Caution({ locale, demonstration }: { locale: Locale; demonstration: { place: string; illness: string } | true | null }) {
  const t = await getTranslations({ locale, namespace: "Caution" });
  return (
    <>
      <p>
        <b>{t("orders")}</b> {t("figures")}
      </p>
      {demonstration ? (
        <p>
          <b>{demonstration === true ? t("demonstration") : t("demonstrationOf", { place: demonstration.place, illness: capitalise(demonstration.illness, locale) })}</b>
        </p>
      ) : null}
    </>
  );
}
