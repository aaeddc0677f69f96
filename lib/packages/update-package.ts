import { and, eq, sql } from "drizzle-orm";
import type { z } from "zod";
import { outbreaks, packages } from "@/db/schema";
import { audit } from "@/lib/audit/audit";
import { requirePermission } from "@/lib/auth/require-permission";
import { inTransaction, type StaffCtx } from "@/lib/context";
import { DomainError } from "@/lib/errors";
import { dayOf } from "./days";
import { UpdatePackageInput } from "./schema";

/** Percent to share, without the digits that dividing a decimal leaves behind. */
const share = (percent: number) => Number((percent / 100).toPrecision(15));

/**
 * Saves a schedule. Dates on screen name the last day in force; the row holds the first day that is not.
 * @throws DomainError "conflict"; "invalid" where a measure would start before day 0
 */
export async function updatePackage(ctx: StaffCtx, raw: z.input<typeof UpdatePackageInput>): Promise<void> {
  requirePermission(ctx.actor, "package:write");
  const { id, version, name, lines } = UpdatePackageInput.parse(raw);
  await inTransaction(ctx, async (tx) => {
    const [held] = await tx
      .select({ dayZero: outbreaks.dayZero })
      .from(packages)
      .innerJoin(outbreaks, eq(outbreaks.id, packages.outbreakId))
      .where(eq(packages.id, id));
    if (!held) throw new DomainError("notFound", { packageId: id });
    const items = (lines ?? []).flatMap((line) =>
      line === null
        ? []
        : [{ measureId: line.measureId, uptake: share(line.uptakePercent), startDay: dayOf(held.dayZero, line.from), endDay: line.until === null ? null : dayOf(held.dayZero, line.until) + 1 }],
    );
    if (items.some(({ startDay }) => startDay < 0)) throw new DomainError("invalid", { reasons: ["beforeDayZero"] });
    const [row] = await tx
      .update(packages)
      .set({ name, items, version: sql`${packages.version} + 1`, updatedAt: ctx.now })
      .where(and(eq(packages.id, id), eq(packages.version, version)))
      .returning({ version: packages.version });
    if (!row) throw new DomainError("conflict", { packageId: id });
    await audit(tx, ctx, { action: "package.update", subject: `package/${id}`, facts: { version: row.version, measures: items.length } });
  });
}
