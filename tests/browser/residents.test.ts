import { AxeBuilder } from "@axe-core/playwright";
import { type Browser, type BrowserContext, chromium, type Page } from "playwright-core";
import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { eq } from "drizzle-orm";
import { closeDb, db } from "@/db/client";
import { subscriptions } from "@/db/schema";
import { LOCALE_CODES, LOCALES, type Locale } from "@/lib/i18n/locales";
import { newestOfEach, type PublishedRelease, withdrawalOf } from "@/lib/publications/published";
import { listReleases } from "@/lib/publications/queries";
import { newConfirmToken, subscriptionToken } from "@/lib/subscribers/token";
import { anAddress, subscriptionOf } from "../fixtures/subscribers";

const base = process.env["EBBMARK_URL"] ?? "";
const ARGS = ["--no-sandbox", "--disable-quic", "--no-first-run", "--disable-background-networking", "--disable-component-update", "--disable-sync"];
/** WP-23: a briefing in any language, everything that it loads. */
const BYTES_MAX = 100_000;
const REQUESTS_MAX = 10;

let browser: Browser;
let releases: PublishedRelease[];
beforeAll(async () => {
  browser = await chromium.launch({ executablePath: process.env["CHROMIUM"] || "/usr/bin/chromium", args: ARGS });
  releases = await listReleases();
});
afterAll(async () => {
  await browser.close();
  await closeDb();
});

/** A reader on a phone without scripts. */
async function aReader(run: (page: Page, context: BrowserContext) => Promise<void>): Promise<void> {
  const context = await browser.newContext({ viewport: { width: 390, height: 844 }, javaScriptEnabled: false });
  await run(await context.newPage(), context);
  expect(await context.cookies()).toEqual([]);
  await context.close();
}

/** A briefing that stands and is there in every language. */
function aBriefing(): PublishedRelease {
  const found = newestOfEach(releases).find((release) => !withdrawalOf(release) && release.texts.length === LOCALE_CODES.length);
  if (!found) throw new Error("the demonstration holds no briefing in all languages");
  return found;
}

const PAGES = ["", "/releases", "/corrections", "/method", "/privacy", "/accessibility", "/subscribe", "/subscribe/sent"];

describe.each(LOCALE_CODES)("pages in %s", (locale) => {
  test("go out whole: language, direction, caution, no script, no cookie, strict policy", async () => {
    for (const path of [...PAGES, `/briefings/${aBriefing().slug}`]) {
      const answer = await fetch(`${base}/${locale}${path}`);
      const html = await answer.text();
      expect(answer.status, path).toBe(200);
      expect(answer.headers.get("set-cookie"), path).toBeNull();
      expect(answer.headers.get("content-security-policy"), path).toContain("script-src 'none'");
      expect(html, path).not.toMatch(/<script|\bstyle="|\son\w+="|as="script"/);
      expect(html, path).toContain(`<html lang="${locale}" dir="${LOCALES[locale].dir}">`);
      expect(html.match(/<h1/g), path).toHaveLength(1);
      expect(html, path).toMatch(/<footer>.*<b>[^<]{40,}<\/b>/s);
      expect(html.replace(/<[^>]*>/g, " "), path).not.toMatch(/[{}]|undefined|(?:Public|Article|Subscribe|Caution|Locale)\.\w/);
    }
  });

  test("name every language that exists and themselves as the one address", async () => {
    const release = aBriefing();
    const html = await (await fetch(`${base}/${locale}/briefings/${release.slug}`)).text();
    expect(html).toContain(`rel="canonical" href="${base}/${locale}/briefings/${release.slug}"`);
    for (const { locale: other } of release.texts) expect(html).toContain(`hrefLang="${other}" href="${base}/${other}/briefings/${release.slug}"`);
  });

  test("say in this language that a page isn't there", async () => {
    for (const path of ["/nothing/here", "/briefings/none", `/briefings/${aBriefing().slug}/v/99`]) {
      const answer = await fetch(`${base}/${locale}${path}`);
      const html = await answer.text();
      expect(answer.status, path).toBe(404);
      expect(html, path).toContain(`<html lang="${locale}"`);
      expect(html.match(/<h1/g), path).toHaveLength(1);
    }
  });

  test("a briefing stays within its weight, reflows on a narrow phone, and passes axe in both themes", async () => {
    for (const colorScheme of ["light", "dark"] as const) {
      const context = await browser.newContext({ viewport: { width: 320, height: 800 }, colorScheme, bypassCSP: true });
      const page = await context.newPage();
      const network = await context.newCDPSession(page);
      await network.send("Network.enable");
      let bytes = 0;
      const asked: string[] = [];
      network.on("Network.loadingFinished", ({ encodedDataLength }) => {
        bytes += encodedDataLength;
      });
      network.on("Network.requestWillBeSent", ({ request }) => asked.push(request.url));
      await page.goto(`${base}/${locale}/briefings/${aBriefing().slug}`, { waitUntil: "networkidle" });
      expect(bytes).toBeLessThan(BYTES_MAX);
      expect(asked.length).toBeLessThanOrEqual(REQUESTS_MAX);
      expect(asked.filter((url) => !url.startsWith(base))).toEqual([]);
      expect(await page.evaluate(() => document.documentElement.scrollWidth)).toBeLessThanOrEqual(320);
      const { violations } = await new AxeBuilder({ page }).withTags(["wcag2a", "wcag2aa", "wcag21a", "wcag21aa", "wcag22aa"]).analyze();
      expect(violations.map(({ id, nodes }) => `${id}: ${nodes[0]?.target}`)).toEqual([]);
      await context.close();
    }
  });
});

