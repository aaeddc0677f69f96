import { createFormatter } from "next-intl";
import type { Locale } from "./locales";

/** Numbers and dates of staff pages: English, day before month, 24 hours, UTC. */
// Safe: formatting takes any BCP 47 tag; only catalogues are bound to the list of locales.
const formatter = createFormatter({ locale: "en-GB" as Locale, timeZone: "UTC" });
export const getDeskFormatter = () => formatter;
