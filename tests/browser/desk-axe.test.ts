import { sql } from "drizzle-orm";
import type { Browser } from "playwright-core";
import { afterAll, beforeAll, describe, test } from "vitest";
import { closeDb, db } from "@/db/client";
import { as } from "@/db/demo/actor";
import type { PersonKey } from "@/db/demo/people";
import { asPerson, base, expectSound, launch } from "./support/desk";

let browser: Browser;
const ids: Record<string, string> = {};
beforeAll(async () => {
  browser = await launch();
  const one = async (text: ReturnType<typeof sql>) => String((await db.execute(text))[0]?.["id"]);
  ids["outbreak"] = await one(sql`select id from outbreaks order by created_at limit 1`);
  ids["draft"] = await one(sql`select id from briefings where state = 'draft' limit 1`);
  ids["review"] = await one(sql`select id from briefings where state = 'legalReview' limit 1`);
  ids["published"] = await one(sql`select id from briefings where state = 'published' order by number desc limit 1`);
});
afterAll(async () => {
  await browser.close();
  await closeDb();
});

const PAGES: [PersonKey, string][] = [
  ["adviserOne", "/desk"],
  ["adviserOne", "/desk/outbreaks"],
  ["adviserOne", "/desk/outbreaks/new"],
  ["adviserOne", "/desk/outbreaks/{outbreak}"],
  ["officerOne", "/desk/briefings"],
  ["officerOne", "/desk/briefings/new"],
  ["officerOne", "/desk/briefings/{draft}"],
  ["officerOne", "/desk/briefings/{draft}?locale=ar"],
  ["officerOne", "/desk/briefings/{draft}/preview/ar"],
  ["reviewerOne", "/desk/briefings/{review}/review"],
  ["officerTwo", "/desk/briefings/{published}/publication"],
  ["officerTwo", "/desk/deliveries"],
  ["administrator", "/desk/settings"],
  ["administrator", "/desk/register"],
];

/** axe finds nothing, and nothing is wider than the window, light and dark, on a desk and on a phone. */
describe.each([["light", 1440], ["dark", 1440], ["light", 390]] as const)("%s at %d px", (scheme, width) => {
  test.each(PAGES)("%s: %s", async (person, path) => {
    await asPerson(browser, as(person), { scheme, width }, async (page) => {
      await page.goto(base + path.replace(/\{(\w+)\}/, (_, name: string) => ids[name] ?? ""));
      await expectSound(page);
    });
  });
});

test.each(["", "/sent", "/confirm?token=x"])("sign-in%s in Arabic, dark", async (path) => {
  const context = await browser.newContext({ colorScheme: "dark", viewport: { width: 390, height: 844 } });
  const page = await context.newPage();
  await page.goto(`${base}/sign-in${path}${path.includes("?") ? "&" : "?"}lang=ar`);
  await expectSound(page);
  await context.close();
});
