import type { Browser, Page } from "playwright-core";
import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { closeDb } from "@/db/client";
import { listPackages } from "@/lib/packages/queries";
import { anAssessment, anOutbreakWithPackages, asStaff } from "../fixtures/assessments";
import { aMeasure } from "../fixtures/measures";
import { anEmptyOutbreak, packageRow } from "../fixtures/packages";
import { asPerson, base, expectSound, launch } from "./support/desk";

let browser: Browser;
beforeAll(async () => {
  browser = await launch();
});
afterAll(async () => {
  await browser.close();
  await closeDb();
});

const value = (page: Page, name: string) => page.locator(`main [name="${name}"]:visible`).inputValue();
const fill = async (page: Page, fields: Record<string, string>) => {
  for (const [name, text] of Object.entries(fields)) await page.locator(`main [name="${name}"]:visible`).fill(text);
};
const alert = (page: Page) => page.locator("main [role=alert]").first();
const line = (page: Page, name: string) => page.locator("form#package fieldset.group", { hasText: name });
/** Bars take the keyboard once the page is alive. */
const alive = (page: Page) => page.locator("[role=slider]").first().waitFor();

describe.each([["with scripts", true], ["without scripts", false]])("%s", (_, scripts) => {
  test("a measure that is refused keeps what was typed, says what is allowed, and is saved once it is right", async () => {
    const { ctx, row } = await aMeasure({ publicTexts: { en: { title: "Leave by 20:00", detail: "Take-away goes on." }, ar: { title: "غادر قبل 20:00", detail: "" } } });
    await asPerson(browser, ctx, { scripts }, async (page) => {
      await page.goto(`${base}/desk/measures/${row.id}`);
      if (scripts) await page.waitForLoadState("networkidle");
      await fill(page, { name: "Indoor venues close at 19:00", "cutPercent.high": "130", maxDays: "56", "publicTexts.uk.detail": "Їжа на винос." });
      await page.getByRole("button", { name: "Save measure" }).click();
      await alert(page).waitFor();
      expect(await alert(page).innerText()).toMatch(/Cut in transmission, high: give a number from -100 below 100 %/);
      expect(await alert(page).innerText()).toMatch(/Words for residents, title is missing/);
      expect([await value(page, "name"), await value(page, "cutPercent.high"), await value(page, "maxDays"), await value(page, "publicTexts.uk.detail")]).toEqual(["Indoor venues close at 19:00", "130", "56", "Їжа на винос."]);
      expect(await page.locator('[name="publicTexts.ar.title"]').getAttribute("dir")).toBe("rtl");
      await fill(page, { "cutPercent.high": "30", "publicTexts.uk.title": "Залишайте до 19:00" });
      await page.getByRole("button", { name: "Save measure" }).click();
      await page.waitForURL(/saved=1/);
      expect([await value(page, "name"), await value(page, "cutPercent.high"), await value(page, "publicTexts.uk.title")]).toEqual(["Indoor venues close at 19:00", "30", "Залишайте до 19:00"]);
    });
  });

  test("a package goes from its name to a drawn schedule, a second period, a refusal and its end", async () => {
    const { ctx, outbreakId } = await anEmptyOutbreak();
    const { row: measure } = await aMeasure({ name: `Venues close ${crypto.randomUUID().slice(0, 8)}`, leadTimeDays: "4" });
    await asPerson(browser, ctx, { scripts }, async (page) => {
      await page.goto(`${base}/desk/outbreaks/${outbreakId}/packages`);
      await page.locator("#new-package-name").fill("Evening closure");
      await page.getByRole("button", { name: "Add package" }).click();
      await page.waitForURL(/packages\/[0-9a-f-]{36}/);
      const id = page.url().split("/").at(-1) ?? "";
      expect(await page.locator("h1").innerText()).toBe("Package A: Evening closure");
      if (scripts) await page.waitForLoadState("networkidle");

      const own = line(page, measure.name);
      expect(await own.locator("[type=date]").first().isVisible()).toBe(false);
      await own.getByRole("checkbox", { name: measure.name }).check();
      await own.locator('[name$=".uptakePercent.central"]').fill("120");
      await own.locator('[name$=".from"]').fill("2027-03-08");
      await own.locator('[name$=".until"]').fill("2027-05-16");
      await page.getByRole("button", { name: "Save package" }).click();
      await alert(page).waitFor();
      expect(await alert(page).innerText()).toContain(`${measure.name}: Uptake, central: give a number from 0 to 100 %.`);
      expect(await own.locator('[name$=".uptakePercent.central"]').inputValue()).toBe("120");
      expect(await own.locator('[name$=".until"]').inputValue()).toBe("2027-05-16");

      await own.locator('[name$=".uptakePercent.central"]').fill("95");
      await own.getByRole("button", { name: "Add another period" }).click();
      await expect.poll(() => own.count()).toBe(2);
      await own.nth(1).locator('[name$=".from"]').fill("2027-07-01");
      await own.nth(1).getByRole("checkbox", { name: "never lifted" }).check();
      await page.getByRole("button", { name: "Save package" }).click();
      await page.waitForURL(/saved=1/);
      const items = (await packageRow(id))?.items;
      expect(items).toEqual([{ measureId: measure.id, uptake: 0.95, startDay: 7, endDay: 77 }, { measureId: measure.id, uptake: 1, startDay: 122, endDay: null }]);
      expect(await page.locator("svg rect[data-mark]").count()).toBeGreaterThanOrEqual(2);
      expect(await page.locator("main").innerText()).toMatch(/has no end date; 112 days are lawful/);

      await page.locator("summary", { hasText: "Delete package" }).click();
      await page.getByRole("button", { name: "Delete package" }).click();
      await expect.poll(() => alert(page).innerText()).toMatch(/Tick the box to confirm/);
      expect(await packageRow(id)).toBeDefined();
      await page.getByRole("checkbox", { name: /I confirm/ }).check();
      await page.getByRole("button", { name: "Delete package" }).click();
      await page.waitForURL(/packages$/);
      expect(await packageRow(id)).toBeUndefined();
    });
  });
});

