import { eq, sql } from "drizzle-orm";
import { afterAll, describe, expect, test } from "vitest";
import { closeDb, db } from "@/db/client";
import { measures } from "@/db/schema";
import { can, ROLES } from "@/lib/auth/permissions";
import { archiveMeasure } from "@/lib/measures/archive-measure";
import { createMeasure } from "@/lib/measures/create-measure";
import { getMeasure, listMeasures } from "@/lib/measures/queries";
import { updateMeasure } from "@/lib/measures/update-measure";
import { asStaff } from "../fixtures/assessments";
import { aMeasure, typedMeasure } from "../fixtures/measures";

afterAll(closeDb);
const registerOf = async (id: string) =>
  (await db.execute<{ canonical: string }>(sql`select canonical from audit.entry where subject = ${`measure/${id}`} order by seq`)).map(({ canonical }) => JSON.parse(canonical));
const refused = (code: string, reasons?: string[]) => ({ name: "DomainError", code, ...(reasons ? { detail: { reasons } } : {}) });

describe("createMeasure", () => {
  test("keeps what was typed: shares of β, plain and ranged costs, transfers apart", async () => {
    const { ctx, row } = await aMeasure({ cutPercent: { low: "-1.5", central: "14.1", high: "29", source: "Invented: five studies" }, transfers: { public: { perDay: { low: "", central: "900", high: "" } } } });
    expect(row).toMatchObject({
      cut: { low: -0.015, central: 0.141, high: 0.29, source: "Invented: five studies" },
      costs: [{ payer: "public", setUp: 90_000, perDay: { low: 40_000, central: 43_500, high: 50_000 } }, { payer: "public", perDay: 900, transfer: true }],
      ladder: null, maxDays: 112, maxDaysWithin: 365, daysUsed: null, reviewEveryDays: 28, leadTimeDays: 4, archived: false, version: 1, createdBy: ctx.actor.id,
    });
    expect(await registerOf(row.id)).toMatchObject([{ action: "measure.create", actor: ctx.actor.id, facts: { code: row.code } }]);
  });

  test("refuses a code that is taken, also where two ask for it at once", async () => {
    const { ctx, row } = await aMeasure();
    await expect(createMeasure(ctx, typedMeasure({ code: row.code }))).rejects.toMatchObject(refused("invalid", ["codeTaken"]));
    const typed = typedMeasure();
    const both = await Promise.allSettled([createMeasure(ctx, typed), createMeasure(ctx, typed)]);
    expect(both.map(({ status }) => status).sort()).toEqual(["fulfilled", "rejected"]);
    expect(both.find((each) => each.status === "rejected")).toMatchObject({ reason: refused("invalid", ["codeTaken"]) });
  });

  test.each(ROLES.filter((role) => !can(role, "measure:write")))("refuses the role %s before it reads the form", async (role) => {
    const ctx = await asStaff(role);
    await expect(createMeasure(ctx, {} as never)).rejects.toMatchObject(refused("forbidden"));
  });

  test.each(ROLES.filter((role) => can(role, "measure:write")))("lets the role %s write", async (role) => {
    const ctx = await asStaff(role);
    expect((await aMeasure({}, ctx)).row.createdBy).toBe(ctx.actor.id);
  });
});

