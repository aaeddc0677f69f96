import { AxeBuilder } from "@axe-core/playwright";
import { type Browser, type BrowserContext, chromium, type Page } from "playwright-core";
import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { closeDb, db } from "@/db/client";
import { sessions } from "@/db/schema";
import { findFrozen, getAssessment } from "@/lib/assessments/queries";
import { sessionCookieName } from "@/lib/auth/constants";
import { sha256Hex } from "@/lib/canonical-json";
import { closeCompute } from "@/lib/compute/assess-off-thread";
import type { StaffCtx } from "@/lib/context";
import { aFrozenAssessment, anAssessment, asStaff } from "../fixtures/assessments";

const base = process.env["EBBMARK_URL"] ?? "";
const ARGS = ["--no-sandbox", "--disable-quic", "--no-first-run", "--disable-background-networking", "--disable-component-update", "--disable-sync"];
const cookieName = sessionCookieName(false);

let browser: Browser;
beforeAll(async () => {
  browser = await chromium.launch({ executablePath: process.env["CHROMIUM"] || "/usr/bin/chromium", args: ARGS });
});
afterAll(async () => {
  await browser.close();
  await closeCompute();
  await closeDb();
});

async function sessionOf({ actor }: StaffCtx): Promise<string> {
  const sessionToken = crypto.randomUUID();
  await db.insert(sessions).values({ sessionToken, userId: actor.id, expires: new Date(Date.now() + 3_600_000) });
  return sessionToken;
}

type Options = { width?: number; scheme?: "light" | "dark"; scripts?: boolean };
/** A page of a signed-in person; anything that the page reports as an error fails the test. */
async function as(ctx: StaffCtx, { width = 1440, scheme = "light", scripts = true }: Options, run: (page: Page, context: BrowserContext) => Promise<void>): Promise<void> {
  const context = await browser.newContext({ viewport: { width, height: 900 }, colorScheme: scheme, javaScriptEnabled: scripts, reducedMotion: "reduce" });
  await context.addCookies([{ name: cookieName, value: await sessionOf(ctx), url: base }]);
  const page = await context.newPage();
  const faults: string[] = [];
  page.on("pageerror", (error) => faults.push(error.message));
  page.on("console", (message) => {
    // An answer of 4xx is part of some journeys and is asserted there.
    if (message.type() === "error" && !/status of 4\d\d/.test(message.text())) faults.push(message.text());
  });
  await run(page, context);
  expect(faults).toEqual([]);
  await context.close();
}
const at = (id: string) => `${base}/desk/assessments/${id}`;
const status = (page: Page) => page.locator("p[role=status]").last();
const says = (page: Page, words: RegExp) => expect.poll(() => status(page).textContent(), { timeout: 60_000, interval: 20 }).toMatch(words);
const finalDeaths = (page: Page) => page.locator(".cmp tbody tr").filter({ hasText: "Final deaths" }).innerText();
const openAll = (page: Page, what: string) =>
  page.evaluate((selector) => {
    for (const each of document.querySelectorAll(selector)) each.setAttribute("open", "");
  }, what);
const openPanel = (page: Page) => openAll(page, "details.sheet, details.sheet details");

