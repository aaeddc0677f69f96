import { capitalise } from "../../i18n/capitalise";
import type { Locale } from "../../i18n/locales";
import { translatorOf } from "../../i18n/translator";
import type { FootLine } from "../model";

export const SUBJECT_MAX = 200;

/** Orders first, then what the figures are, then that all of it is invented where it is. */
export async function cautionLines(locale: Locale, invented: { place: string; outbreakName: string } | null): Promise<FootLine[]> {
  const [t, caution] = await Promise.all([translatorOf(locale, "Mail"), translatorOf(locale, "Caution")]);
  return [
    { text: t("caution.orders"), links: [] },
    { text: t("caution.figures"), links: [] },
    ...(invented ? [{ text: caution("demonstrationOf", { place: invented.place, illness: capitalise(invented.outbreakName, locale) }), links: [] }] : []),
  ];
}

/** Who sent it, and where to write. An address to write to may be a mailbox or a page. */
export async function senderLine(locale: Locale, authority: string, contact: string): Promise<FootLine> {
  const t = await translatorOf(locale, "Mail");
  const href = contact.includes("@") ? `mailto:${contact}` : contact;
  return { text: t("sender", { authority }), links: [{ text: contact, href }] };
}
