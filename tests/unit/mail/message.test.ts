import { createHash, createVerify, generateKeyPairSync } from "node:crypto";
import fc from "fast-check";
import { simpleParser } from "mailparser";
import { describe, expect, test } from "vitest";
import { LOCALE_CODES, type Locale } from "@/lib/i18n/locales";
import { type MailFacts, prepareMessage, type Reader, returnPathOf, type Sender } from "@/lib/mail/compose";
import { cleanLine, fillSlots, type WrittenMail } from "@/lib/mail/model";
import { briefingMail } from "@/lib/mail/templates/briefing";
import { writeMail } from "@/lib/mail/write-mail";
import { rendered } from "../../fixtures/releases";

const token = "Zm9v".repeat(16);
const id = "6f0f4a64-7f1c-4d11-9d51-0f6f3a1c2b3d";
const sender: Sender = { from: "Kelmaren District Health Office <updates@news.example.org>", replyTo: "ask@example.org", domain: "news.example.org", base: "https://health.example.org", authority: "Kelmaren District Health Office", dkim: null };
const reader: Reader = { to: "reader@example.org", messageId: `<${id}@news.example.org>`, date: new Date("2027-03-02T16:00:00Z"), token, since: "22 & <b>" };
const facts: MailFacts = { locale: "en", list: true, boundary: "0123456789abcdef" };
const compose = async (mail: WrittenMail, from: Sender = sender, over: Partial<MailFacts> = {}, to: Partial<Reader> = {}) => (await prepareMessage(mail, { ...facts, ...over }, from))({ ...reader, ...to });
const { privateKey, publicKey } = generateKeyPairSync("rsa", { modulusLength: 2048, privateKeyEncoding: { type: "pkcs8", format: "pem" }, publicKeyEncoding: { type: "spki", format: "pem" } });
const signing = { ...sender, dkim: { domain: "news.example.org", selector: "s2027", privateKey } };

const written = async (locale: Locale) =>
  writeMail(await briefingMail({ content: rendered(locale), release: { number: 1, kind: "first", publishedAt: "2027-03-02T16:00:00Z" }, correction: null, before: null, base: sender.base }));

const messages = await Promise.all(LOCALE_CODES.map(async (locale) => ({ locale, raw: await compose(await written(locale), signing, { locale }) })));

type Field = { name: string; value: string; source: string };
/** Fields of a header, unfolded, as they stand in the bytes. */
function fieldsOf(raw: Buffer): { fields: Field[]; body: Buffer } {
  const end = raw.indexOf("\r\n\r\n");
  const lines = raw.subarray(0, end).toString("latin1").split("\r\n");
  const fields: Field[] = [];
  for (const line of lines) {
    const last = fields.at(-1);
    if (/^[ \t]/.test(line) && last) {
      last.value += line;
      last.source += `\r\n${line}`;
    } else fields.push({ name: line.slice(0, line.indexOf(":")), value: line.slice(line.indexOf(":") + 1).trim(), source: line });
  }
  return { fields, body: raw.subarray(end + 4) };
}
const only = (fields: Field[], name: string): string => {
  const found = fields.filter((field) => field.name.toLowerCase() === name);
  expect(found, name).toHaveLength(1);
  return found[0]?.value ?? "";
};

