import { eq, sql } from "drizzle-orm";
import { afterAll, describe, expect, test } from "vitest";
import { closeDb, db } from "@/db/client";
import { outbreaks } from "@/db/schema";
import { createAssessment } from "@/lib/assessments/create-assessment";
import { freezeAssessment } from "@/lib/assessments/freeze-assessment";
import { can, ROLES } from "@/lib/auth/permissions";
import { closeCompute } from "@/lib/compute/assess-off-thread";
import { createPackage } from "@/lib/packages/create-package";
import { deletePackage } from "@/lib/packages/delete-package";
import { getPackage, listPackages } from "@/lib/packages/queries";
import { LETTERS } from "@/lib/packages/schema";
import { updatePackage } from "@/lib/packages/update-package";
import { anAssessment, anOutbreakWithPackages, asStaff } from "../fixtures/assessments";
import { aMeasure } from "../fixtures/measures";
import { anEmptyOutbreak, aPackage, packageRow, typedSchedule } from "../fixtures/packages";

afterAll(async () => {
  await closeCompute();
  await closeDb();
});
const registerOf = async (id: string) =>
  (await db.execute<{ canonical: string }>(sql`select canonical from audit.entry where subject = ${`package/${id}`} order by seq`)).map(({ canonical }) => JSON.parse(canonical));
const refused = (code: string, detail?: Record<string, unknown>) => ({ name: "DomainError", code, ...(detail ? { detail } : {}) });

describe("createPackage", () => {
  test("gives the first free letter, up to eight", async () => {
    const { ctx, outbreakId } = await anEmptyOutbreak();
    const made = [];
    for (const letter of LETTERS) made.push(await createPackage(ctx, { outbreakId, name: `Package ${letter}` }));
    expect(made.map(({ letter }) => letter)).toEqual([...LETTERS]);
    await expect(createPackage(ctx, { outbreakId, name: "One more" })).rejects.toMatchObject(refused("notReady", { reasons: ["eightPackages"] }));
    await deletePackage(ctx, { id: made[2]?.id ?? "", confirmed: "yes" });
    expect(await createPackage(ctx, { outbreakId, name: "In its place" })).toMatchObject({ letter: "C" });
    expect((await listPackages(outbreakId)).map(({ letter, name }) => `${letter} ${name}`)).toEqual(LETTERS.map((letter) => `${letter} ${letter === "C" ? "In its place" : `Package ${letter}`}`));
  });

  test("gives two who ask at once two letters", async () => {
    const { ctx, outbreakId } = await anEmptyOutbreak();
    const made = await Promise.all([1, 2, 3, 4].map((n) => createPackage(ctx, { outbreakId, name: `Package ${n}` })));
    expect(made.map(({ letter }) => letter).sort()).toEqual(["A", "B", "C", "D"]);
  });

  test("copies the schedule of a package of the same outbreak, and of no other", async () => {
    const { ctx, outbreakId } = await anOutbreakWithPackages();
    const [, b] = await listPackages(outbreakId);
    const copy = await createPackage(ctx, { outbreakId, name: "Copy of Evening closure", copyOf: b?.id });
    expect(copy.letter).toBe("D");
    expect((await getPackage(copy.id)).items).toEqual(b?.items);
    expect(await registerOf(copy.id)).toMatchObject([{ action: "package.create", facts: { letter: "D", copyOf: "B" } }]);
    const other = await anEmptyOutbreak();
    await expect(createPackage(ctx, { outbreakId: other.outbreakId, name: "Copy", copyOf: b?.id })).rejects.toMatchObject(refused("notFound"));
    expect(await listPackages(other.outbreakId)).toEqual([]);
  });

  test("knows no package for an outbreak that isn't there", async () => {
    await expect(createPackage(await asStaff("adviser"), { outbreakId: crypto.randomUUID(), name: "Light" })).rejects.toMatchObject(refused("notFound"));
  });
});

