import { and, asc, eq, isNull, sql } from "drizzle-orm";
import type { z } from "zod";
import { assessments, frozenAssessments, packages } from "@/db/schema";
import { audit } from "@/lib/audit/audit";
import { requirePermission } from "@/lib/auth/require-permission";
import { inTransaction, type StaffCtx } from "@/lib/context";
import { DomainError } from "@/lib/errors";
import { DeletePackageInput } from "./schema";

/**
 * Removes a package; frozen assessments hold copies of their own.
 * @throws DomainError "notFound"; "notReady" where an assessment in work compares it, `numbers` says which
 */
export async function deletePackage(ctx: StaffCtx, raw: z.input<typeof DeletePackageInput>): Promise<{ outbreakId: string }> {
  requirePermission(ctx.actor, "package:write");
  const { id } = DeletePackageInput.parse(raw);
  return inTransaction(ctx, async (tx) => {
    const [row] = await tx.select({ outbreakId: packages.outbreakId, letter: packages.letter }).from(packages).where(eq(packages.id, id)).for("update");
    if (!row) throw new DomainError("notFound", { packageId: id });
    const used = await tx
      .select({ number: assessments.number })
      .from(assessments)
      .leftJoin(frozenAssessments, eq(frozenAssessments.assessmentId, assessments.id))
      .where(and(eq(assessments.outbreakId, row.outbreakId), isNull(frozenAssessments.assessmentId), sql`${row.letter} = any(${assessments.packageLetters})`))
      .orderBy(asc(assessments.number));
    if (used.length > 0) throw new DomainError("notReady", { reasons: ["packageInAssessment"], numbers: used.map(({ number }) => number).join(", "), count: used.length });
    await tx.delete(packages).where(eq(packages.id, id));
    await audit(tx, ctx, { action: "package.delete", subject: `package/${id}`, facts: { letter: row.letter } });
    return { outbreakId: row.outbreakId };
  });
}
