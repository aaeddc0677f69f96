import { requirePermission } from "@/lib/auth/require-permission";
import type { Ctx } from "@/lib/context";
import { DomainError } from "@/lib/errors";
import { applyEdit } from "./apply-edit";
import { findFrozen, getAssessment } from "./queries";
import { EditAssessmentInput } from "./schema";
import { toContext } from "./to-context";
import { toInput } from "./to-input";

/**
 * What would be calculated if these changes were saved; stores nothing.
 * @throws DomainError forbidden | notFound | frozen | conflict
 */
export async function prepareEdit(ctx: Ctx, raw: unknown) {
  requirePermission(ctx.actor, "assessment:write");
  const edit = EditAssessmentInput.parse(raw);
  if (await findFrozen(edit.id)) throw new DomainError("frozen", { assessmentId: edit.id });
  const { row, outbreak, packages, measures } = await getAssessment(edit.id);
  const sources = applyEdit({ outbreak, measures }, packages, edit);
  return { input: toInput(sources), context: toContext(sources, { number: row.number, title: edit.title }) };
}