describe("updateMeasure", () => {
  const edit = (row: { id: string; code: string }, over: Record<string, unknown> = {}) => ({ ...typedMeasure({ code: row.code, ...over }), id: row.id, version: 1 });

  test("changes the row and says in the register what changed", async () => {
    const { ctx, row } = await aMeasure();
    await updateMeasure(ctx, edit(row, { maxDays: "56", ladder: "venues" }));
    expect(await getMeasure(row.id)).toMatchObject({ maxDays: 56, ladder: "venues", version: 2 });
    expect((await registerOf(row.id)).at(-1)).toMatchObject({ action: "measure.update", facts: { version: 2 } });
    expect((await registerOf(row.id)).at(-1).facts.changed.split(",").sort()).toEqual(["ladder", "maxDays"]);
  });

  test("refuses where somebody saved in between, and leaves their version", async () => {
    const { ctx, row } = await aMeasure();
    await updateMeasure(ctx, edit(row, { name: "First" }));
    await expect(updateMeasure(await asStaff("administrator"), edit(row, { name: "Second" }))).rejects.toMatchObject(refused("conflict"));
    expect(await getMeasure(row.id)).toMatchObject({ name: "First", version: 2 });
    expect(await registerOf(row.id)).toHaveLength(2);
  });

  test("refuses another measure's code, keeps its own, and knows what isn't there", async () => {
    const [{ ctx, row }, { row: other }] = [await aMeasure(), await aMeasure()];
    await expect(updateMeasure(ctx, edit({ id: row.id, code: other.code }))).rejects.toMatchObject(refused("invalid", ["codeTaken"]));
    await expect(updateMeasure(ctx, edit(row))).resolves.toBeUndefined();
    await expect(updateMeasure(ctx, edit({ id: crypto.randomUUID(), code: "none" }))).rejects.toMatchObject(refused("notFound"));
  });

  test("refuses a reader", async () => {
    const { row } = await aMeasure();
    await expect(updateMeasure(await asStaff("legal"), edit(row))).rejects.toMatchObject(refused("forbidden"));
  });
});

describe("archiveMeasure", () => {
  test("takes a measure out of the catalogue and puts it back, both in the register", async () => {
    const { ctx, row } = await aMeasure();
    const listed = async () => [(await listMeasures()).some(({ id }) => id === row.id), (await listMeasures({ archived: true })).some(({ id }) => id === row.id)];
    expect(await listed()).toEqual([true, false]);
    await archiveMeasure(ctx, { id: row.id, archived: "yes" });
    expect(await listed()).toEqual([false, true]);
    expect(await getMeasure(row.id)).toMatchObject({ archived: true });
    await archiveMeasure(ctx, { id: row.id, archived: "no" });
    expect(await listed()).toEqual([true, false]);
    expect((await registerOf(row.id)).map(({ facts }) => facts.archived)).toEqual([undefined, "yes", "no"]);
  });
  test("refuses a reader and what isn't there", async () => {
    const { ctx, row } = await aMeasure();
    await expect(archiveMeasure(await asStaff("communications"), { id: row.id, archived: "yes" })).rejects.toMatchObject(refused("forbidden"));
    await expect(archiveMeasure(ctx, { id: crypto.randomUUID(), archived: "yes" })).rejects.toMatchObject(refused("notFound"));
  });
});

describe("the catalogue", () => {
  test("keeps a ladder together, weakest rung first", async () => {
    const ladder = `ladder-${crypto.randomUUID()}`;
    const [strong] = [await aMeasure({ ladder, cutPercent: { low: "20", central: "30", high: "40" } }), await aMeasure(), await aMeasure({ ladder, cutPercent: { low: "1", central: "9", high: "14" } })];
    const all = await listMeasures();
    const rungs = all.flatMap((row, index) => (row.ladder === ladder ? [[index, row.cut.central] as const] : []));
    expect(rungs.map(([, central]) => central)).toEqual([0.09, 0.3]);
    expect((rungs[1]?.[0] ?? 0) - (rungs[0]?.[0] ?? 0)).toBe(1);
    expect(all.some(({ id }) => id === strong.row.id)).toBe(true);
  });
  test.each(["", "x", "0b8f6d0e-1111-4222-8333-44445555666g", crypto.randomUUID()])("knows no measure %s", async (id) => {
    await expect(getMeasure(id)).rejects.toMatchObject(refused("notFound"));
  });
  test("the database keeps codes apart by itself", async () => {
    const { ctx, row } = await aMeasure();
    const { id: _, ...again } = row;
    await expect(db.insert(measures).values({ ...again, createdBy: ctx.actor.id })).rejects.toMatchObject({ cause: { code: "23505" } });
    expect(await db.select({ id: measures.id }).from(measures).where(eq(measures.code, row.code))).toEqual([{ id: row.id }]);
  });
});
