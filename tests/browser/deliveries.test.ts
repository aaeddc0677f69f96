import { sql } from "drizzle-orm";
import type { Browser } from "playwright-core";
import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { closeDb, db } from "@/db/client";
import { deliveries } from "@/db/schema";
import type { StaffCtx } from "@/lib/context";
import { asStaff } from "../fixtures/assessments";
import { aRelease, type Release, subscribers } from "../fixtures/releases";
import { asPerson, base, expectSound, launch } from "./support/desk";

let browser: Browser;
let officer: StaffCtx;
let release: Release;
let ids: string[];

beforeAll(async () => {
  browser = await launch();
  officer = await asStaff("communications");
  // The newest, so that it stands on the page whatever else has been released.
  release = await aRelease({ locales: ["en"], publishedAt: new Date(Date.now() + 3_600_000) });
  ids = (await subscribers(12)).map(({ id }) => id);
  const state = (n: number) => (n < 7 ? ("accepted" as const) : n < 9 ? ("rejected" as const) : ("unknown" as const));
  await db.insert(deliveries).values(ids.map((subscriptionId, n) => ({ kind: "briefing" as const, releaseId: release.id, subscriptionId, locale: "en" as const, state: state(n), finishedAt: new Date(), unknownAt: n < 9 ? null : new Date(), reply: n < 7 ? "250" : n < 9 ? "550 5.1.1" : "ECONNECTION" })));
});
afterAll(async () => {
  await db.execute(sql`delete from deliveries where release_id = ${release.id}`);
  await browser.close();
  await closeDb();
});

const row = `tr:has(a[href="/desk/briefings/BRIEFING"]) td`;

describe("deliveries", () => {
  test.each([
    [1440, "light", true],
    [1440, "dark", false],
    [390, "light", true],
    [390, "dark", false],
  ] as const)("%i px, %s, scripts: %s: counts, what is unknown and why, and no address", (width, scheme, scripts) =>
    asPerson(browser, officer, { width, scheme, scripts }, async (page) => {
      await page.goto(`${base}/desk/deliveries`);
      const cells = await page.locator(row.replace("BRIEFING", release.briefingId)).allTextContents();
      expect(cells.map((text) => text.trim())).toEqual(["0", "7", "0", "2", "0", "3"]);
      const words = (await page.locator("main").textContent()) ?? "";
      expect(words).toContain("a reader may get it twice");
      expect(words).toContain("a reader may miss it");
      expect(words).not.toContain("@");
      if (scripts) await expectSound(page);
    }),
  );

  test("counts follow the outbox, and nothing moves", () =>
    asPerson(browser, officer, {}, async (page) => {
      await page.goto(`${base}/desk/deliveries`, { waitUntil: "networkidle" });
      await page.evaluate(() => {
        const seen = { sum: 0 };
        Object.assign(window, { moved: seen });
        new PerformanceObserver((list) => {
          for (const entry of list.getEntries()) seen.sum += (entry as unknown as { value: number }).value;
        }).observe({ type: "layout-shift" });
      });
      await db.execute(sql`update deliveries set state = 'accepted' where release_id = ${release.id} and state = 'rejected'`);
      await page.waitForFunction(([selector]) => document.querySelectorAll(selector ?? "")[1]?.textContent?.trim() === "9", [row.replace("BRIEFING", release.briefingId)], { timeout: 15_000 });
      expect(await page.evaluate(() => (window as unknown as { moved: { sum: number } }).moved.sum)).toBe(0);
    }));

  test("those who may not read them get neither page nor counts", async () => {
    for (const role of ["adviser", "legal"] as const) {
      await asPerson(browser, await asStaff(role), {}, async (page) => {
        await page.goto(`${base}/desk/deliveries`);
        expect(page.url()).toContain("/desk/not-allowed");
        expect(await page.locator('nav a[href="/desk/deliveries"]').count()).toBe(0);
        const response = await page.request.get(`${base}/api/desk/deliveries`);
        expect(response.status()).toBe(403);
      });
    }
    expect((await fetch(`${base}/api/desk/deliveries`)).status).toBe(401);
  });
});
