import { AxeBuilder } from "@axe-core/playwright";
import { type Browser, type BrowserContext, chromium, type Page } from "playwright-core";
import { expect } from "vitest";
import { db } from "@/db/client";
import { sessions } from "@/db/schema";
import { sessionCookieName } from "@/lib/auth/constants";
import type { StaffCtx } from "@/lib/context";

export const base = process.env["EBBMARK_URL"] ?? "";
const ARGS = ["--no-sandbox", "--disable-quic", "--no-first-run", "--disable-background-networking", "--disable-component-update", "--disable-sync"];

export const launch = (): Promise<Browser> => chromium.launch({ executablePath: process.env["CHROMIUM"] || "/usr/bin/chromium", args: ARGS });

type Options = { width?: number; scheme?: "light" | "dark"; scripts?: boolean };

/** A page of a signed-in person; anything that the page reports as an error fails the test. */
export async function asPerson(browser: Browser, { actor }: StaffCtx, { width = 1440, scheme = "light", scripts = true }: Options, run: (page: Page, context: BrowserContext) => Promise<void>): Promise<void> {
  const sessionToken = crypto.randomUUID();
  await db.insert(sessions).values({ sessionToken, userId: actor.id, expires: new Date(Date.now() + 3_600_000) });
  const context = await browser.newContext({ viewport: { width, height: 900 }, colorScheme: scheme, javaScriptEnabled: scripts, reducedMotion: "reduce" });
  await context.addCookies([{ name: sessionCookieName(false), value: sessionToken, url: base }]);
  const page = await context.newPage();
  const faults: string[] = [];
  page.on("pageerror", (error) => faults.push(error.message));
  page.on("console", (message) => {
    if (message.type() === "error" && !/status of 4\d\d/.test(message.text())) faults.push(message.text());
  });
  try {
    await run(page, context);
    expect(faults).toEqual([]);
  } finally {
    await context.close();
  }
}

/** Nothing that axe objects to, and nothing wider than the window. */
export async function expectSound(page: Page): Promise<void> {
  const { violations } = await new AxeBuilder({ page }).analyze();
  expect(violations.map(({ id, nodes }) => `${id}: ${nodes.map(({ target }) => target.join(" ")).join(", ")}`)).toEqual([]);
  expect(await page.evaluate(() => document.documentElement.scrollWidth - window.innerWidth)).toBeLessThanOrEqual(0);
}
