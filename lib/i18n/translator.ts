import { createTranslator } from "next-intl";
import type { Locale } from "./locales";
import { loadMessages, type Messages } from "./messages";

/** Words of one namespace in one language, outside a request: for commands, mail and the worker. */
export async function translatorOf<N extends keyof Messages>(locale: Locale, namespace: N) {
  return createTranslator<Messages, N>({ locale, messages: await loadMessages(locale), namespace, timeZone: "UTC" });
}
