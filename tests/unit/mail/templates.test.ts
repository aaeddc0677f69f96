import { describe, expect, test } from "vitest";
import { formatDay } from "@/lib/i18n/dates";
import { LOCALE_CODES, LOCALES, type Locale } from "@/lib/i18n/locales";
import { fillSlots, SINCE, TOKEN, type WrittenMail } from "@/lib/mail/model";
import { briefingMail, figureRows, withdrawalMail } from "@/lib/mail/templates/briefing";
import { confirmMail, invitationMail, signInMail } from "@/lib/mail/templates/transactional";
import { writeMail } from "@/lib/mail/write-mail";
import { DEATHS, rendered } from "../../fixtures/releases";

const base = "https://health.example.org";
const token = "Zm9v".repeat(16);
const publishedAt = "2027-03-02T16:00:00.000Z";
const authority = { name: "Kelmaren District Health Office", contact: "ask@example.org", demonstration: true };
const CORRECTION = { cause: "The infectious period was copied wrongly.", effect: "The advice stays." };

type Kind = "first" | "update" | "correction" | "withdrawal" | "signIn" | "invitation" | "confirm";
const KINDS: Kind[] = ["first", "update", "correction", "withdrawal", "signIn", "invitation", "confirm"];

async function mailOf(kind: Kind, locale: Locale, correctionLang: Locale = locale): Promise<WrittenMail> {
  const written = async () => {
    switch (kind) {
      case "withdrawal":
        return withdrawalMail({ content: rendered(locale), release: { number: 1, kind: "first", publishedAt }, notice: { lang: locale, text: "The order was repealed." }, base });
      case "signIn":
        return signInMail(locale, { link: `${base}/sign-in/confirm?token=abc&x=1`, minutes: "10" }, authority);
      case "invitation":
        return invitationMail(locale, { link: `${base}/sign-in`, inviter: "Noor <Test>", role: "legal" }, authority);
      case "confirm":
        return confirmMail(locale, { link: `${base}/${locale}/confirm/abc`, hours: "48" }, authority);
      default:
        return briefingMail({
          content: rendered(locale, { versionNumber: kind === "first" ? 1 : 2 }),
          release: { number: kind === "first" ? 1 : 2, kind, publishedAt },
          correction: kind === "correction" ? { lang: correctionLang, ...CORRECTION } : null,
          before: kind === "correction" ? rendered(locale, {}, { without: 2110, with: 1600, averted: 510 }) : null,
          base,
        });
    }
  };
  const { subject, text, html } = writeMail(await written());
  const own = { token, since: formatDay("2027-02-22", locale) };
  return { subject, text: fillSlots(text, own), html: fillSlots(html, own) };
}

const decoded = (html: string) => html.replaceAll("&lt;", "<").replaceAll("&gt;", ">").replaceAll("&quot;", '"').replaceAll("&#x27;", "'").replaceAll("&amp;", "&");
const body = (html: string) => html.slice(html.indexOf("<body"));
/** Words as a reader gets them: without tags and without the marks that only set direction. */
const wordsOfHtml = (html: string) => decoded(body(html).replace(/<[^>]+>/g, " ")).replace(/\s+/g, " ");
const wordsOfText = (text: string) => text.replace(/[\u2066-\u2069]/g, "").replace(/\s+/g, " ");
const linksOfHtml = (html: string) => [...html.matchAll(/href="([^"]*)"/g)].map(([, href]) => decoded(href ?? ""));
const linksOfText = (text: string) => [...text.matchAll(/https?:\/\/\S+/g)].map(([href]) => href);
const numbers = (words: string) => (words.replace(/https?:\/\/\S+|mailto:\S+/g, "").match(/\d[\d.,\u00a0\u202f:]*\d|\d/g) ?? []).sort();

const cases = LOCALE_CODES.flatMap((locale) => KINDS.map((kind) => [locale, kind] as const));

