import { getRequestConfig } from "next-intl/server";
import { isLocale, SOURCE_LOCALE } from "./locales";
import { loadMessages } from "./messages";

/** Public pages name their locale by segment; staff pages and everything else speak the source language. */
export default getRequestConfig(async ({ requestLocale }) => {
  const requested = await requestLocale;
  const locale = isLocale(requested) ? requested : SOURCE_LOCALE;
  return { locale, messages: await loadMessages(locale), timeZone: "UTC" };
});
