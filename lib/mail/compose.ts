import { createHash } from "node:crypto";
import DKIM from "nodemailer/lib/dkim";
import MailComposer from "nodemailer/lib/mail-composer";
import type { Locale } from "../i18n/locales";
import type { WrittenMail } from "./model";

/** Fields that the signature covers; fields that a message doesn't have are left out of it. */
const SIGNED_FIELDS = [
  ...["From", "Sender", "Reply-To", "Subject", "Date", "Message-ID", "To", "MIME-Version", "Content-Type", "Content-Language"],
  ...["List-Id", "List-Help", "List-Unsubscribe", "List-Unsubscribe-Post", "List-Owner", "List-Archive", "Auto-Submitted"],
].join(":");

export type Dkim = { domain: string; selector: string; privateKey: string };
export type Sender = {
  /** As in a From field: `Name <address>`. */
  from: string;
  replyTo: string;
  /** Domain of List-Id, Message-ID and bounces. */
  domain: string;
  /** Public address, without a slash at the end. */
  base: string;
  authority: string;
  dkim: Dkim | null;
};

export type MessageFacts = {
  to: string;
  locale: Locale;
  messageId: string;
  date: Date;
  /** Mail to the list: the reader's own token. */
  list: { token: string } | null;
};

/**
 * The whole message as it goes out. Made of its arguments alone, so a second attempt sends the same bytes: date and
 * Message-ID come from outside, and the boundary is drawn from the Message-ID.
 */
export async function composeMessage(mail: WrittenMail, facts: MessageFacts, sender: Sender): Promise<Buffer> {
  const message = await new MailComposer({
    from: sender.from,
    to: { name: "", address: facts.to },
    replyTo: sender.replyTo,
    subject: mail.subject,
    date: facts.date,
    messageId: facts.messageId,
    text: withLineEnds(mail.text),
    html: withLineEnds(mail.html),
    textEncoding: "quoted-printable",
    baseBoundary: createHash("sha256").update(facts.messageId).digest("hex").slice(0, 24),
    headers: headersOf(facts, sender),
    disableFileAccess: true,
    disableUrlAccess: true,
  })
    .compile()
    .build();
  return sender.dkim ? sign(message, sender.dkim) : message;
}

// Every line ends with CRLF before it is signed: a lone CR or LF could be read as the end of a message (smuggling).
const withLineEnds = (text: string): string => text.replace(/\r\n?|\n/g, "\r\n");

const ENGLISH_NAMES = new Intl.DisplayNames("en", { type: "language" });
const prepared = (key: string, value: string) => ({ key, value: { prepared: true, value } });

/** Every list field once: a library that is given two addresses for one writes two fields (EM-02), so ours are ready-made. */
function headersOf({ locale, list }: MessageFacts, { base, domain, replyTo, authority }: Sender) {
  const phrase = `${authority} briefings (${ENGLISH_NAMES.of(locale)})`;
  const quoted = /^[\x20-\x7e]+$/.test(phrase) ? `"${phrase.replace(/["\\]/g, "")}" ` : "";
  return [
    prepared("Auto-Submitted", "auto-generated"),
    prepared("Content-Language", locale),
    ...(list
      ? [
          prepared("List-Id", `${quoted}<briefings-${locale}.${domain}>`),
          prepared("List-Help", `<${base}/${locale}/subscribe>`),
          prepared("List-Unsubscribe", `<${base}/u/${list.token}>`),
          prepared("List-Unsubscribe-Post", "List-Unsubscribe=One-Click"),
          prepared("List-Archive", `<${base}/${locale}/releases>`),
          prepared("List-Owner", `<mailto:${replyTo}>`),
        ]
      : []),
  ];
}

async function sign(message: Buffer, { domain, selector, privateKey }: Dkim): Promise<Buffer> {
  const signed = new DKIM({ domainName: domain, keySelector: selector, privateKey, headerFieldNames: SIGNED_FIELDS }).sign(message);
  const chunks: Buffer[] = [];
  for await (const chunk of signed) chunks.push(chunk as Buffer);
  const bytes = Buffer.concat(chunks);
  // The library sends unsigned where the key is of no use; an installation that asked for signatures must notice.
  if (!bytes.subarray(0, 15).toString("latin1").toLowerCase().startsWith("dkim-signature:")) throw new Error("the DKIM key can't sign");
  return bytes;
}

/** Ours, fixed before anything is sent. @param id of the delivery */
export const messageIdOf = (id: string, domain: string): string => `<${id}@${domain}>`;
/** Own return path per message, so that a bounce names its delivery without being read. */
export const returnPathOf = (id: string, domain: string): string => `bounces+${id}@${domain}`;
