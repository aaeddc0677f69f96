import { and, eq, sql } from "drizzle-orm";
import type { z } from "zod";
import { outbreaks } from "@/db/schema";
import { audit } from "@/lib/audit/audit";
import { requirePermission } from "@/lib/auth/require-permission";
import { inTransaction, type StaffCtx } from "@/lib/context";
import { DomainError } from "@/lib/errors";
import type { OutbreakProfile } from "./profile";
import { SaveProfileInput, UpdateOutbreakInput } from "./schema";

/** Names, population, money, dates and languages. @throws DomainError "conflict" where somebody saved in between */
export async function updateOutbreak(ctx: StaffCtx, raw: z.input<typeof UpdateOutbreakInput>): Promise<void> {
  requirePermission(ctx.actor, "outbreak:write");
  const { id, version, ...facts } = UpdateOutbreakInput.parse(raw);
  await write(ctx, id, version, facts, "facts");
}

/** What is known on day 0. @throws DomainError "conflict" where somebody saved in between */
export async function saveProfile(ctx: StaffCtx, raw: z.input<typeof SaveProfileInput>): Promise<void> {
  requirePermission(ctx.actor, "outbreak:write");
  const { id, version, ...typed } = SaveProfileInput.parse(raw);
  const { low, central, high, source } = typed.infectionFatalityPercent;
  const profile: OutbreakProfile = {
    ...(typed.exposed ? { exposed: typed.exposed } : {}),
    infectious: typed.infectious,
    removed: typed.removed,
    transmission: typed.transmission,
    infectiousPeriodDays: typed.infectiousPeriodDays,
    latentPeriodDays: typed.latentPeriodDays,
    infectionFatality: { low: share(low), central: share(central), high: share(high), ...(source ? { source } : {}) },
  };
  await write(ctx, id, version, { profile }, "profile");
}

/** Percent to share, without the digits that dividing a decimal leaves behind: 0.6 % is 0.006. */
const share = (percent: number) => Number((percent / 100).toPrecision(15));

async function write(ctx: StaffCtx, id: string, version: number, values: Partial<typeof outbreaks.$inferInsert>, part: string): Promise<void> {
  await inTransaction(ctx, async (tx) => {
    const [row] = await tx
      .update(outbreaks)
      .set({ ...values, version: sql`${outbreaks.version} + 1`, updatedAt: ctx.now })
      .where(and(eq(outbreaks.id, id), eq(outbreaks.version, version)))
      .returning({ version: outbreaks.version });
    if (!row) {
      const [there] = await tx.select({ id: outbreaks.id }).from(outbreaks).where(eq(outbreaks.id, id));
      throw new DomainError(there ? "conflict" : "notFound", { outbreakId: id });
    }
    await audit(tx, ctx, { action: "outbreak.update", subject: `outbreak/${id}`, facts: { part, version: row.version } });
  });
}
