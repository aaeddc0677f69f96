import postgres from "postgres";
import { sql } from "drizzle-orm";
import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { closeDb, db } from "@/db/client";
import { ROLES, type Role } from "@/lib/auth/permissions";
import { CHECKLIST_ITEMS } from "@/lib/briefings/constants";
import { createBriefing } from "@/lib/briefings/create-briefing";
import { getWhole } from "@/lib/briefings/queries";
import { reviewBriefing } from "@/lib/briefings/review-briefing";
import { saveBriefingSettings, saveText } from "@/lib/briefings/save-text";
import { submitBriefing } from "@/lib/briefings/submit-briefing";
import { listTasks } from "@/lib/briefings/tasks";
import { closeCompute } from "@/lib/compute/assess-off-thread";
import type { StaffCtx } from "@/lib/context";
import { DomainError, type DomainErrorCode } from "@/lib/errors";
import { publishBriefing } from "@/lib/publications/publish-briefing";
import { withdrawBriefing } from "@/lib/publications/withdraw-briefing";
import { aFrozenAssessment, asStaff } from "../fixtures/assessments";

let assessmentId = "";
let officer: StaffCtx;
let reviewer: StaffCtx;
let publisher: StaffCtx;
const owner = postgres(process.env["DATABASE_OWNER_URL"] ?? "", { max: 1, onnotice: () => {} });
const web = postgres(process.env["DATABASE_URL"] ?? "", { max: 1, onnotice: () => {} });

beforeAll(async () => {
  assessmentId = (await aFrozenAssessment()).assessmentId;
  [officer, reviewer, publisher] = (await Promise.all([asStaff("communications"), asStaff("legal"), asStaff("communications")])) as [StaffCtx, StaffCtx, StaffCtx];
});
afterAll(async () => {
  await Promise.all([owner.end(), web.end(), closeCompute()]);
  await closeDb();
});

const lock = async (id: string) => (await getWhole(id)).row.version;
const state = async (id: string) => (await getWhole(id)).row.state;
const refusal = async (run: Promise<unknown>): Promise<DomainErrorCode | string> =>
  run.then(
    () => "accepted",
    (error: unknown) => (error instanceof DomainError ? error.code : String(error)),
  );
const items = Object.fromEntries(CHECKLIST_ITEMS.map((n) => [`i${n}`, { answer: "pass" as const, note: "" }]));

async function aDraft(): Promise<string> {
  const { id } = await createBriefing(officer, { assessmentId, packageLetter: "B" });
  await saveBriefingSettings(officer, { briefingId: id, version: 1, reviewDate: "2027-05-03" });
  return id;
}
async function submitted(): Promise<{ id: string; versionId: string }> {
  const id = await aDraft();
  const { versionId } = await submitBriefing(officer, { briefingId: id, version: await lock(id) });
  return { id, versionId };
}
async function signed(): Promise<{ id: string; versionId: string }> {
  const made = await submitted();
  await reviewBriefing(reviewer, { briefingId: made.id, versionId: made.versionId, decision: "sign", comment: "", items });
  return made;
}
const edit = async (id: string, by = officer, text = "Another word.") => {
  const { source } = await getWhole(id);
  await saveText(by, {
    briefingId: id, locale: "en", version: source.version, title: source.title, titleCurrent: false,
    paragraphs: source.paragraphs.map((paragraph, index) => ({ ...paragraph, text: index === 0 ? `${paragraph.text} ${text}` : paragraph.text, current: false })),
  });
};

