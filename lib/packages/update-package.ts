import { and, eq, inArray, sql } from "drizzle-orm";
import type { z } from "zod";
import { measures, outbreaks, packages } from "@/db/schema";
import { audit } from "@/lib/audit/audit";
import { requirePermission } from "@/lib/auth/require-permission";
import { inTransaction, type StaffCtx } from "@/lib/context";
import { DomainError } from "@/lib/errors";
import { dayOf } from "./days";
import { UpdatePackageInput } from "./schema";

type Line = NonNullable<NonNullable<z.output<typeof UpdatePackageInput>["lines"]>[number]>;

/** Percent to share, without the digits that dividing a decimal leaves behind. */
const share = (percent: number) => Number((percent / 100).toPrecision(15));

/** Dates on screen name the last day in force; the row holds the first day that is not. */
const itemOf = ({ measureId, uptakePercent: typed, from, until }: Line, dayZero: string) => ({
  measureId,
  uptake: typeof typed === "number" ? share(typed) : { low: share(typed.low), central: share(typed.central), high: share(typed.high) },
  startDay: dayOf(dayZero, from),
  endDay: until === null ? null : dayOf(dayZero, until) + 1,
});

/**
 * Saves name and schedule. A schedule that the calculation would refuse is kept too: the checks name what is wrong.
 * @throws DomainError "notFound"; "conflict" where somebody saved in between or moved day 0; "invalid" where a measure
 * isn't in the catalogue
 */
export async function updatePackage(ctx: StaffCtx, raw: z.input<typeof UpdatePackageInput>): Promise<void> {
  requirePermission(ctx.actor, "package:write");
  const { id, version, name, dayZero, lines } = UpdatePackageInput.parse(raw);
  const items = (lines ?? []).flatMap((line) => (line === null ? [] : [itemOf(line, dayZero)]));
  await inTransaction(ctx, async (tx) => {
    const [held] = await tx.select({ dayZero: outbreaks.dayZero }).from(packages).innerJoin(outbreaks, eq(outbreaks.id, packages.outbreakId)).where(eq(packages.id, id));
    if (!held) throw new DomainError("notFound", { packageId: id });
    if (held.dayZero !== dayZero) throw new DomainError("conflict", { packageId: id });
    const named = [...new Set(items.map(({ measureId }) => measureId))];
    const known = named.length ? await tx.select({ id: measures.id }).from(measures).where(inArray(measures.id, named)) : [];
    if (known.length < named.length) throw new DomainError("invalid", { reasons: ["unknownMeasure"] });
    const [row] = await tx
      .update(packages)
      .set({ name, items, version: sql`${packages.version} + 1`, updatedAt: ctx.now })
      .where(and(eq(packages.id, id), eq(packages.version, version)))
      .returning({ version: packages.version });
    if (!row) throw new DomainError("conflict", { packageId: id });
    await audit(tx, ctx, { action: "package.update", subject: `package/${id}`, facts: { version: row.version, measures: items.length } });
  });
}
