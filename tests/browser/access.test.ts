import { readFileSync } from "node:fs";
import { sql } from "drizzle-orm";
import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { closeDb, db } from "@/db/client";
import { PEOPLE } from "@/db/demo/people";
import { sessions } from "@/db/schema";
import { sessionCookieName } from "@/lib/auth/constants";
import { can, type Permission, ROLES, type Role } from "@/lib/auth/permissions";
import { base } from "./support/desk";

/** Who may open or use it: a permission, anybody signed in or not, or our own signed processes. */
type Needs = Permission | "anybody" | "ownProcess" | "signedPost";

/** Every page and route of the build. One that is not in this table fails the test. */
const PLACES: Record<string, Needs> = {
  "/sign-in": "anybody", "/sign-in/sent": "anybody", "/sign-in/confirm": "anybody", "/sign-out": "signedPost",
  "/desk": "desk:read", "/desk/not-allowed": "desk:read",
  "/desk/outbreaks": "desk:read", "/desk/outbreaks/new": "outbreak:write", "/desk/outbreaks/[outbreakId]": "desk:read", "/desk/outbreaks/[outbreakId]/packages": "desk:read", "/desk/outbreaks/[outbreakId]/packages/[packageId]": "desk:read",
  "/desk/measures": "desk:read", "/desk/measures/new": "measure:write", "/desk/measures/[measureId]": "desk:read",
  "/desk/assessments": "desk:read", "/desk/assessments/new": "assessment:write", "/desk/assessments/[assessmentId]": "desk:read",
  "/desk/assessments/[assessmentId]/input.json": "desk:read", "/desk/assessments/[assessmentId]/result.json": "desk:read", "/desk/assessments/[assessmentId]/context.json": "desk:read",
  "/desk/briefings": "desk:read", "/desk/briefings/new": "briefing:write", "/desk/briefings/[briefingId]": "desk:read", "/desk/briefings/[briefingId]/preview/[locale]": "desk:read", "/desk/briefings/[briefingId]/review": "desk:read", "/desk/briefings/[briefingId]/publication": "desk:read",
  "/desk/register": "register:read", "/desk/deliveries": "delivery:read", "/desk/settings": "desk:read",
  "/api/desk/deliveries": "delivery:read", "/api/desk/recalculate": "signedPost",
  "/api/auth/[...nextauth]": "anybody", "/api/health": "anybody", "/api/internal/revalidate": "ownProcess",
  "/": "anybody", "/icon.svg": "anybody", "/u/[token]": "anybody", "/_not-found": "anybody", "/_global-error": "anybody",
  ...Object.fromEntries(
    ["", "/404", "/[...rest]", "/accessibility", "/briefings/[slug]", "/briefings/[slug]/v/[number]", "/confirm/[token]", "/corrections", "/method", "/privacy", "/releases", "/subscribe", "/subscribe/sent", "/subscription/[token]"].map((path) => [`/[locale]${path}`, "anybody" as const]),
  ),
};

/** Every server action of the build. One that is not in this table fails the test. */
const ACTIONS: Record<string, Needs> = {
  requestSignInAction: "anybody", confirmSignInAction: "anybody", demonstrationSignInAction: "anybody",
  createOutbreakAction: "outbreak:write", updateOutbreakAction: "outbreak:write", saveProfileAction: "outbreak:write",
  createMeasureAction: "measure:write", updateMeasureAction: "measure:write", archiveMeasureAction: "measure:write",
  createPackageAction: "package:write", updatePackageAction: "package:write", deletePackageAction: "package:write",
  createAssessmentAction: "assessment:write", saveAssessmentAction: "assessment:write", freezeAssessmentAction: "assessment:freeze",
  createBriefingAction: "briefing:write", saveTextAction: "briefing:write", saveSettingsAction: "briefing:write", addFigureAction: "briefing:write", submitBriefingAction: "briefing:submit",
  reviewBriefingAction: "briefing:review", publishBriefingAction: "briefing:publish", reviseBriefingAction: "briefing:publish", withdrawBriefingAction: "briefing:withdraw",
  inviteUserAction: "user:manage", changeRoleAction: "user:manage", deactivateUserAction: "user:manage", endOtherSessionsAction: "desk:read",
  subscribeAction: "anybody", confirmAction: "anybody", changeAction: "anybody", leaveAction: "anybody", undoAction: "anybody",
};

const REFUSED = "Your role doesn't allow this.";
const WHO: Record<Role, string> = { adviser: PEOPLE.adviserTwo.id, communications: PEOPLE.officerThree.id, legal: PEOPLE.reviewerTwo.id, administrator: PEOPLE.administrator.id };

const manifest = (name: string) => JSON.parse(readFileSync(`${process.env["EBBMARK_DIST"] ?? ".next"}/server/${name}`, "utf8"));
const places = Object.keys(manifest("app-paths-manifest.json")).map((path) => path.replace(/\/\([a-z]+\)/g, "").replace(/\/(?:page|route)$/, "") || "/");
type Reference = { exportedName: string; workers: Record<string, unknown> };
const actions = Object.entries(manifest("server-reference-manifest.json").node as Record<string, Reference>).map(([id, { exportedName, workers }]) => ({
  id,
  name: exportedName,
  path: (Object.keys(workers)[0] ?? "").replace(/^app/, "").replace(/\/\([a-z]+\)/g, "").replace(/\/page$/, ""),
}));

