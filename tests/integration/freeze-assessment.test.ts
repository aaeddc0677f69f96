import { spawnSync } from "node:child_process";
import { eq, sql } from "drizzle-orm";
import { drizzle } from "drizzle-orm/postgres-js";
import postgres from "postgres";
import { afterAll, describe, expect, test } from "vitest";
import { closeDb, db } from "@/db/client";
import { assessments, frozenAssessments, measures } from "@/db/schema";
import { exportInput, exportResult } from "@/lib/assessments/export-files";
import { freezeAssessment } from "@/lib/assessments/freeze-assessment";
import { objectHashOf } from "@/lib/assessments/object-hash";
import { getFrozen } from "@/lib/assessments/queries";
import { updateAssessment } from "@/lib/assessments/update-assessment";
import { ROLES } from "@/lib/auth/permissions";
import { sha256Hex } from "@/lib/canonical-json";
import { assessOffThread, closeCompute } from "@/lib/compute/assess-off-thread";
import { aFrozenAssessment, anAssessment, asStaff, packagesOf } from "../fixtures/assessments";

afterAll(async () => {
  await closeCompute();
  await closeDb();
});
const reason = "The council decides on Tuesday.";
const registerOf = (subject: string) =>
  db.execute<{ action: string; canonical: string }>(sql`select action, canonical from audit.entry where subject = ${subject} order by seq`);