describe.each(messages)("$locale: the bytes of a briefing", ({ locale, raw }) => {
  const { fields } = fieldsOf(raw);

  test("every field that stands alone stands once", () => {
    for (const name of ["from", "to", "reply-to", "date", "message-id", "subject", "mime-version", "content-type", "list-id", "list-help", "list-unsubscribe", "list-unsubscribe-post", "list-archive", "list-owner", "auto-submitted", "content-language", "dkim-signature"]) only(fields, name);
    for (const name of ["cc", "bcc", "precedence", "return-path", "x-mailer"]) expect(fields.some((field) => field.name.toLowerCase() === name), name).toBe(false);
  });

  test("one-click unsubscribe names one address over https with the reader's token", () => {
    expect(only(fields, "list-unsubscribe")).toBe(`<https://health.example.org/u/${token}>`);
    expect(only(fields, "list-unsubscribe-post")).toBe("List-Unsubscribe=One-Click");
  });

  test("list, language and answer fields", () => {
    expect(only(fields, "list-id")).toMatch(new RegExp(`^"[ -~]+" <briefings-${locale}\\.news\\.example\\.org>$`));
    expect(only(fields, "list-id").length).toBeLessThanOrEqual(255);
    expect(only(fields, "list-help")).toBe(`<https://health.example.org/${locale}/subscribe>`);
    expect(only(fields, "list-archive")).toBe(`<https://health.example.org/${locale}/releases>`);
    expect(only(fields, "list-owner")).toBe("<mailto:ask@example.org>");
    expect(only(fields, "auto-submitted")).toBe("auto-generated");
    expect(only(fields, "content-language")).toBe(locale);
    expect(only(fields, "message-id")).toBe(`<${id}@news.example.org>`);
    expect(only(fields, "to")).toBe("reader@example.org");
  });

  test("lines end with CRLF, none is over 998 octets, bodies are quoted-printable with lines of 76 at most", () => {
    expect(raw.toString("latin1")).not.toMatch(/[^\r]\n|\r[^\n]/);
    expect(raw.every((octet) => octet < 128)).toBe(true);
    for (const line of raw.toString("latin1").split("\r\n")) expect(line.length).toBeLessThanOrEqual(998);
    const { body } = fieldsOf(raw);
    for (const line of body.toString("latin1").split("\r\n")) expect(line.length).toBeLessThanOrEqual(76 + (line.startsWith("Content-Type") || line.startsWith("--") ? 60 : 0));
    const parts = body.toString("latin1").match(/^Content-Transfer-Encoding: (.*)$/gm)?.map((line) => line.trim());
    expect(parts).toEqual(["Content-Transfer-Encoding: quoted-printable", "Content-Transfer-Encoding: quoted-printable"]);
  });

  test("encoded words of the subject are 75 characters at most and split no character", async () => {
    const source = fields.find(({ name }) => name === "Subject")?.source ?? "";
    for (const [word, , encoding, text] of source.matchAll(/=\?(UTF-8)\?([QB])\?([^?]*)\?=/g)) {
      expect(word.length).toBeLessThanOrEqual(75);
      const bytes = encoding === "B" ? Buffer.from(text ?? "", "base64") : Buffer.from((text ?? "").replaceAll("_", " ").replace(/=([0-9A-F]{2})/g, (_, hex: string) => String.fromCharCode(Number.parseInt(hex, 16))), "latin1");
      expect(() => new TextDecoder("utf-8", { fatal: true }).decode(bytes)).not.toThrow();
    }
    expect((await simpleParser(raw)).subject).toBe(rendered(locale).title);
  });

  test("another program reads both parts as they were written", async () => {
    const mail = await simpleParser(raw, { skipTextToHtml: true });
    const wanted = await written(locale);
    expect(mail.text?.trim()).toBe(fillSlots(wanted.text, { token, since: "22 & <b>" }).trim());
    expect(String(mail.html).trim()).toBe(fillSlots(wanted.html, { token, since: "22 &amp; &lt;b&gt;" }).trim());
    expect(only(fields, "content-type")).toMatch(/^multipart\/alternative/);
    const order = [...raw.toString("latin1").matchAll(/^Content-Type: (text\/\w+); charset=utf-8/gm)].map(([, type]) => type);
    expect(order).toEqual(["text/plain", "text/html"]);
  });

  test("the signature covers the list fields, has no length limit, and verifies", () => {
    const tags = signatureOf(fields);
    const signed = (tags.get("h") ?? "").toLowerCase().split(":");
    for (const name of ["from", "to", "subject", "date", "message-id", "reply-to", "list-id", "list-help", "list-unsubscribe", "list-unsubscribe-post", "list-archive", "list-owner", "auto-submitted", "content-language"]) expect(signed).toContain(name);
    expect(tags.get("a")).toBe("rsa-sha256");
    expect(tags.has("l")).toBe(false);
    expect(verifies(raw)).toBe(true);
    const changed = Buffer.from(raw.toString("latin1").replace("One-Click", "Two-Click"), "latin1");
    expect(verifies(changed)).toBe(false);
  });

  test("is the same, byte for byte, when it is written again", async () => {
    expect((await compose(await written(locale), signing, { locale })).equals(raw)).toBe(true);
  });
});

const signatureOf = (fields: Field[]) =>
  new Map(
    only(fields, "dkim-signature")
      .split(";")
      .map((tag) => tag.trim())
      .filter((tag) => tag !== "")
      .map((tag) => [tag.slice(0, tag.indexOf("=")), tag.slice(tag.indexOf("=") + 1).replace(/\s+/g, "")] as const),
  );

/** RFC 6376, relaxed/relaxed, written apart from the signer. */
function verifies(raw: Buffer): boolean {
  const { fields, body } = fieldsOf(raw);
  const tags = signatureOf(fields);
  const lines = body.toString("latin1").split("\r\n").map((line) => line.replace(/[ \t]+/g, " ").replace(/ $/, ""));
  while (lines.at(-1) === "") lines.pop();
  const bodyHash = createHash("sha256").update(`${lines.join("\r\n")}\r\n`, "latin1").digest("base64");
  const relaxed = (source: string) => `${source.slice(0, source.indexOf(":")).trim().toLowerCase()}:${source.slice(source.indexOf(":") + 1).replace(/\r\n/g, "").replace(/[ \t]+/g, " ").trim()}`;
  const left = [...fields].reverse();
  const picked = (tags.get("h") ?? "").split(":").flatMap((name) => {
    const at = left.findIndex((field) => field.name.toLowerCase() === name.toLowerCase());
    return at < 0 ? [] : left.splice(at, 1).map(({ source }) => `${relaxed(source)}\r\n`);
  });
  const own = relaxed(fields.find(({ name }) => name.toLowerCase() === "dkim-signature")?.source ?? "").replace(/\bb=[^;]*$/, "b=");
  return tags.get("bh") === bodyHash && createVerify("RSA-SHA256").update(picked.join("") + own, "latin1").verify(publicKey, tags.get("b") ?? "", "base64");
}

