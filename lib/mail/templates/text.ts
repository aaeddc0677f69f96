import { LOCALES } from "../../i18n/locales";
import type { MailBlock, MailLink, MailModel } from "../model";

/** The text part: the same words, figures and links as the HTML part, in the same order. */
export function toText(mail: MailModel): string {
  // A number inside right-to-left text keeps its own direction.
  const isolate = LOCALES[mail.locale].dir === "rtl" ? (text: string) => `\u2068${text}\u2069` : (text: string) => text;
  const parts = [
    mail.sender,
    mail.meta === null ? mail.title : `${mail.title}\n${mail.meta}`,
    ...mail.blocks.map((block) => blockText(block, isolate)),
    "-----",
    ...mail.foot.map(({ text, links }) => [text, ...links.map(linkText)].filter((line) => line !== "").join("\n")),
  ];
  return `${parts.map(tidy).join("\n\n")}\n`;
}

function blockText(block: MailBlock, isolate: (text: string) => string): string {
  switch (block.kind) {
    case "text":
      return block.text;
    case "notice":
      return [block.lead, ...block.texts].join("\n");
    case "figures":
      return [
        ...block.rows.map(({ label, value, range }) => `${label}: ${isolate(value)}${range === null ? "" : ` (${isolate(range)})`}`),
        ...(block.note === "" ? [] : [block.note]),
      ].join("\n");
    case "changes": {
      const [, before, now] = block.head;
      return [block.title, ...block.rows.map((row) => `${row.label}: ${before} ${isolate(row.before)}; ${now} ${isolate(row.now)}`)].join("\n");
    }
    case "list":
      return [block.title, ...block.items.map(({ title, text }) => `- ${title}\n  ${text}`)].join("\n");
    case "button":
      return linkText(block.link);
  }
}

// A link whose words are its address is said once.
const linkText = ({ text, href }: MailLink): string => (href === text || href === `mailto:${text}` ? text : `${text}\n${href}`);

// Bare carriage returns and other controls have no place in a mail (they can be read as a second message).
const tidy = (text: string): string => text.replace(/\r\n?/g, "\n").replace(/[^\P{Cc}\n]/gu, "");