describe("figures that follow what is typed", () => {
  test("change, are refused with the field's range, and come back when changes are discarded", async () => {
    const { ctx, id } = await anAssessment();
    await as(ctx, {}, async (page) => {
      await page.goto(at(id));
      await says(page, /saved state/);
      await openPanel(page);
      const saved = await finalDeaths(page);
      await page.fill('input[name="packages[0].shiftDays"]', "40");
      await says(page, /unsaved changes/);
      expect(await finalDeaths(page)).not.toBe(saved);
      await page.fill("#edit-draws", "5");
      await says(page, /can’t be used/);
      expect(await page.locator("#edit-draws-error").textContent()).toBe("Must be a whole number from 100 to 100,000.");
      expect(await page.getByRole("button", { name: "Freeze assessment" }).isDisabled()).toBe(true);
      await page.getByRole("button", { name: "Discard changes" }).click();
      await says(page, /saved state/);
      expect(await finalDeaths(page)).toBe(saved);
      expect(await page.inputValue("#edit-draws")).toBe("200");
    });
    expect((await getAssessment(id)).row.version).toBe(1);
  });

  test("a newer change ends the request before it, and a long one can be cancelled and taken up again", async () => {
    const { ctx, id } = await anAssessment();
    await as(ctx, {}, async (page) => {
      const ended: string[] = [];
      page.on("requestfailed", (request) => request.url().endsWith("/api/desk/recalculate") && ended.push(request.failure()?.errorText ?? ""));
      await page.goto(at(id));
      await says(page, /saved state/);
      await openPanel(page);
      await page.fill("#edit-draws", "100000");
      await says(page, /of the draws done/);
      await page.fill("#edit-draws", "99999");
      await expect.poll(() => ended.length, { timeout: 10_000 }).toBe(1);
      await page.getByRole("button", { name: "Cancel" }).click();
      await says(page, /Cancelled/);
      await page.fill("#edit-draws", "300");
      await says(page, /unsaved changes/);
    });
  });

  test("saving stores them, and freezing keeps what was saved", async () => {
    const { ctx, id } = await anAssessment();
    await as(ctx, {}, async (page) => {
      await page.goto(at(id));
      await says(page, /saved state/);
      await openPanel(page);
      await page.fill('input[name="packages[2].items[0].uptakePercent"]', "55");
      await says(page, /unsaved changes/);
      const shown = await finalDeaths(page);
      await page.getByRole("button", { name: "Save changes" }).click();
      await page.waitForURL(/saved=1/);
      await says(page, /saved state/);
      expect(await finalDeaths(page)).toBe(shown);
      await page.getByLabel("Why it is frozen now").fill("The council decides on Tuesday.");
      await page.getByRole("button", { name: "Freeze assessment" }).click();
      await page.getByText("Nothing here can change.").waitFor({ timeout: 30_000 });
      expect(await finalDeaths(page)).toBe(shown);
    });
    const frozen = await findFrozen(id);
    expect(frozen?.input.packages[2]?.items[0]?.uptake).toBe(0.55);
  });
});

test("without a script the page shows its figures, saves and freezes by plain forms", async () => {
  const { ctx, id } = await anAssessment();
  await as(ctx, { scripts: false, width: 390 }, async (page) => {
    await page.goto(at(id));
    expect(await finalDeaths(page)).toMatch(/\d,\d{3}/);
    await page.click("details.sheet > summary");
    await page.fill("#edit-draws", "7");
    await page.fill("#edit-title", "Typed and not lost");
    await page.getByRole("button", { name: "Save changes" }).click();
    expect(await page.locator("#edit-draws-error").textContent()).toBe("Must be a whole number from 100 to 100,000.");
    expect(await page.inputValue("#edit-title")).toBe("Typed and not lost");
    await page.fill("#edit-draws", "300");
    await page.getByRole("button", { name: "Save changes" }).click();
    await page.getByText("Saved.").waitFor();
    expect(await page.locator("h1").textContent()).toBe("Typed and not lost");
    await page.getByLabel("Why it is frozen now").fill("The council decides on Tuesday.");
    await page.getByRole("button", { name: "Freeze assessment" }).click();
    await page.getByText("Nothing here can change.").waitFor();
  });
  expect((await findFrozen(id))?.input.uncertainty?.draws).toBe(300);
});