describe("who may do what", () => {
  const allowed: Record<string, Role[]> = { create: ["communications"], review: ["legal"], publish: ["communications"], withdraw: ["communications", "legal"] };
  test.each(ROLES)("%s", async (role) => {
    const ctx = await asStaff(role);
    const { id, versionId } = await submitted();
    const tries = {
      create: () => createBriefing(ctx, { assessmentId, packageLetter: "B" }),
      review: () => reviewBriefing(ctx, { briefingId: id, versionId, decision: "return", comment: "No." }),
      publish: () => publishBriefing(ctx, { briefingId: id, version: 1, urgency: "routine" }),
      withdraw: () => withdrawBriefing(ctx, { briefingId: id, version: 1, reason: "x", notice: { en: "x" }, confirmed: "yes" }),
    };
    for (const [name, run] of Object.entries(tries)) {
      const outcome = await refusal(run());
      if (allowed[name]?.includes(role)) expect(outcome, name).not.toBe("forbidden");
      else expect(outcome, name).toBe("forbidden");
    }
  });
});

describe("submitting", () => {
  test("is refused, with every reason, while something is open", async () => {
    const { id } = await createBriefing(officer, { assessmentId, packageLetter: "C" });
    await edit(id);
    const error = await submitBriefing(officer, { briefingId: id, version: await lock(id) }).catch((each: unknown) => each);
    expect((error as DomainError).detail.reasons).toEqual(["findingsOpen", "reviewDateMissing", "notDeliverable"]);
  });
  test("keeps exactly what every language shows, and names everyone who wrote", async () => {
    const id = await aDraft();
    const { versionId } = await submitBriefing(publisher, { briefingId: id, version: await lock(id) });
    const { version } = await getWhole(id);
    expect(version?.id).toBe(versionId);
    expect(version?.authors.toSorted()).toEqual([officer.actor.id, publisher.actor.id].toSorted());
    const { rendered } = JSON.parse(version?.content ?? "{}") as { rendered: { locale: string; figures: { ref: string }[] }[] };
    expect(rendered).toHaveLength(7);
    for (const each of rendered) expect(each.figures.map(({ ref }) => ref)).toEqual(["F1", "F2", "F3", "F4", "F5", "F6", "F7"]);
  });
});

describe("signing", () => {
  test("one's own work is refused in code and in SQL", async () => {
    const both = await asStaff("legal");
    const id = await aDraft();
    await db.execute(sql`update briefing_texts set authors = array_append(authors, ${both.actor.id}) where briefing_id = ${id} and locale = 'fr'`);
    const { versionId } = await submitBriefing(officer, { briefingId: id, version: await lock(id) });
    expect(await refusal(reviewBriefing(both, { briefingId: id, versionId, decision: "sign", comment: "", items }))).toBe("ownWork");
    const { version } = await getWhole(id);
    await expect(
      web`insert into reviews (version_id, decision, reviewer, reviewer_name, reviewer_role, checklist, statement, content_hash, at) values (${versionId}, 'signed', ${both.actor.id}, 'x', 'legal', '{}', 'x', ${version?.contentHash ?? ""}, now())`,
    ).rejects.toThrow("an author may not review their own work");
    await expect(
      web`insert into reviews (version_id, decision, reviewer, reviewer_name, reviewer_role, checklist, statement, content_hash, at) values (${versionId}, 'signed', ${reviewer.actor.id}, 'x', 'legal', '{}', 'x', ${"0".repeat(64)}, now())`,
    ).rejects.toThrow("the review names another content than the version");
  });
  test("an edit after it voids it and opens the next version; what was signed can't be published any more", async () => {
    const { id } = await signed();
    expect(await state(id)).toBe("approved");
    await edit(id);
    const whole = await getWhole(id);
    expect([whole.row.state, whole.row.versionNumber, whole.signature]).toEqual(["draft", 2, null]);
    const [voided] = await db.execute(sql`select v.reason from signature_voids v join reviews r on r.id = v.review_id join briefing_versions b on b.id = r.version_id where b.briefing_id = ${id}`);
    expect(voided?.["reason"]).toBe("text changed (en)");
    expect(await refusal(publishBriefing(publisher, { briefingId: id, version: await lock(id), urgency: "routine" }))).toBe("notReady");
  });
  test("of 20 at once, one succeeds", async () => {
    const { id, versionId } = await submitted();
    const outcomes = await Promise.all(Array.from({ length: 20 }, () => refusal(reviewBriefing(reviewer, { briefingId: id, versionId, decision: "sign", comment: "", items }))));
    expect(outcomes.filter((each) => each === "accepted")).toHaveLength(1);
  });
});

