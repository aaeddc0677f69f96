import { and, eq, ne, sql } from "drizzle-orm";
import type { z } from "zod";
import { measures } from "@/db/schema";
import { audit } from "@/lib/audit/audit";
import { requirePermission } from "@/lib/auth/require-permission";
import { inTransaction, type StaffCtx, type Tx } from "@/lib/context";
import { DomainError } from "@/lib/errors";
import { ArchiveMeasureInput, CreateMeasureInput, UpdateMeasureInput } from "./schema";

type Facts = Omit<z.output<typeof UpdateMeasureInput>, "id" | "version">;

/** Percent to share, without the digits that dividing a decimal leaves behind. */
const share = (percent: number) => Number((percent / 100).toPrecision(15));

function valuesOf({ cutPercent, ...facts }: Facts) {
  const { low, central, high, source } = cutPercent;
  return { ...facts, cut: { low: share(low), central: share(central), high: share(high), ...(source ? { source } : {}) } };
}

async function refuseTakenCode(tx: Tx, code: string, id: string | null): Promise<void> {
  const [taken] = await tx
    .select({ id: measures.id })
    .from(measures)
    .where(id ? and(eq(measures.code, code), ne(measures.id, id)) : eq(measures.code, code));
  if (taken) throw new DomainError("invalid", { reasons: ["codeTaken"] });
}

/** @throws DomainError "invalid" where another measure has the code */
export async function createMeasure(ctx: StaffCtx, raw: z.input<typeof CreateMeasureInput>): Promise<{ id: string }> {
  requirePermission(ctx.actor, "measure:write");
  const facts = CreateMeasureInput.parse(raw);
  return inTransaction(ctx, async (tx) => {
    await refuseTakenCode(tx, facts.code, null);
    const [row] = await tx
      .insert(measures)
      .values({ ...valuesOf(facts), createdBy: ctx.actor.id })
      .returning({ id: measures.id });
    if (!row) throw new Error("no measure was written");
    await audit(tx, ctx, { action: "measure.create", subject: `measure/${row.id}`, facts: { code: facts.code } });
    return row;
  });
}

/** @throws DomainError "conflict" where somebody saved in between */
export async function updateMeasure(ctx: StaffCtx, raw: z.input<typeof UpdateMeasureInput>): Promise<void> {
  requirePermission(ctx.actor, "measure:write");
  const { id, version, ...facts } = UpdateMeasureInput.parse(raw);
  await inTransaction(ctx, async (tx) => {
    await refuseTakenCode(tx, facts.code, id);
    const [row] = await tx
      .update(measures)
      .set({ ...valuesOf(facts), version: sql`${measures.version} + 1`, updatedAt: ctx.now })
      .where(and(eq(measures.id, id), eq(measures.version, version)))
      .returning({ version: measures.version });
    if (!row) throw new DomainError("conflict", { measureId: id });
    await audit(tx, ctx, { action: "measure.update", subject: `measure/${id}`, facts: { version: row.version } });
  });
}

/** Takes a measure out of the catalogue, or back in. Packages and frozen assessments that hold it keep it. */
export async function archiveMeasure(ctx: StaffCtx, raw: z.input<typeof ArchiveMeasureInput>): Promise<void> {
  requirePermission(ctx.actor, "measure:write");
  const { id, archived } = ArchiveMeasureInput.parse(raw);
  await inTransaction(ctx, async (tx) => {
    const [row] = await tx
      .update(measures)
      .set({ archived: archived === "yes", version: sql`${measures.version} + 1`, updatedAt: ctx.now })
      .where(eq(measures.id, id))
      .returning({ id: measures.id });
    if (!row) throw new DomainError("notFound", { measureId: id });
    await audit(tx, ctx, { action: "measure.update", subject: `measure/${id}`, facts: { archived } });
  });
}