test("pages pass axe in both themes and don't scroll sideways on a phone; no text in a chart falls under 12 px", async () => {
  const { ctx, id, outbreakId } = await anAssessment();
  const { assessmentId } = await aFrozenAssessment({ ctx });
  for (const [width, scheme] of [[1440, "light"], [1440, "dark"], [390, "light"], [390, "dark"]] as const) {
    await as(ctx, { width, scheme }, async (page) => {
      // The two small pages hold nothing that a theme or a width alone could break, so once is enough.
      const small = width === 390 && scheme === "dark" ? [`${base}/desk/assessments`, `${base}/desk/assessments/new?outbreak=${outbreakId}`] : [];
      for (const path of [at(id), at(assessmentId), ...small]) {
        await page.goto(path);
        await openAll(page, "details");
        const { violations } = await new AxeBuilder({ page }).analyze();
        expect(violations.map(({ id: rule, nodes }) => `${rule}: ${nodes.map(({ html }) => html.slice(0, 160)).join(" | ")}`), `${path} ${width} ${scheme}`).toEqual([]);
        expect(await page.evaluate(() => document.documentElement.scrollWidth), path).toBeLessThanOrEqual(width);
        const smallest = await page.evaluate(() => {
          const seen = [...document.querySelectorAll<SVGTextElement>("figure svg text")].filter((text) => text.getClientRects().length > 0);
          return Math.min(99, ...seen.map((text) => Number.parseFloat(getComputedStyle(text).fontSize) * (text.getScreenCTM()?.a ?? 1)));
        });
        expect(smallest, path).toBeGreaterThanOrEqual(11.99);
      }
    });
  }
});

describe("files of a frozen assessment", () => {
  const get = (path: string, session?: string) => fetch(`${base}${path}`, { headers: session ? { cookie: `${cookieName}=${session}` } : {}, redirect: "manual" });

  test("are exactly the bytes that were hashed", async () => {
    const frozen = await aFrozenAssessment();
    const session = await sessionOf(frozen.ctx);
    for (const [file, hash] of [["input", frozen.inputHash], ["result", frozen.resultHash], ["context", frozen.contextHash]] as const) {
      const answer = await get(`/desk/assessments/${frozen.assessmentId}/${file}.json`, session);
      expect(answer.status).toBe(200);
      expect(answer.headers.get("content-disposition")).toBe(`attachment; filename="assessment-${frozen.number}-${file}.json"`);
      expect(sha256Hex(await answer.text())).toBe(hash);
    }
  });

  test("are for staff only, and only the input exists before freezing", async () => {
    const { ctx, id } = await anAssessment();
    expect((await get(`/desk/assessments/${id}/input.json`)).status).toBe(401);
    const session = await sessionOf(ctx);
    expect((await get(`/desk/assessments/${id}/input.json`, session)).status).toBe(200);
    expect((await get(`/desk/assessments/${id}/result.json`, session)).status).toBe(404);
    expect((await get(`/desk/assessments/${crypto.randomUUID()}/input.json`, session)).status).toBe(404);
  });
});

describe("recalculation is for those who may change the assessment", () => {
  const post = async (id: string, headers: Record<string, string>) =>
    fetch(`${base}/api/desk/recalculate`, {
      method: "POST",
      headers,
      body: new URLSearchParams({ id, version: "1", title: "t", packageLetters: "A", draws: "100", seed: "1", horizonDays: "365", dayZero: "2027-03-01" }),
    });

  test("advisers only, signed in, from our own pages", async () => {
    const { ctx, id } = await anAssessment();
    const cookie = async (who: StaffCtx) => `${cookieName}=${await sessionOf(who)}`;
    expect((await post(id, { origin: base, cookie: await cookie(ctx) })).status).toBe(200);
    expect((await post(id, { origin: base })).status).toBe(401);
    for (const role of ["communications", "legal", "administrator"] as const) {
      expect((await post(id, { origin: base, cookie: await cookie(await asStaff(role)) })).status, role).toBe(403);
    }
    expect((await post(id, { origin: "https://elsewhere.example.org", cookie: await cookie(ctx) })).status).toBe(403);
    expect((await post(id, { cookie: await cookie(ctx) })).status).toBe(403);
  });

  test("others read the figures without forms", async () => {
    const { id } = await anAssessment();
    await as(await asStaff("legal"), {}, async (page) => {
      await page.goto(at(id));
      expect(await finalDeaths(page)).toMatch(/\d,\d{3}/);
      expect(await page.locator("main form, main button[type=submit]").count()).toBe(0);
    });
  });
});
