import type { Locale } from "../i18n/locales";

export type MailLink = { text: string; href: string };

/** One piece of a mail's body. The text part and the HTML part are both made from these, so they can't say different things. */
export type MailBlock =
  | { kind: "text"; text: string }
  /** What a reader must not miss: a correction or a withdrawal. */
  | { kind: "notice"; lead: string; texts: string[]; lang: Locale }
  | { kind: "figures"; head: [figure: string, value: string, range: string]; rows: FigureRow[]; note: string }
  | { kind: "changes"; title: string; head: [figure: string, before: string, now: string]; rows: { label: string; before: string; now: string }[] }
  | { kind: "list"; title: string; items: { title: string; text: string }[] }
  | { kind: "button"; link: MailLink };

export type FigureRow = { label: string; value: string; range: string | null };
export type FootLine = { text: string; links: MailLink[] };

/** A mail before it is written as text and HTML. */
export type MailModel = {
  locale: Locale;
  subject: string;
  /** Who sends it, above everything. */
  sender: string;
  title: string;
  meta: string | null;
  blocks: MailBlock[];
  foot: FootLine[];
};

/** Subject and both parts. A mail to many still holds `TOKEN` and `SINCE` where each reader's own words go. */
export type WrittenMail = { subject: string; text: string; html: string };

// Private-use characters: no writer can type them into a briefing by accident, and they pass through HTML unchanged.
export const TOKEN = "\ue000t\ue001";
export const SINCE = "\ue000s\ue001";

/** Fills in what differs from reader to reader. @param token base64url, so it needs no escaping anywhere */
export const fillSlots = (text: string, { token, since }: { token: string; since: string }): string => text.replaceAll(TOKEN, token).replaceAll(SINCE, since);

/** One line of clean text: composed, without control characters, at most `max` characters. */
export function cleanLine(text: string, max: number): string {
  const line = text.normalize("NFC").replace(/[\p{Cc}\p{Zl}\p{Zp}]+/gu, " ").replace(/ {2,}/g, " ").trim();
  if (line.length <= max) return line;
  const cut = line.slice(0, max - 1);
  // Never half a character, and rather a whole word.
  return `${cut.replace(/[\ud800-\udbff]$/, "").replace(/\s+\S{0,20}$/, "")}…`;
}