describe.each(cases)("%s, %s", (locale, kind) => {
  test("text and HTML hold the same figures and links", async () => {
    const mail = await mailOf(kind, locale);
    // The table's heads are said once to the ear and not written in the text part; they hold no figure.
    expect(numbers(wordsOfText(mail.text))).toEqual(numbers(wordsOfHtml(mail.html)));
    const pages = linksOfHtml(mail.html).filter((href) => !href.startsWith("mailto:"));
    expect([...new Set(linksOfText(mail.text))].sort()).toEqual([...new Set(pages)].sort());
    for (const href of linksOfHtml(mail.html).filter((each) => each.startsWith("mailto:"))) expect(mail.text).toContain(href.slice("mailto:".length));
    expect(pages.length).toBeGreaterThan(0);
  });

  test("nothing is loaded, run or counted", async () => {
    const { html } = await mailOf(kind, locale);
    expect(html).not.toMatch(/<(?:img|script|link|iframe|object|embed|vide[o]|audio|form|input|picture|source)\b/i);
    expect(html).not.toMatch(/\b(?:src|srcset|background|poster|data)=|url\(|@import|@font-face|\bon[a-z]+=/i);
    for (const href of linksOfHtml(html)) expect(href).toMatch(/^https:\/\/health\.example\.org\/|^mailto:ask@example\.org$/);
  });

  test("language and direction stand on html and on an inner wrapper; one h1; heads have a scope", async () => {
    const { html } = await mailOf(kind, locale);
    const { dir } = LOCALES[locale];
    expect(html).toMatch(new RegExp(`^<!doctype html><html lang="${locale}" dir="${dir}">`));
    expect(html).toMatch(new RegExp(`<body[^>]*><div lang="${locale}" dir="${dir}"`));
    expect(html.match(/<h1[ >]/g)).toHaveLength(1);
    for (const [head] of html.matchAll(/<th [^>]*>/g)) expect(head).toMatch(/scope="(?:col|row)"/);
    for (const [table] of html.matchAll(/<table [^>]*>/g)) expect(table).toMatch(/role="presentation"|class="m-rule"/);
    expect(html).toContain("prefers-color-scheme:dark");
  });

  test("no text smaller than 14 px, but for what is only heard", async () => {
    const { html } = await mailOf(kind, locale);
    const seen = html.replace(/<span style="position:absolute[^>]*>/g, "").replace(/<div style="border-top:1px[^>]*>/g, "");
    for (const [, px] of seen.matchAll(/font-size:(\d+)px/g)) expect(Number(px)).toBeGreaterThanOrEqual(14);
  });

  test("nothing is left unfilled", async () => {
    const { subject, text, html } = await mailOf(kind, locale);
    for (const part of [subject, text, html]) {
      expect(part).not.toContain(TOKEN);
      expect(part).not.toContain(SINCE);
      expect(part).not.toMatch(/\{\w+\}|undefined|NaN|\[object|Mail\.\w/);
    }
    expect(subject).toMatch(/^[^\p{Cc}]{1,200}$/u);
    expect(text).not.toMatch(/\r|[^\P{Cc}\n]/u);
  });
});

describe.each(LOCALE_CODES)("%s: a briefing by mail", (locale) => {
  test("has title, figures with ranges, dates, and the permanent page", async () => {
    const mail = await mailOf("first", locale);
    const content = rendered(locale);
    for (const words of [wordsOfText(mail.text), wordsOfHtml(mail.html)]) {
      expect(words).toContain(content.title);
      for (const { label, value, range } of figureRows(content)) for (const part of [label, value, range ?? ""]) expect(words).toContain(part.replace(/\s+/g, " "));
      expect(words).toContain(formatDay("2027-06-07", locale).replace(/\s/g, " "));
      expect(words).toContain(content.authorityName);
    }
    expect(mail.text).toContain(`${base}/${locale}/briefings/evening-closure/v/1`);
    expect(mail.text).toContain(`${base}/u/${token}`);
    expect(mail.text).toContain(`${base}/${locale}/subscription/${token}`);
  });

  test("says that orders decide before it says what the figures are, and that all is invented", async () => {
    const { default: catalogue } = await import(`../../../messages/${locale}.json`);
    const words = wordsOfText((await mailOf("first", locale)).text);
    const at = (sentence: string) => words.indexOf(sentence.replace(/\s+/g, " "));
    expect(at(catalogue.Mail.caution.orders)).toBeGreaterThan(0);
    expect(at(catalogue.Mail.caution.figures)).toBeGreaterThan(at(catalogue.Mail.caution.orders));
    const invented = catalogue.Caution.demonstrationOf.replace("{illness}", "Sedge fever").replace("{place}", "Kelmaren");
    // A language without capitals, or with a cased one, writes the illness in its own way.
    expect(words.toLowerCase()).toContain(invented.toLowerCase().replace(/\s+/g, " "));
  });

  test("a correction says so at the start of the subject, with the old figure beside the new one", async () => {
    const { default: catalogue } = await import(`../../../messages/${locale}.json`);
    const mail = await mailOf("correction", locale);
    const word = catalogue.Mail.subject.correction.replace("{title}", "").trim();
    expect(mail.subject.startsWith(word)).toBe(true);
    expect(mail.subject).not.toBe((await mailOf("first", locale)).subject);
    for (const words of [wordsOfText(mail.text), wordsOfHtml(mail.html)]) {
      expect(words).toContain(CORRECTION.cause);
      expect(words).toContain(CORRECTION.effect);
      expect(words).toMatch(/2[.,\u00a0\u202f ]?110/);
      expect(words).toMatch(/2[.,\u00a0\u202f ]?030/);
    }
  });
});

describe("edges", () => {
  test("what was wrong in another language than the reader's carries that language", async () => {
    const { html, text } = await mailOf("correction", "ar", "en");
    expect(html).toMatch(/<div lang="en" dir="ltr" class="m-notice"/);
    expect(text).toContain(CORRECTION.cause);
  });

  test("markup in a text stays text", async () => {
    const mail = await mailOf("first", "en");
    expect(mail.html).toContain("450</bdi>");
    expect(mail.html).toContain("&amp; &lt;no&gt; tags.");
    expect(mail.text).toContain("& <no> tags.");
    expect((await mailOf("invitation", "en")).html).toContain("Noor &lt;Test&gt;");
  });

  test("a figure without a range stands alone, and deaths come first", () => {
    const content = rendered("en");
    const figures = [{ ref: "F9", text: "15 %", label: "Chance", figure: "chanceShrinks", package: "B", form: "value" as const }, ...content.figures];
    const rows = figureRows({ ...content, figures });
    expect(rows.map(({ label }) => label)).toEqual(["Without (en)", "With (en)", "Fewer (en)", "Chance"]);
    expect(rows.at(-1)).toEqual({ label: "Chance", value: "15 %", range: null });
    expect(rows[0]?.value).toBe(DEATHS.without.toLocaleString("en"));
  });

  test("a briefing without figures or dates still makes a mail", async () => {
    const content = rendered("en", { figures: [], schedule: { dayZero: "2027-03-01", endDay: 0, measures: [] }, reviewDate: null, demonstration: false });
    const mail = writeMail(await briefingMail({ content, release: { number: 1, kind: "first", publishedAt }, correction: null, before: null, base }));
    expect(mail.html).not.toContain('class="m-rule"');
    expect(mail.text).not.toMatch(/invented/);
  });

  test("a link that is missing is an error and no mail", async () => {
    await expect(signInMail("en", { minutes: "10" }, authority)).rejects.toThrow("payload");
  });
});