const cookies = new Map<Role | "nobody", string>();
const ids: Record<string, string> = {};
beforeAll(async () => {
  for (const role of ROLES) {
    const token = crypto.randomUUID();
    await db.insert(sessions).values({ sessionToken: token, userId: WHO[role], expires: new Date(Date.now() + 3_600_000) });
    cookies.set(role, `${sessionCookieName(false)}=${token}`);
  }
  const one = async (text: ReturnType<typeof sql>) => String((await db.execute(text))[0]?.["id"]);
  ids["outbreakId"] = await one(sql`select id from outbreaks order by created_at limit 1`);
  ids["packageId"] = await one(sql`select id from packages where outbreak_id = ${ids["outbreakId"]} limit 1`);
  ids["measureId"] = await one(sql`select id from measures limit 1`);
  ids["assessmentId"] = await one(sql`select assessment_id as id from frozen_assessments order by frozen_at limit 1`);
  ids["briefingId"] = await one(sql`select id from briefings where state = 'legalReview' limit 1`);
  ids["slug"] = await one(sql`select slug as id from releases limit 1`);
});
afterAll(() => closeDb());

const concrete = (path: string) =>
  path.replace("[...rest]", "nothing-here").replace("[...nextauth]", "session").replace("[locale]", "en").replace("[number]", "1").replace("[token]", "not-a-token").replace(/\[(\w+)\]/g, (_, name: string) => ids[name] ?? "x");
const as = (who: Role | "nobody"): Record<string, string> => (cookies.has(who) ? { cookie: cookies.get(who) ?? "" } : {});
const everybody = [...ROLES, "nobody"] as const;

test("every page, route and action of the build stands in the table, and nothing else", () => {
  expect(places.toSorted()).toEqual(Object.keys(PLACES).toSorted());
  expect([...new Set(actions.map(({ name }) => name))].toSorted()).toEqual(Object.keys(ACTIONS).toSorted());
});

describe.each(everybody)("%s", (who) => {
  test.each(Object.entries(PLACES).filter(([, needs]) => needs !== "ownProcess" && needs !== "signedPost"))("opens %s only with %s", async (path, needs) => {
    const answer = await fetch(base + concrete(path), { headers: as(who), redirect: "manual" });
    const location = answer.headers.get("location") ?? "";
    if (needs === "anybody") {
      expect(answer.status < 500 || path === "/_global-error", `${answer.status}`).toBe(true); // that page is what a failure shows
      expect(location).not.toMatch(/sign-in/);
    } else if (who === "nobody") {
      expect([301, 302, 303, 307, 308, 401]).toContain(answer.status);
      if (answer.status !== 401) expect(location).toMatch(/\/sign-in$/);
      expect(await answer.text()).not.toContain("Kelmaren, ");
    } else if (can(who, needs as Permission)) expect(answer.status).toBe(200);
    else if (answer.status !== 403) {
      expect(answer.status).toBe(307);
      expect(location).toMatch(/\/desk\/not-allowed/);
    }
  });

  test.each(Object.entries(ACTIONS))("uses %s only with %s", async (name, needs) => {
    const action = actions.find((each) => each.name === name);
    if (!action) throw new Error(`${name} is not in the build`);
    const before = (await db.execute(sql`select seq from audit.head`))[0]?.["seq"];
    const form = new FormData();
    form.set("0", '["$undefined","$K1"]');
    const answer = await fetch(base + concrete(action.path), { method: "POST", headers: { ...as(who), origin: base, "next-action": action.id }, body: form, redirect: "manual" });
    const text = await answer.text();
    if (needs === "anybody") expect(text).not.toContain(REFUSED);
    else if (who === "nobody") expect(answer.headers.get("x-action-redirect") ?? answer.headers.get("location")).toMatch(/sign-in/);
    else if (can(who, needs as Permission)) {
      expect(answer.status).toBeLessThan(400);
      expect(text).not.toContain(REFUSED);
    } else expect(text).toContain(REFUSED);
    // An empty form changes nothing, whoever sends it.
    if (name !== "endOtherSessionsAction") expect((await db.execute(sql`select seq from audit.head`))[0]?.["seq"]).toEqual(before);
  });
});

describe("an action asks where it was sent from", () => {
  test.each([undefined, "null", "https://evil.example", `${base}.evil.example`])("origin %s is refused", async (origin) => {
    const action = actions.find(({ name }) => name === "createOutbreakAction");
    const answer = await fetch(`${base}/desk/outbreaks/new`, { method: "POST", headers: { ...as("adviser"), "next-action": action?.id ?? "", ...(origin ? { origin } : {}) }, body: new FormData() });
    expect(answer.status).toBe(403);
  });
  test("one-click sign-in refuses what came through a proxy or names another host", async () => {
    const action = actions.find(({ name }) => name === "demonstrationSignInAction");
    const form = new FormData();
    form.set("0", '["$undefined","$K1"]');
    form.set("1_userId", PEOPLE.administrator.id);
    const answer = await fetch(`${base}/sign-in`, { method: "POST", headers: { origin: base, "next-action": action?.id ?? "", "x-forwarded-for": "192.0.2.1" }, body: form, redirect: "manual" });
    expect(answer.headers.get("set-cookie") ?? "").not.toContain(sessionCookieName(false));
  });
  test("the library's own sign-in, callback and log routes are closed", async () => {
    for (const path of ["signin/email", "callback/email?token=x&email=y", "_log", "signout", "providers"]) {
      for (const method of ["GET", "POST"]) expect((await fetch(`${base}/api/auth/${path}`, { method, headers: { origin: base }, redirect: "manual" })).status, `${method} ${path}`).toBe(404);
    }
  });
});
