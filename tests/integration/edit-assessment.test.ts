import { eq, sql } from "drizzle-orm";
import { afterAll, describe, expect, test } from "vitest";
import { closeDb, db } from "@/db/client";
import { outbreaks, packages } from "@/db/schema";
import { createAssessment } from "@/lib/assessments/create-assessment";
import { exportInput } from "@/lib/assessments/export-files";
import { freezeAssessment } from "@/lib/assessments/freeze-assessment";
import { prepareEdit } from "@/lib/assessments/prepare-edit";
import { getAssessment, getFrozen, listAssessments, listFrozen } from "@/lib/assessments/queries";
import { updateAssessment } from "@/lib/assessments/update-assessment";
import { canonicalJson, sha256Hex } from "@/lib/canonical-json";
import { closeCompute } from "@/lib/compute/assess-off-thread";
import { dateOf } from "@/lib/packages/days";
import { aFrozenAssessment, anAssessment, anOutbreakWithPackages, asStaff, packagesOf } from "../fixtures/assessments";

afterAll(async () => {
  await closeCompute();
  await closeDb();
});
const ROLES_WITHOUT = ["communications", "legal", "administrator"] as const;
const settings = { title: "Two packages", packageLetters: ["A", "B"], draws: 200, seed: 7, horizonDays: 365 };
const actions = async (subject: string) => (await db.execute<{ action: string }>(sql`select action from audit.entry where subject = ${subject} order by seq`)).map(({ action }) => action);

/** The edit form as it stands for a stored assessment. */
async function asTyped(id: string) {
  const { row, outbreak, packages: all } = await getAssessment(id);
  return {
    id, version: row.version, title: row.title, packageLetters: row.packageLetters, draws: row.draws, seed: row.seed, horizonDays: row.horizonDays, dayZero: outbreak.dayZero,
    packages: all.map(({ letter, version, items }) => ({
      letter, version, shiftDays: 0,
      items: items.map(({ measureId, uptake, startDay, endDay }) => ({
        measureId, ...(typeof uptake === "number" ? { uptakePercent: Number((uptake * 100).toFixed(6)) } : {}),
        from: dateOf(outbreak.dayZero, startDay), to: endDay === null ? "" : dateOf(outbreak.dayZero, endDay - 1),
      })),
    })),
  };
}

describe("createAssessment", () => {
  test("numbers assessments one after the other, also when two are opened at once", async () => {
    const { ctx, outbreakId } = await anOutbreakWithPackages();
    const made = await Promise.all(Array.from({ length: 4 }, () => createAssessment(ctx, { outbreakId, ...settings })));
    expect(new Set(made.map(({ number }) => number)).size).toBe(4);
    expect(await actions(`assessment/${made[0]?.id}`)).toEqual(["assessment.create"]);
    expect((await listAssessments(outbreakId)).map(({ number }) => number)).toEqual(made.map(({ number }) => number).sort((a, b) => b - a));
  });
  test.each(ROLES_WITHOUT)("refuses the role %s", async (role) => {
    const { outbreakId } = await anOutbreakWithPackages();
    await expect(createAssessment(await asStaff(role), { outbreakId, ...settings })).rejects.toMatchObject({ code: "forbidden" });
  });
  test("refuses a package that doesn't exist, an outbreak that doesn't, and one that isn't described", async () => {
    const { ctx, outbreakId } = await anOutbreakWithPackages();
    await expect(createAssessment(ctx, { outbreakId, ...settings, packageLetters: ["A", "H"] })).rejects.toMatchObject({ code: "conflict" });
    await expect(createAssessment(ctx, { outbreakId: crypto.randomUUID(), ...settings })).rejects.toMatchObject({ code: "notFound" });
    await db.update(outbreaks).set({ profile: null }).where(eq(outbreaks.id, outbreakId));
    await expect(createAssessment(ctx, { outbreakId, ...settings })).rejects.toMatchObject({ code: "notReady", detail: { reasons: ["profileMissing"] } });
  });
});