describe("publishing", () => {
  test("without a signature, or by the signer, is refused in SQL too", async () => {
    const { id, versionId } = await submitted();
    const { version, frozen } = await getWhole(id);
    const release = (by: string) =>
      web`insert into releases (briefing_id, version_id, outbreak_id, slug, number, kind, urgency, assessment_hash, content_hash, published_by, published_at)
          values (${id}, ${versionId}, ${frozen.outbreakId}, 'x', 1, 'first', 'routine', 'x', ${version?.contentHash ?? ""}, ${by}, now())`;
    await expect(release(publisher.actor.id)).rejects.toThrow("the version has no signature that stands");
    await reviewBriefing(reviewer, { briefingId: id, versionId, decision: "sign", comment: "", items });
    await expect(release(reviewer.actor.id)).rejects.toThrow("the signer may not publish");
  });
  test("of 20 at once, one succeeds: one release, seven languages, the register binds the content", async () => {
    const { id } = await signed();
    const version = await lock(id);
    const outcomes = await Promise.all(Array.from({ length: 20 }, () => refusal(publishBriefing(publisher, { briefingId: id, version, urgency: "routine" }))));
    expect(outcomes.filter((each) => each === "accepted")).toHaveLength(1);
    const rows = await db.execute(sql`select p.locale, r.content_hash from releases r join publications p on p.release_id = r.id where r.briefing_id = ${id}`);
    expect(rows).toHaveLength(7);
    const [entry] = await db.execute(sql`select canonical from audit.entry where subject = ${`briefing/${id}`} and action = 'briefing.publish'`);
    expect(JSON.parse(String(entry?.["canonical"]))["object_hash"]).toBe(rows[0]?.["content_hash"]);
  });
});

test.each(["frozen_assessments", "briefing_versions", "reviews", "signature_voids", "releases", "publications", "release_events"])("rows of %s never change, whoever asks", async (table) => {
  const { id } = await signed();
  await publishBriefing(publisher, { briefingId: id, version: await lock(id), urgency: "routine" });
  await withdrawBriefing(publisher, { briefingId: id, version: await lock(id), reason: "test", notice: { en: "Withdrawn." }, confirmed: "yes" });
  const other = await signed();
  await edit(other.id);
  const [column] = await owner.unsafe(`select column_name from information_schema.columns where table_name = '${table}' and data_type = 'text' limit 1`);
  for (const [client, message] of [[owner, `rows of ${table} never change`], [web, "permission denied"]] as const) {
    await expect(client.unsafe(`update ${table} set ${column?.["column_name"]} = 'changed'`)).rejects.toThrow(message);
    await expect(client.unsafe(`delete from ${table}`)).rejects.toThrow(message);
    await expect(client.unsafe(`truncate ${table} cascade`)).rejects.toThrow(/never change|permission denied/);
  }
});

test("the home page names what is open: nothing of an outbreak that has packages and an assessment, and the review for reviewers", async () => {
  const adviser = await asStaff("adviser");
  const { id } = await submitted();
  const whole = await getWhole(id);
  const hrefs = (await listTasks(adviser)).map(({ href }) => href);
  expect(hrefs).not.toContain(`/desk/outbreaks/${whole.frozen.outbreakId}/packages`);
  expect(hrefs).not.toContain(`/desk/assessments/new?outbreak=${whole.frozen.outbreakId}`);
  expect((await listTasks(reviewer)).map(({ href }) => href)).toContain(`/desk/briefings/${id}/review`);
});