test("arrow keys move a bar by a day, with Shift by a week; the fields follow, and day 0 is the limit", async () => {
  const { ctx, outbreakId } = await anOutbreakWithPackages();
  const c = (await listPackages(outbreakId)).find(({ letter }) => letter === "C");
  await asPerson(browser, ctx, {}, async (page) => {
    await page.goto(`${base}/desk/outbreaks/${outbreakId}/packages/${c?.id}`);
    await alive(page);
    const bar = page.getByRole("slider", { name: "Gatherings: at most 10 people" });
    const own = line(page, "Gatherings: at most 10 people");
    const dates = async () => [await own.locator('[name$=".from"]').inputValue(), await own.locator('[name$=".until"]').inputValue()];
    expect(await dates()).toEqual(["2027-03-08", "2027-05-16"]);
    await bar.focus();
    await page.keyboard.press("ArrowRight");
    await expect.poll(dates).toEqual(["2027-03-09", "2027-05-17"]);
    await page.keyboard.press("Shift+ArrowRight");
    await expect.poll(dates).toEqual(["2027-03-16", "2027-05-24"]);
    expect(await bar.getAttribute("aria-valuetext")).toMatch(/^16.Mar to 24.May$/);
    expect(await page.locator("form#package [role=status]").innerText()).toMatch(/Not saved yet/);
    for (let week = 0; week < 3; week++) await page.keyboard.press("Shift+ArrowLeft");
    await expect.poll(dates).toEqual(["2027-03-01", "2027-05-09"]);
    expect(await bar.evaluate((element) => element === document.activeElement)).toBe(true);
    await page.getByRole("button", { name: "Save package" }).click();
    await page.waitForURL(/saved=1/);
    expect((await packageRow(c?.id ?? ""))?.items.map(({ startDay, endDay }) => [startDay, endDay])).toEqual([[7, 77], [7, 77], [7, 77], [0, 70], [7, 77], [7, 77], [7, 77]]);
    expect(await page.locator("main").innerText()).toMatch(/Gatherings: at most 10 people starts before its lead time/);
  });
});

test("a package that an assessment in work compares stays, and the page says which assessment", async () => {
  const { ctx, outbreakId, number } = await anAssessment({ packageLetters: ["A"] });
  const [a] = await listPackages(outbreakId);
  await asPerson(browser, ctx, { scripts: false }, async (page) => {
    await page.goto(`${base}/desk/outbreaks/${outbreakId}/packages/${a?.id}`);
    await page.locator("summary", { hasText: "Delete package" }).click();
    await page.getByRole("checkbox", { name: /I confirm/ }).check();
    await page.getByRole("button", { name: "Delete package" }).click();
    await expect.poll(() => alert(page).innerText()).toContain(`Assessment ${number}, still in work, compares this package.`);
    expect(await packageRow(a?.id ?? "")).toBeDefined();
  });
});

test("a reader sees a package and the catalogue without anything to press", async () => {
  const { outbreakId } = await anOutbreakWithPackages();
  const [a] = await listPackages(outbreakId);
  const { row } = await aMeasure();
  await asPerson(browser, await asStaff("legal"), {}, async (page) => {
    await page.goto(`${base}/desk/outbreaks/${outbreakId}/packages/${a?.id}`);
    expect(await page.locator("main button").count()).toBe(0);
    expect(await page.locator("form#package input:not([type=hidden])").count()).toBeGreaterThan(10);
    expect(await page.locator("form#package input:not([type=hidden]):enabled").count()).toBe(0);
    expect(await page.locator("[role=slider]").count()).toBe(0);
    await page.goto(`${base}/desk/measures/${row.id}`);
    expect(await page.locator("main button").count()).toBe(0);
    await page.goto(`${base}/desk/measures`);
    expect(await page.locator("main").innerText()).not.toContain("Describe a measure");
  });
});

test("the catalogue finds a measure by name, law and what people must do, by a plain link", async () => {
  const word = `Zz${crypto.randomUUID().slice(0, 8)}`;
  const { ctx, row } = await aMeasure({ legalBasis: `${word} Act, s. 3` });
  await asPerson(browser, ctx, { scripts: false }, async (page) => {
    await page.goto(`${base}/desk/measures`);
    await page.locator("#find").fill(word);
    await page.getByRole("button", { name: "Find" }).click();
    expect(await page.locator("tbody tr th[scope=row]").allInnerTexts()).toEqual([expect.stringContaining(row.name)]);
    expect(await page.locator("#find").inputValue()).toBe(word);
    await page.goto(`${base}/desk/measures?find=nothing-like-this`);
    expect(await page.locator("main").innerText()).toContain("No measure matches");
  });
});

describe.each([["light", 1440], ["dark", 1440], ["light", 390], ["dark", 390]] as const)("%s, %i px", (scheme, width) => {
  test("catalogue, measure, packages and package are sound", async () => {
    const { ctx, outbreakId } = await anOutbreakWithPackages();
    const [, , c] = await listPackages(outbreakId);
    const { row } = await aMeasure();
    await asPerson(browser, ctx, { scheme, width }, async (page) => {
      for (const path of ["measures", `measures/${row.id}`, "measures/new", `outbreaks/${outbreakId}/packages`, `outbreaks/${outbreakId}/packages/${c?.id}`]) {
        await page.goto(`${base}/desk/${path}`);
        await expectSound(page);
      }
    });
  });
});