describe("freezeAssessment", () => {
  test("keeps input, result and context with their hashes, and the register binds them", async () => {
    const frozen = await aFrozenAssessment();
    expect(frozen.inputHash).toBe(sha256Hex(frozen.inputText));
    expect(frozen.resultHash).toBe(sha256Hex(frozen.resultText));
    expect(frozen.contextHash).toBe(sha256Hex(frozen.contextText));
    expect(frozen.result.inputHash).toBe(frozen.inputHash);
    expect(frozen.result.diagnostics.converged).toBe(true);
    expect(frozen.context.measures.find(({ code }) => code === "eve")).toMatchObject({ shortName: "close 20:00", limits: { maxDays: 112, maxDaysWithin: 365 } });
    const entries = await registerOf(`assessment/${frozen.assessmentId}`);
    expect(entries.map(({ action }) => action)).toEqual(["assessment.create", "assessment.freeze"]);
    const entry = JSON.parse(entries.at(-1)?.canonical ?? "{}");
    expect(entry).toMatchObject({ object_hash: objectHashOf(frozen), actor: frozen.ctx.actor.id, reason: frozen.reason });
  });

  test("the command line recomputes the stored result byte for byte from the exported input", async () => {
    const frozen = await aFrozenAssessment();
    const exported = await exportInput(frozen.assessmentId);
    const run = spawnSync("npm", ["run", "--silent", "assess"], { input: exported?.text ?? "", encoding: "utf8", maxBuffer: 1 << 26 });
    expect(run.stderr).toBe("");
    expect(run.status).toBe(0);
    expect(run.stdout).toBe(frozen.resultText);
    expect(run.stdout).toBe((await exportResult(frozen.assessmentId))?.text);
  });

  test("a schedule against structured law is frozen with that mark, not as deliverable", async () => {
    const { context } = await aFrozenAssessment();
    expect(context.packages.map(({ letter, deliverable }) => [letter, deliverable])).toEqual([["A", true], ["B", true], ["C", false]]);
    expect(context.packages[2]?.legalFindings).toEqual([{ measureCode: "g10", kind: "tooLong", days: 70, allowedDays: 56, withinDays: null }]);
  });

  test.each(ROLES.filter((role) => role !== "adviser"))("refuses the role %s", async (role) => {
    const { id } = await anAssessment();
    await expect(freezeAssessment(await asStaff(role), { id, version: 1, reason })).rejects.toMatchObject({ code: "forbidden" });
    expect(await db.select().from(frozenAssessments).where(eq(frozenAssessments.assessmentId, id))).toEqual([]);
  });

  test("refuses visitors", async () => {
    const { ctx, id } = await anAssessment();
    await expect(freezeAssessment({ ...ctx, actor: { kind: "visitor" } }, { id, version: 1, reason })).rejects.toMatchObject({ code: "signedOut" });
  });

  test.each([
    ["not converged", { converged: false }, ["notConverged"]],
    ["whose integrators differ", { converged: false, integratorDifferencePersons: 1, integratorAllowedPersons: 0.412 }, ["integratorsDiffer"]],
    ["whose integrator difference is no number", { integratorDifferencePersons: Number.NaN }, ["integratorsDiffer"]],
  ])("refuses a result %s and leaves nothing behind", async (_, diagnostics, reasons) => {
    const { ctx, id } = await anAssessment();
    const compute = async (input: Parameters<typeof assessOffThread>[0]) => {
      const result = await assessOffThread(input);
      return { ...result, diagnostics: { ...result.diagnostics, ...diagnostics } };
    };
    await expect(freezeAssessment(ctx, { id, version: 1, reason }, compute)).rejects.toMatchObject({ code: "notConverged", detail: { reasons } });
    expect(await db.select().from(frozenAssessments).where(eq(frozenAssessments.assessmentId, id))).toEqual([]);
    expect((await registerOf(`assessment/${id}`)).map(({ action }) => action)).toEqual(["assessment.create"]);
  });

  test("refuses a state that the reader didn't see", async () => {
    const { ctx, id } = await anAssessment();
    await expect(freezeAssessment(ctx, { id, version: 2, reason })).rejects.toMatchObject({ code: "conflict" });
  });

  test("refuses where a measure changed while it was computed", async () => {
    const { ctx, id, outbreakId } = await anAssessment({ packageLetters: ["A"] });
    const [a] = await packagesOf(outbreakId);
    const measureId = a?.items[0]?.measureId ?? "";
    const compute = async (input: Parameters<typeof assessOffThread>[0]) => {
      const result = await assessOffThread(input);
      await db.update(measures).set({ evidence: sql`${measures.evidence} || ' More.'` }).where(eq(measures.id, measureId));
      return result;
    };
    const [before] = await db.select({ evidence: measures.evidence }).from(measures).where(eq(measures.id, measureId));
    await expect(freezeAssessment(ctx, { id, version: 1, reason }, compute)).rejects.toMatchObject({ code: "conflict" });
    await db.update(measures).set(before ?? {}).where(eq(measures.id, measureId));
  });

  test("can't be done twice, and closes the working row", async () => {
    const { ctx, assessmentId: id, inputText } = await aFrozenAssessment();
    await expect(freezeAssessment(ctx, { id, version: 1, reason })).rejects.toMatchObject({ code: "frozen" });
    const edit = { id, version: 1, title: "Another", packageLetters: ["A"], draws: 200, seed: 1, horizonDays: 365, dayZero: "2027-03-01", packages: [] };
    await expect(updateAssessment(ctx, edit)).rejects.toMatchObject({ code: "frozen" });
    await expect(db.update(assessments).set({ title: "Another" }).where(eq(assessments.id, id))).rejects.toMatchObject({ cause: { code: "42501" } });
    expect((await getFrozen(id)).inputText).toBe(inputText);
  });
});

describe("frozen rows", () => {
  const owner = postgres(process.env["DATABASE_OWNER_URL"] ?? "", { max: 1, onnotice: () => {} });
  afterAll(() => owner.end());

  test.each([
    ["the web process", () => db],
    ["the owner of the schema", () => drizzle(owner)],
  ])("refuse change and removal by %s", async (_, connection) => {
    const { assessmentId: id, inputText } = await aFrozenAssessment({ packageLetters: ["A"] });
    const by = connection();
    await expect(by.update(frozenAssessments).set({ reason: "another reason" }).where(eq(frozenAssessments.assessmentId, id))).rejects.toMatchObject({ cause: { code: "42501" } });
    await expect(by.delete(frozenAssessments).where(eq(frozenAssessments.assessmentId, id))).rejects.toMatchObject({ cause: { code: "42501" } });
    await expect(by.execute(sql`truncate frozen_assessments cascade`)).rejects.toMatchObject({ cause: { code: "42501" } });
    expect((await getFrozen(id)).inputText).toBe(inputText);
  });
});
