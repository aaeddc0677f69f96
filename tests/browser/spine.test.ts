import { spawnSync } from "node:child_process";
import type { Browser, Page } from "playwright-core";
import { afterAll, beforeAll, expect, test } from "vitest";
import { LOCALE_CODES } from "@/lib/i18n/locales";
import { base, launch } from "./support/desk";
import { linkIn, rawMail, waitForMail } from "./support/mail";

let browser: Browser;
beforeAll(async () => {
  browser = await launch();
});
afterAll(() => browser.close());

const unique = Date.now().toString(36);
const ILLNESS = `Marsh cough ${unique}`;
const CODE = `quiet-${unique}`;

/** A browser of one's own, signed in by one click. */
async function as(name: string, run: (page: Page) => Promise<void>): Promise<void> {
  const context = await browser.newContext({ viewport: { width: 1280, height: 900 }, acceptDownloads: true });
  const page = await context.newPage();
  await page.goto(`${base}/sign-in`);
  await page.getByRole("button", { name: new RegExp(name) }).click();
  await page.waitForURL(`${base}/desk`);
  try {
    await run(page);
  } finally {
    await context.close();
  }
}

const fill = async (page: Page, fields: Record<string, string>) => {
  for (const [name, text] of Object.entries(fields)) await page.locator(`main [name="${name}"]`).first().fill(text);
};
const quantity = (name: string, low: string, central: string, high: string) => ({ [`${name}.low`]: low, [`${name}.central`]: central, [`${name}.high`]: high, [`${name}.source`]: "Typed for this test." });

