import DKIM from "nodemailer/lib/dkim";
import MailComposer from "nodemailer/lib/mail-composer";
import { encode, wrap } from "nodemailer/lib/qp";
import type { Locale } from "../i18n/locales";
import { fillSlots, SINCE, TOKEN, type WrittenMail } from "./model";

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

export type MailFacts = {
  locale: Locale;
  /** Mail to the list: carries what mail programs need to stop it. */
  list: boolean;
  /** Separates the parts; drawn from what is sent, so that a second attempt sends the same bytes. Hex. */
  boundary: string;
};
/** What differs from message to message. `token` and `since` only in mail to the list. */
export type Reader = { to: string; messageId: string; date: Date; token: string; since: string };

/**
 * Prepares a mail for any number of readers: what is the same for all is encoded once, and each reader costs one joining
 * of strings (and one signature, where mail is signed). The bytes depend on the arguments alone.
 */
export async function prepareMessage(mail: WrittenMail, facts: MailFacts, sender: Sender): Promise<(reader: Reader) => Promise<Buffer>> {
  const head = await headTemplate(mail.subject, facts, sender);
  const [text, html] = [bodyPieces(mail.text, (words) => words), bodyPieces(mail.html, escapeHtml)];
  const mark = `--=_${facts.boundary}`;
  const part = (type: string, pieces: Piece[], reader: Reader) => `${mark}\r\nContent-Type: text/${type}; charset=utf-8\r\nContent-Transfer-Encoding: quoted-printable\r\n\r\n${join(pieces, reader)}\r\n`;
  return async (reader) => {
    const message = `${head(reader)}\r\n\r\n${part("plain", text, reader)}${part("html", html, reader)}${mark}--\r\n`;
    const bytes = Buffer.from(message, "latin1");
    return sender.dkim ? sign(bytes, sender.dkim) : bytes;
  };
}

const ENGLISH_NAMES = new Intl.DisplayNames("en", { type: "language" });
const prepared = (key: string, value: string) => ({ key, value: { prepared: true, value } });

/** Every list field once: a library that is given two addresses for one writes two fields (EM-02), so ours are ready-made. */
function fieldsOf({ locale, list }: MailFacts, { base, domain, replyTo, authority }: Sender) {
  const phrase = `${authority} briefings (${ENGLISH_NAMES.of(locale)})`;
  const quoted = /^[\x20-\x7e]+$/.test(phrase) ? `"${phrase.replace(/["\\]/g, "")}" ` : "";
  return [
    prepared("Auto-Submitted", "auto-generated"),
    prepared("Content-Language", locale),
    ...(list
      ? [
          prepared("List-Id", `${quoted}<briefings-${locale}.${domain}>`),
          prepared("List-Help", `<${base}/${locale}/subscribe>`),
          prepared("List-Unsubscribe-Post", "List-Unsubscribe=One-Click"),
          prepared("List-Archive", `<${base}/${locale}/releases>`),
          prepared("List-Owner", `<mailto:${replyTo}>`),
        ]
      : []),
  ];
}

/** Letters, digits and signs that need no quoting: nothing in it can end a field or name a second recipient. */
const PLAIN_ADDRESS = /^[A-Za-z0-9.!#$%&'*+/=?^_`{|}~-]+@[A-Za-z0-9.-]+$/;
const OWN_FIELDS = /^(?:To|Date|Message-ID|MIME-Version|Content-[\w-]+):/i;

/** The header without a blank line after it. The library encodes what isn't ASCII; fields of one reader are put in last. */
async function headTemplate(subject: string, facts: MailFacts, sender: Sender): Promise<(reader: Reader) => string> {
  const composer = new MailComposer({ from: sender.from, replyTo: sender.replyTo, subject, text: "", headers: fieldsOf(facts, sender), disableFileAccess: true, disableUrlAccess: true });
  const made = (await composer.compile().build()).toString("latin1");
  const shared = made
    .slice(0, made.indexOf("\r\n\r\n"))
    .split(/\r\n(?![ \t])/)
    .filter((field) => !OWN_FIELDS.test(field) || /^Content-Language:/i.test(field));
  return ({ to, messageId, date, token }) => {
    if (!PLAIN_ADDRESS.test(to)) throw new Error("an address can't be written into a header");
    return [
      ...shared,
      ...(facts.list ? [`List-Unsubscribe: <${sender.base}/u/${token}>`] : []),
      `To: ${to}`,
      `Date: ${date.toUTCString().replace(/GMT$/, "+0000")}`,
      `Message-ID: ${messageId}`,
      "MIME-Version: 1.0",
      `Content-Type: multipart/alternative;\r\n boundary="=_${facts.boundary}"`,
    ].join("\r\n");
  };
}

/** A stretch of lines that is encoded already, or one line that waits for its reader. */
type Piece = string | ((reader: Reader) => string);

// Line by line: a hard line break ends every soft one, so lines without slots never change with those that have them. A
// lone CR or LF becomes a line end like any other before it is signed; it could be read as the end of a message.
function bodyPieces(body: string, write: (words: string) => string): Piece[] {
  const pieces: Piece[] = [];
  for (const line of body.split(/\r\n?|\n/)) {
    const before = pieces.at(-1);
    if (line.includes(TOKEN) || line.includes(SINCE)) pieces.push(({ token, since }) => encodeLine(fillSlots(line, { token, since: write(since) })));
    else if (typeof before === "string") pieces[pieces.length - 1] = `${before}\r\n${encodeLine(line)}`;
    else pieces.push(encodeLine(line));
  }
  return pieces;
}

const encodeLine = (line: string): string => wrap(encode(line), 76);
const join = (pieces: readonly Piece[], reader: Reader): string => pieces.map((piece) => (typeof piece === "string" ? piece : piece(reader))).join("\r\n");

const ESCAPES: Record<string, string> = { "&": "&amp;", "<": "&lt;", ">": "&gt;", '"': "&quot;" };
const escapeHtml = (text: string): string => text.replace(/[&<>"]/g, (sign) => ESCAPES[sign] ?? sign);

async function sign(message: Buffer, { domain, selector, privateKey }: Dkim): Promise<Buffer> {
  const signed = new DKIM({ domainName: domain, keySelector: selector, privateKey, headerFieldNames: SIGNED_FIELDS }).sign(message);
  const chunks: Buffer[] = [];
  for await (const chunk of signed) chunks.push(chunk as Buffer);
  const bytes = Buffer.concat(chunks);
  // The library sends unsigned where the key is of no use; an installation that asked for signatures must notice.
  if (!bytes.subarray(0, 15).toString("latin1").toLowerCase().startsWith("dkim-signature:")) throw new Error("the DKIM key can't sign");
  return bytes;
}

/** Own return path per message, so that a bounce names its delivery without being read. @param id of the delivery */
export const returnPathOf = (id: string, domain: string): string => `bounces+${id}@${domain}`;