describe("updateAssessment", () => {
  test("an untouched form changes no package and no input", async () => {
    const { ctx, id, outbreakId } = await anAssessment();
    const before = [await packagesOf(outbreakId), (await exportInput(id))?.text];
    await updateAssessment(ctx, await asTyped(id));
    expect([await packagesOf(outbreakId), (await exportInput(id))?.text]).toEqual(before);
    expect((await getAssessment(id)).row.version).toBe(2);
  });

  test("stores uptake and dates in the package, with both in the register, and what was previewed is what is stored", async () => {
    const { ctx, id, outbreakId } = await anAssessment();
    const typed = await asTyped(id);
    const first = typed.packages[0];
    if (!first) throw new Error("package A is missing");
    first.shiftDays = 7;
    Object.assign(first.items[0] ?? {}, { uptakePercent: 55, to: "2027-05-01" });
    const previewed = canonicalJson((await prepareEdit(ctx, typed)).input);
    expect((await packagesOf(outbreakId))[0]?.version).toBe(1);
    await updateAssessment(ctx, { ...typed, draws: 300 });
    const [a, b] = await packagesOf(outbreakId);
    expect(a).toMatchObject({ version: 2 });
    expect(a?.items[0]).toMatchObject({ uptake: 0.55, startDay: 14, endDay: 69 });
    expect(b?.version).toBe(1);
    expect((await exportInput(id))?.text).toBe(previewed.replace('"draws":200', '"draws":300'));
    expect(await actions(`package/${a?.id}`)).toEqual(["package.update"]);
    expect(await actions(`assessment/${id}`)).toEqual(["assessment.create", "assessment.update"]);
  });

  test("two people saving: the second is told, and nothing of it is stored", async () => {
    const { ctx, id, outbreakId } = await anAssessment();
    const theirs = await asTyped(id);
    const mine = await asTyped(id);
    await updateAssessment(ctx, { ...theirs, title: "Theirs" });
    const changed = structuredClone(mine);
    Object.assign(changed.packages[0]?.items[0] ?? {}, { uptakePercent: 1 });
    await expect(updateAssessment(ctx, { ...changed, title: "Mine" })).rejects.toMatchObject({ code: "conflict" });
    expect((await getAssessment(id)).row.title).toBe("Theirs");
    expect((await packagesOf(outbreakId))[0]?.items[0]?.uptake).toBe(0.7);
  });

  test("a package saved by somebody else meanwhile is a conflict", async () => {
    const { ctx, id, outbreakId } = await anAssessment();
    const typed = await asTyped(id);
    await db.update(packages).set({ version: 2 }).where(eq(packages.id, (await packagesOf(outbreakId))[0]?.id ?? ""));
    await expect(updateAssessment(ctx, typed)).rejects.toMatchObject({ code: "conflict" });
    await expect(prepareEdit(ctx, typed)).rejects.toMatchObject({ code: "conflict" });
  });

  test.each(ROLES_WITHOUT)("refuses the role %s, to save and to preview", async (role) => {
    const { id } = await anAssessment();
    const typed = await asTyped(id);
    const other = await asStaff(role);
    await expect(updateAssessment(other, typed)).rejects.toMatchObject({ code: "forbidden" });
    await expect(prepareEdit(other, typed)).rejects.toMatchObject({ code: "forbidden" });
  });
});

describe("what others read", () => {
  test("a changed outbreak, measure or package leaves a frozen assessment as it was", async () => {
    const frozen = await aFrozenAssessment({ packageLetters: ["A"] });
    await db.update(outbreaks).set({ name: "Another fever" }).where(eq(outbreaks.id, frozen.outbreakId));
    await db.delete(packages).where(eq(packages.outbreakId, frozen.outbreakId));
    const after = await getFrozen(frozen.assessmentId);
    expect(after.context.outbreak.name).toBe("Sedge fever");
    expect([after.inputText, after.resultText, after.contextText].map(sha256Hex)).toEqual([frozen.inputHash, frozen.resultHash, frozen.contextHash]);
  });
  test("only frozen ones are listed as such", async () => {
    const { ctx, id, outbreakId } = await anAssessment({ packageLetters: ["A"] });
    expect(await listFrozen(outbreakId)).toEqual([]);
    await expect(getFrozen(id)).rejects.toMatchObject({ code: "notFound" });
    await freezeAssessment(ctx, { id, version: 1, reason: "Listed from now on." });
    expect((await listFrozen(outbreakId)).map((each) => each.id)).toEqual([id]);
  });
  test("an address that is no id isn't found, rather than an error", async () => {
    await expect(getAssessment("not-an-id")).rejects.toMatchObject({ code: "notFound" });
    expect(await listAssessments("not-an-id")).toEqual([]);
    expect(await exportInput("not-an-id")).toBeNull();
  });
});
