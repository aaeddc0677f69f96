import type { Locale } from "../../i18n/locales";
import { translatorOf } from "../../i18n/translator";
import { cleanLine, type MailBlock, type MailModel } from "../model";
import { SUBJECT_MAX, senderLine } from "./frame";

export type Authority = { name: string; contact: string; demonstration: boolean };
type Payload = Record<string, string>;

/** Sign-in link of a member of staff. Payload: link, minutes. */
export async function signInMail(locale: Locale, payload: Payload, authority: Authority): Promise<MailModel> {
  const t = await translatorOf(locale, "Mail");
  return frame(locale, authority, t("signIn.subject"), t("signIn.title"), [
    { kind: "text", text: t("signIn.lead", { minutes: Number(payload["minutes"]) }) },
    { kind: "button", link: { text: t("signIn.button"), href: link(payload) } },
    { kind: "text", text: t("signIn.ignore") },
  ]);
}

/** Somebody is invited to the desk. Payload: link, inviter, role. */
export async function invitationMail(locale: Locale, payload: Payload, authority: Authority): Promise<MailModel> {
  const [t, signIn] = await Promise.all([translatorOf(locale, "Mail"), translatorOf(locale, "SignIn")]);
  const key = `roles.${payload["role"] ?? ""}` as "roles.adviser";
  const role = signIn.has(key) ? signIn(key) : (payload["role"] ?? "");
  return frame(locale, authority, t("invitation.subject", { authority: authority.name }), t("invitation.title"), [
    { kind: "text", text: t("invitation.lead", { inviter: payload["inviter"] ?? authority.name, authority: authority.name, role }) },
    { kind: "text", text: t("invitation.how") },
    { kind: "button", link: { text: t("invitation.button"), href: link(payload) } },
    { kind: "text", text: t("invitation.ignore") },
  ]);
}

/** The one mail that an address gets before it is confirmed. Payload: link, hours. */
export async function confirmMail(locale: Locale, payload: Payload, authority: Authority): Promise<MailModel> {
  const t = await translatorOf(locale, "Mail");
  return frame(locale, authority, t("confirm.subject"), t("confirm.title"), [
    { kind: "text", text: t("confirm.lead", { authority: authority.name }) },
    { kind: "button", link: { text: t("confirm.button"), href: link(payload) } },
    { kind: "text", text: t("confirm.hours", { hours: Number(payload["hours"]) }) },
    { kind: "text", text: t("confirm.ignore") },
  ]);
}

async function frame(locale: Locale, authority: Authority, subject: string, title: string, blocks: MailBlock[]): Promise<MailModel> {
  const caution = await translatorOf(locale, "Caution");
  return {
    locale,
    subject: cleanLine(subject, SUBJECT_MAX),
    sender: authority.name,
    title,
    meta: null,
    blocks,
    foot: [...(authority.demonstration ? [{ text: caution("demonstration"), links: [] }] : []), await senderLine(locale, authority.name, authority.contact)],
  };
}

function link(payload: Payload): string {
  const href = payload["link"];
  if (!href) throw new Error("a mail with a link has none in its payload");
  return href;
}
