import { and, eq, sql } from "drizzle-orm";
import { assessments, packages } from "@/db/schema";
import { audit } from "@/lib/audit/audit";
import { requirePermission } from "@/lib/auth/require-permission";
import { canonicalJson } from "@/lib/canonical-json";
import { type Ctx, inTransaction, type Tx } from "@/lib/context";
import { DomainError } from "@/lib/errors";
import { applyEdit } from "./apply-edit";
import { findFrozen, getAssessment } from "./queries";
import { EditAssessmentInput } from "./schema";
import type { SourcePackage } from "./to-input";

/**
 * Stores what was changed beside the result: title, chosen packages, draws, seed, horizon, and uptake and dates of
 * packages. @throws DomainError forbidden | notFound | frozen | conflict
 */
export async function updateAssessment(ctx: Ctx, raw: unknown): Promise<{ id: string }> {
  requirePermission(ctx.actor, "assessment:write");
  const input = EditAssessmentInput.parse(raw);
  return inTransaction(ctx, async (tx) => {
    if (await findFrozen(input.id, tx)) throw new DomainError("frozen", { assessmentId: input.id });
    const { outbreak, packages: all, measures } = await getAssessment(input.id, tx);
    const edited = applyEdit({ outbreak, measures }, all, input).packages;
    const changed = edited.filter((each) => canonicalJson(each.items) !== canonicalJson(all.find(({ id }) => id === each.id)?.items ?? null));
    if (changed.length > 0) requirePermission(ctx.actor, "package:write");
    for (const each of changed) await savePackage(tx, ctx, each);

    const updated = await tx
      .update(assessments)
      .set({
        title: input.title,
        packageLetters: input.packageLetters,
        draws: input.draws,
        seed: input.seed,
        horizonDays: input.horizonDays,
        version: sql`${assessments.version} + 1`,
        updatedAt: ctx.now,
      })
      .where(and(eq(assessments.id, input.id), eq(assessments.version, input.version)))
      .returning({ id: assessments.id });
    if (updated.length === 0) throw new DomainError("conflict");
    for (const { id, letter, items } of changed) {
      await audit(tx, ctx, { action: "package.update", subject: `package/${id}`, facts: { letter, measures: items.length } });
    }
    await audit(tx, ctx, {
      action: "assessment.update",
      subject: `assessment/${input.id}`,
      facts: { packages: input.packageLetters.join(","), draws: input.draws, seed: input.seed },
    });
    return { id: input.id };
  });
}

async function savePackage(tx: Tx, ctx: Ctx, { id, version, items }: SourcePackage): Promise<void> {
  const updated = await tx
    .update(packages)
    .set({ items, version: sql`${packages.version} + 1`, updatedAt: ctx.now })
    .where(and(eq(packages.id, id), eq(packages.version, version)))
    .returning({ id: packages.id });
  if (updated.length === 0) throw new DomainError("conflict");
}