test("an outbreak typed in by hand ends in a resident's inbox, the same figure everywhere", async () => {
  let outbreak = "";
  let assessment = "";
  let briefing = "";
  let slug = "";

  // The adviser signs in by a link from the mail, which a scanner has fetched before.
  const adviser = await browser.newContext({ viewport: { width: 1280, height: 900 } });
  const page = await adviser.newPage();
  await page.goto(`${base}/sign-in`);
  await page.getByLabel("E-mail").fill("ilse.maron@example.org");
  await page.getByRole("button", { name: "Send me a link" }).click();
  await page.waitForURL(/\/sign-in\/sent/);
  const link = linkIn((await waitForMail("ilse.maron@example.org")).text, /\/sign-in\/confirm\?token=/);
  for (const method of ["GET", "HEAD"]) await fetch(link, { method });
  await page.goto(link);
  await page.getByRole("button", { name: "Sign in" }).click();
  await page.waitForURL(`${base}/desk`);

  // Outbreak and profile.
  await page.goto(`${base}/desk/outbreaks/new`);
  await fill(page, { name: ILLNESS, place: "Testmarsh", populationPersons: "250000", dayZero: "2027-04-01", priceYear: "2027" });
  await page.getByRole("button", { name: "Create outbreak" }).click();
  await page.waitForURL(/\/desk\/outbreaks\/[0-9a-f-]{36}$/);
  outbreak = page.url();
  await fill(page, {
    ...quantity("transmission.value", "1.6", "1.9", "2.3"),
    ...quantity("infectious", "30", "50", "80"),
    ...quantity("infectiousPeriodDays", "4", "5", "6"),
    ...quantity("latentPeriodDays", "2", "3", "4"),
    ...quantity("infectionFatalityPercent", "0.3", "0.5", "0.8"),
  });
  await page.getByRole("button", { name: "Save profile" }).click();
  await page.waitForURL(/saved=profile/);

  // A measure with words for residents in every language, and a package with dates.
  await page.goto(`${base}/desk/measures/new`);
  await fill(page, {
    name: `Quiet evenings ${unique}`, shortName: "quiet evenings", code: CODE, instruction: "Be home by nine.", ...quantity("cutPercent", "20", "30", "40"), legalBasis: "Health Act, s. 12 (9)", maxDays: "120",
    ...Object.fromEntries(LOCALE_CODES.flatMap((code) => [[`publicTexts.${code}.title`, `[${code}] quiet`], [`publicTexts.${code}.detail`, `[${code}] detail`]])),
  });
  await page.locator("details", { hasText: "public purse" }).first().locator("summary").click().catch(() => undefined);
  await page.getByRole("button", { name: "Add to catalogue" }).click();
  await page.waitForURL(/\/desk\/measures$/);
  await page.goto(`${outbreak}/packages`);
  await page.locator("#new-package-name").fill("Quiet");
  await page.getByRole("button", { name: "Add package" }).click();
  await page.waitForURL(/\/packages\/[0-9a-f-]{36}$/);
  const row = page.locator("tr, li, fieldset").filter({ has: page.getByRole("checkbox", { name: `Quiet evenings ${unique}`, exact: true }) }).last();
  await row.getByRole("checkbox", { name: `Quiet evenings ${unique}`, exact: true }).check();
  await row.locator('[name$=".uptakePercent.central"]').fill("90");
  await row.locator('[name$=".from"]').fill("2027-04-11");
  await row.locator('[name$=".until"]').fill("2027-07-19");
  await page.getByRole("button", { name: "Save package" }).click();
  await page.waitForURL(/saved=1/);

  // Assessment, frozen; the exported input gives the stored result on the command line.
  await page.goto(`${base}/desk/assessments/new?outbreak=${outbreak.split("/").at(-1)}`);
  await page.getByRole("button", { name: "Open assessment" }).click();
  await page.waitForURL(/\/desk\/assessments\/[0-9a-f-]{36}$/);
  assessment = page.url();
  await page.locator('[name="reason"]').fill("The council decides tomorrow and needs figures that stay.");
  await page.getByRole("button", { name: "Freeze assessment" }).last().click();
  await page.getByText("Nothing here can change.").waitFor({ timeout: 60_000 });
  const [input, result] = await Promise.all(["input.json", "result.json"].map(async (file) => (await adviser.request.get(`${assessment}/${file}`)).text()));
  const recomputed = spawnSync("npm", ["run", "--silent", "assess"], { input, encoding: "utf8", maxBuffer: 1 << 26 });
  expect(recomputed.status, recomputed.stderr).toBe(0);
  expect(recomputed.stdout).toBe(result);
  await adviser.close();

  // A resident asks for updates in Arabic and confirms by the button, not by opening the link.
  const resident = `resident-${unique}@example.org`;
  const phone = await browser.newContext({ viewport: { width: 390, height: 844 }, javaScriptEnabled: false });
  const reader = await phone.newPage();
  await reader.goto(`${base}/ar/subscribe`);
  await reader.locator('main [name="email"]').fill(resident);
  await reader.locator('main button[type="submit"]').click();
  await reader.waitForURL(/\/ar\/subscribe\/sent/);
  const confirm = linkIn((await waitForMail(resident)).text, /\/ar\/confirm\//);
  await fetch(confirm);
  await reader.goto(confirm);
  await reader.locator('main button[type="submit"]').click();
  await reader.waitForLoadState("networkidle");

  // The officer writes and translates.
  const REMARK = "Please keep the evenings quiet.";
  await as("Noor Haddad", async (officer) => {
    await officer.goto(`${base}/desk/briefings/new?assessment=${assessment.split("/").at(-1)}`);
    await officer.getByRole("button", { name: "Start briefing" }).first().click();
    await officer.waitForURL(/\/desk\/briefings\/[0-9a-f-]{36}$/);
    briefing = officer.url();
    await officer.locator('[name="reviewDate"]').fill("2027-05-10");
    await officer.getByRole("button", { name: "Save date" }).click();
    await officer.waitForURL(/saved=1/);
    await officer.getByLabel("Another paragraph in “In short”").fill(REMARK);
    await officer.getByRole("button", { name: "Save English" }).click();
    await officer.waitForURL(/locale=en&saved=1/);
    expect(await officer.getByRole("button", { name: "Submit for review" }).isEnabled()).toBe(false);
    for (const code of LOCALE_CODES.filter((each) => each !== "en")) {
      await officer.goto(`${briefing}?locale=${code}`);
      const empty = officer.locator("main textarea").filter({ hasText: /^$/ });
      await empty.first().fill(`[${code}] ${REMARK}`);
      await officer.locator('main form button[type="submit"]').first().click();
      await officer.waitForURL(new RegExp(`locale=${code}&saved=1`));
    }
    await officer.goto(briefing);
    await officer.getByRole("button", { name: "Submit for review" }).click();
    await officer.getByText("In review; a change takes it back to draft.").waitFor();
  });

  const answerAll = async (reviewer: Page) => {
    for (let n = 1; n <= 18; n++) await reviewer.locator(`[name="items.i${n}.answer"][value="pass"]`).check();
  };
  // The reviewer returns it once; the officer changes a sentence; the reviewer signs.
  await as("Henrik Solberg", async (reviewer) => {
    await reviewer.goto(`${briefing}/review`);
    await reviewer.getByText("Recomputed now: the same result to the byte.").waitFor();
    await reviewer.getByRole("button", { name: /^Sign version/ }).click();
    await reviewer.getByRole("alert").getByText(/answer every question/).waitFor();
    await reviewer.locator('[name="comment"]').fill("Say what quiet means.");
    await reviewer.getByRole("button", { name: "Return with comments" }).click();
    await reviewer.getByText("Henrik Solberg returned version 1").waitFor();
  });
  await as("Noor Haddad", async (officer) => {
    await officer.goto(briefing);
    await officer.getByText("Returned: Say what quiet means.").waitFor();
    await officer.locator("main textarea").filter({ hasText: REMARK }).fill("Please make no noise after nine in the evening.");
    await officer.getByRole("button", { name: "Save English" }).click();
    await officer.waitForURL(/saved=1/);
    for (const code of LOCALE_CODES.filter((each) => each !== "en")) {
      await officer.goto(`${briefing}?locale=${code}`);
      await officer.locator("main textarea").filter({ hasText: REMARK }).fill(`[${code}] Please make no noise.`);
      await officer.locator('main form button[type="submit"]').first().click();
      await officer.waitForURL(new RegExp(`locale=${code}&saved=1`));
    }
    await officer.goto(briefing);
    await officer.getByRole("button", { name: "Submit for review" }).click();
    await officer.getByText("In review; a change takes it back to draft.").waitFor();
  });
  await as("Henrik Solberg", async (reviewer) => {
    await reviewer.goto(`${briefing}/review`);
    await reviewer.locator("ins", { hasText: "make" }).first().waitFor();
    await answerAll(reviewer);
    await reviewer.getByRole("button", { name: "Sign version 2" }).click();
    await reviewer.getByText("This version is signed by Henrik Solberg.").waitFor();
  });

  // Published; the figure on the Arabic page is the one in the Arabic mail.
  await as("Lucía Ferrer", async (publisher) => {
    await publisher.goto(`${briefing}/publication`);
    await publisher.getByRole("button", { name: "Publish version 2" }).click();
    await publisher.getByText("Release 1").waitFor();
    slug = ((await publisher.getByRole("link", { name: "Read it" }).first().getAttribute("href")) ?? "").split("/").at(-1) ?? "";
  });
  await reader.goto(`${base}/ar/briefings/${slug}`);
  const figure = (await reader.locator("article a.pf").first().innerText()).trim();
  expect(figure).toMatch(/\d/);
  expect(await reader.locator("article").innerText()).toContain("[ar] Please make no noise.");
  expect(await phone.cookies()).toEqual([]);
  const mail = await waitForMail(resident, (each) => each.text.includes("[ar] Please make no noise."));
  expect(mail.text).toContain(figure);
  expect(mail.html).toContain(figure);
  const stored = JSON.parse(result ?? "") as { packages: { uncertainty: { deathsAverted: { asScheduled: { median: number } } } }[] };
  const averted = Number((stored.packages[0]?.uncertainty.deathsAverted.asScheduled.median ?? Number.NaN).toPrecision(3));
  expect(Number(figure.replaceAll(",", ""))).toBe(Math.round(averted));

  // One POST to the address that the raw header names ends it; a GET doesn't.
  const raw = await rawMail(mail.id);
  const header = raw.replace(/\r\n[ \t]+/g, " ");
  expect(header).toMatch(/^List-Unsubscribe-Post: List-Unsubscribe=One-Click\r?$/m);
  const leave = /^List-Unsubscribe: <(http[^>]+)>/m.exec(header)?.[1] ?? "";
  expect((await fetch(leave)).status).toBe(200);
  const left = await fetch(leave, { method: "POST", headers: { "content-type": "application/x-www-form-urlencoded" }, body: "List-Unsubscribe=One-Click", redirect: "manual" });
  expect([left.status, left.headers.get("set-cookie")]).toEqual([200, null]);
  await phone.close();
});