describe("updatePackage", () => {
  test("keeps dates as days from day 0: the last day on screen is still in force", async () => {
    const [{ ctx, id }, { row: measure }, { row: other }] = [await aPackage(), await aMeasure(), await aMeasure()];
    await updatePackage(ctx, typedSchedule(id, [{ measureId: measure.id }, { measureId: other.id, included: "" }, { measureId: other.id, never: "on", from: "2027-03-01", uptakePercent: { low: "60", central: "70", high: "81.7" } }], { name: "Firm" }));
    expect(await packageRow(id)).toMatchObject({
      name: "Firm",
      version: 2,
      items: [
        { measureId: measure.id, uptake: 0.95, startDay: 7, endDay: 77 },
        { measureId: other.id, uptake: { low: 0.6, central: 0.7, high: 0.817 }, startDay: 0, endDay: null },
      ],
    });
    expect((await registerOf(id)).at(-1)).toMatchObject({ action: "package.update", actor: ctx.actor.id, facts: { version: 2, measures: 2 } });
  });

  test("keeps a schedule that the calculation would refuse, for the checks to name", async () => {
    const [{ ctx, id }, { row: measure }] = [await aPackage(), await aMeasure()];
    await updatePackage(ctx, typedSchedule(id, [{ measureId: measure.id }, { measureId: measure.id }]));
    expect((await packageRow(id))?.items).toHaveLength(2);
  });

  test("refuses where somebody saved in between or moved day 0, and leaves what they saved", async () => {
    const [{ ctx, id, outbreakId }, { row: measure }] = [await aPackage(), await aMeasure()];
    await updatePackage(ctx, typedSchedule(id, [{ measureId: measure.id }]));
    await expect(updatePackage(ctx, typedSchedule(id, []))).rejects.toMatchObject(refused("conflict"));
    await db.update(outbreaks).set({ dayZero: "2027-03-02" }).where(eq(outbreaks.id, outbreakId));
    await expect(updatePackage(ctx, typedSchedule(id, [], { version: 2 }))).rejects.toMatchObject(refused("conflict"));
    expect(await packageRow(id)).toMatchObject({ version: 2, items: [{ measureId: measure.id }] });
    expect(await registerOf(id)).toHaveLength(2);
  });

  test("refuses a measure that the catalogue doesn't have, and a package that isn't there", async () => {
    const { ctx, id } = await aPackage();
    await expect(updatePackage(ctx, typedSchedule(id, [{ measureId: crypto.randomUUID() }]))).rejects.toMatchObject(refused("invalid", { reasons: ["unknownMeasure"] }));
    await expect(updatePackage(ctx, typedSchedule(crypto.randomUUID(), []))).rejects.toMatchObject(refused("notFound"));
    expect(await packageRow(id)).toMatchObject({ version: 1, items: [] });
  });
});

describe("deletePackage", () => {
  test("refuses while an assessment in work compares it, saying which", async () => {
    const { ctx, outbreakId, number } = await anAssessment({ packageLetters: ["A", "B"] });
    const [a, , c] = await listPackages(outbreakId);
    await expect(deletePackage(ctx, { id: a?.id ?? "", confirmed: "yes" })).rejects.toMatchObject(refused("notReady", { reasons: ["packageInAssessment"], numbers: String(number), count: 1 }));
    const second = await createAssessment(ctx, { outbreakId, title: "Again", packageLetters: ["A"], draws: 200, seed: 1, horizonDays: 365 });
    await expect(deletePackage(ctx, { id: a?.id ?? "", confirmed: "yes" })).rejects.toMatchObject({ detail: { numbers: `${number}, ${second.number}`, count: 2 } });
    expect(await packageRow(a?.id ?? "")).toBeDefined();
    // No assessment compares C.
    expect(await deletePackage(ctx, { id: c?.id ?? "", confirmed: "yes" })).toEqual({ outbreakId });
    expect(await packageRow(c?.id ?? "")).toBeUndefined();
    expect((await registerOf(c?.id ?? "")).at(-1)).toMatchObject({ action: "package.delete", actor: ctx.actor.id, facts: { letter: "C" } });
  });

  test("lets a package go that only a frozen assessment holds", async () => {
    const { ctx, outbreakId, id } = await anAssessment({ packageLetters: ["A"] });
    await freezeAssessment(ctx, { id, version: 1, reason: "Frozen for the briefing of this week." });
    const [a] = await listPackages(outbreakId);
    expect(await deletePackage(ctx, { id: a?.id ?? "", confirmed: "yes" })).toEqual({ outbreakId });
  });

  test("wants the tick, and knows what isn't there", async () => {
    const { ctx, id } = await aPackage();
    await expect(deletePackage(ctx, { id } as never)).rejects.toThrow(/Tick the box/);
    await expect(deletePackage(ctx, { id: crypto.randomUUID(), confirmed: "yes" })).rejects.toMatchObject(refused("notFound"));
    expect(await packageRow(id)).toBeDefined();
  });
});

describe.each(ROLES.filter((role) => !can(role, "package:write")))("the role %s", (role) => {
  test("neither creates, changes nor deletes packages", async () => {
    const { id, outbreakId } = await aPackage();
    const ctx = await asStaff(role);
    for (const act of [createPackage(ctx, { outbreakId, name: "Light" }), updatePackage(ctx, typedSchedule(id, [])), deletePackage(ctx, { id, confirmed: "yes" })]) {
      await expect(act).rejects.toMatchObject(refused("forbidden"));
    }
    expect(await packageRow(id)).toMatchObject({ version: 1 });
  });
});