describe("a reader", () => {
  test("without a language is sent to their own, and nothing is remembered", async () => {
    const answer = await fetch(`${base}/`, { redirect: "manual", headers: { "Accept-Language": "hi-IN,hi;q=0.9,en;q=0.5" } });
    expect([answer.status, answer.headers.get("location"), answer.headers.get("vary"), answer.headers.get("set-cookie")]).toEqual([307, "/hi", expect.stringContaining("Accept-Language"), null]);
  });

  test("finds a withdrawn briefing at its address, with the notice", async () => {
    const withdrawn = newestOfEach(releases).find(withdrawalOf);
    if (!withdrawn) throw new Error("the demonstration holds no withdrawn briefing");
    await aReader(async (page) => {
      const answer = await page.goto(`${base}/en/briefings/${withdrawn.slug}`);
      expect(answer?.status()).toBe(200);
      expect(await page.locator(".ntc").first().innerText()).toContain("Withdrawn");
    });
  });

  test("finds every earlier version at its own address, with a way to the newest", async () => {
    const old = releases.find((release) => releases.some((other) => other.briefingId === release.briefingId && other.number > release.number));
    if (!old) throw new Error("the demonstration holds no corrected briefing");
    await aReader(async (page) => {
      await page.goto(`${base}/en/briefings/${old.slug}/v/${old.number}`);
      await page.locator(".ntc a").first().click();
      expect(page.url()).toBe(`${base}/en/briefings/${old.slug}`);
    });
  });
});

describe("a subscriber without scripts", () => {
  test("asks, confirms, changes the language, stops, and takes that back", async () => {
    const email = anAddress();
    await aReader(async (page) => {
      await page.goto(`${base}/ar/subscribe`);
      await page.fill("#email", "mina@@example");
      await page.check("#locale-vi");
      await page.click("button[type=submit]");
      expect(await page.inputValue("#email")).toBe("mina@@example");
      expect(await page.isChecked("#locale-vi")).toBe(true);
      expect(await page.getAttribute("#email", "aria-describedby")).toBe("email-error");
      expect(await page.locator(".note.bad a").getAttribute("href")).toBe("#email");

      await page.fill("#email", email);
      await page.click("button[type=submit]");
      expect(page.url()).toBe(`${base}/ar/subscribe/sent`);
      expect(await subscriptionOf(email)).toMatchObject({ state: "pending", locale: "vi" });

      // The mail's own link is gone from the outbox once it is sent, so this one takes its place.
      const { token, hash } = newConfirmToken();
      await db.update(subscriptions).set({ confirmTokenHash: hash }).where(eq(subscriptions.email, email));
      await page.goto(`${base}/vi/confirm/${token}`);
      expect((await subscriptionOf(email))?.state).toBe("pending");
      await page.click(".pform button");
      expect((await subscriptionOf(email))?.state).toBe("active");
      const manage = page.url().split("?")[0] ?? "";

      await page.check("#locale-hi");
      await page.locator(".pform button").first().click();
      expect((await subscriptionOf(email))?.locale).toBe("hi" satisfies Locale);
      await page.locator(".pform button").last().click();
      expect((await subscriptionOf(email))?.state).toBe("left");
      await page.goto(manage);
      await page.click(".as-link");
      expect((await subscriptionOf(email))?.state).toBe("active");
    });
  });

  test("stops with one click from a mail program, in either encoding and again; looking stops nothing", async () => {
    const email = anAddress();
    const [row] = await db
      .insert(subscriptions)
      .values({ email, locale: "uk", state: "active", consentText: "test", requestedAt: new Date(), confirmedAt: new Date() })
      .returning({ id: subscriptions.id });
    const link = `${base}/u/${subscriptionToken(row?.id ?? "")}`;
    for (const method of ["GET", "HEAD", "GET"]) expect((await fetch(link, { method })).status).toBe(200);
    expect((await subscriptionOf(email))?.state).toBe("active");
    const multipart = new FormData();
    multipart.set("List-Unsubscribe", "One-Click");
    for (const body of [new URLSearchParams({ "List-Unsubscribe": "One-Click" }), multipart, new URLSearchParams({ "List-Unsubscribe": "One-Click" })]) {
      const answer = await fetch(link, { method: "POST", body, redirect: "manual" });
      expect([answer.status, answer.headers.get("content-type"), answer.headers.get("set-cookie")]).toEqual([200, "text/plain; charset=utf-8", null]);
      expect((await subscriptionOf(email))?.state).toBe("left");
    }
    const forged = await fetch(`${link.slice(0, -2)}${link.endsWith("AA") ? "BB" : "AA"}`, { method: "POST", body: multipart });
    expect(forged.status).toBe(404);
  });

  test("is refused from another site", async () => {
    const answer = await fetch(`${base}/en/subscribe`, { method: "POST", headers: { Origin: "https://elsewhere.example" }, body: new FormData() });
    expect(answer.status).toBe(403);
  });
});