describe("what must not get into a message", () => {
  const nasty = "Hello\r\nBcc: victim@example.org\r\n\r\nbody\u0000\u2028x";

  test("a subject with line breaks stays one line, and long ones are cut at a word", () => {
    expect(cleanLine(nasty, 200)).toBe("Hello Bcc: victim@example.org body x");
    const cut = cleanLine(`${"word ".repeat(60)}`, 200);
    expect(cut.length).toBeLessThanOrEqual(200);
    expect(cut.endsWith("word…")).toBe(true);
    expect(cleanLine("🦠".repeat(150), 200)).not.toMatch(/[\ud800-\udbff](?![\udc00-\udfff])/);
  });

  test("neither subject nor authority can add a field or a recipient", async () => {
    const raw = await compose({ subject: cleanLine(nasty, 200), text: "x", html: "<p>x</p>" }, { ...sender, authority: 'A "quoted"\r\nBcc: x@example.org' });
    const { fields } = fieldsOf(raw);
    expect(fields.some(({ name }) => /bcc/i.test(name))).toBe(false);
    only(fields, "subject");
  });

  test.each(["reader@example.org\r\nBcc: victim@example.org", "a@example.org, b@example.org", "<a@example.org>", "a b@example.org", '"a"@example.org', "ä@example.org", "@example.org", "a@"])("the address %j is refused", async (to) => {
    await expect(compose(await written("en"), sender, {}, { to })).rejects.toThrow("header");
  });

  test("a dot on a line of its own, in any line ending, ends nothing", async () => {
    const text = "a\r.\r\nb\n.\r\nc\r\n.\nd\r.\re";
    const raw = await compose({ subject: "s", text, html: `<p>${text}</p>` });
    expect(raw.toString("latin1")).not.toMatch(/\r(?!\n)|(?<!\r)\n/);
    expect((await simpleParser(raw, { skipTextToHtml: true })).text?.trim()).toBe("a\n.\nb\n.\nc\n.\nd\n.\ne");
  });

  test("any text comes out as it went in", async () => {
    const anyLine = fc.string({ unit: "grapheme", maxLength: 300 }).map((line) => line.replace(/[\p{Cc}\p{Cs}\ue000\ue001]/gu, ""));
    await fc.assert(
      fc.asyncProperty(fc.array(anyLine, { maxLength: 6 }), async (lines) => {
        const text = lines.join("\n");
        const raw = await compose({ subject: "s", text: `[${text}]`, html: `<p>${text}</p>` });
        for (const line of raw.toString("latin1").split("\r\n")) expect(line.length).toBeLessThanOrEqual(160);
        expect((await simpleParser(raw, { skipTextToHtml: true })).text?.trim()).toBe(`[${text}]`);
      }),
      { numRuns: 200 },
    );
  });

  test("mail for one person has no list fields, but says that a machine sent it", async () => {
    const { fields } = fieldsOf(await compose({ subject: "s", text: "x", html: "<p>x</p>" }, sender, { list: false }));
    expect(fields.filter(({ name }) => /^list-/i.test(name))).toEqual([]);
    expect(only(fields, "auto-submitted")).toBe("auto-generated");
  });

  test("an authority whose name isn't ASCII has its List-Id without a phrase, and its name encoded", async () => {
    const authority = "Управління здоров’я";
    const raw = await compose(await written("uk"), { ...sender, authority, from: `${authority} <updates@news.example.org>` }, { locale: "uk" });
    expect(only(fieldsOf(raw).fields, "list-id")).toBe("<briefings-uk.news.example.org>");
    expect((await simpleParser(raw)).from?.value).toEqual([{ name: authority, address: "updates@news.example.org" }]);
  });

  test("a key that can't sign is an error, not an unsigned mail", async () => {
    await expect(compose(await written("en"), { ...sender, dkim: { domain: "news.example.org", selector: "s", privateKey: "no key" } })).rejects.toThrow("DKIM");
  });

  test("each message has a return path of its own", () => {
    expect(returnPathOf(id, "news.example.org")).toBe(`bounces+${id}@news.example.org`);
  });
});
