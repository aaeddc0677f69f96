import { and, eq } from "drizzle-orm";
import { assessments, frozenAssessments } from "@/db/schema";
import { audit } from "@/lib/audit/audit";
import { requirePermission } from "@/lib/auth/require-permission";
import { canonicalJson, sha256Hex } from "@/lib/canonical-json";
import { assessOffThread } from "@/lib/compute/assess-off-thread";
import { ComputeError } from "@/lib/compute/outcome";
import { type Ctx, inTransaction, type Tx } from "@/lib/context";
import type { AssessmentInput, AssessmentResult } from "@/lib/engine/types";
import { DomainError } from "@/lib/errors";
import { SNAPSHOT_VERSION } from "./constants";
import { reasonsAgainstFreezing } from "./freeze-rules";
import { objectHashOf } from "./object-hash";
import { findFrozen, getAssessment } from "./queries";
import { FreezeAssessmentInput } from "./schema";
import { toContext } from "./to-context";
import { toInput } from "./to-input";

export type Compute = (input: AssessmentInput) => Promise<AssessmentResult>;

/**
 * Freezes an assessment: computes it once more, keeps both files, the context and their hashes for good.
 * The calculation runs before the transaction, so that none is held open meanwhile; inside, what it was made from is
 * read again and must be the same to the byte.
 * @throws DomainError forbidden | notFound | frozen | conflict | notConverged | notReady (reasons say what)
 */
export async function freezeAssessment(ctx: Ctx, raw: unknown, compute: Compute = assessOffThread): Promise<{ id: string; objectHash: string }> {
  requirePermission(ctx.actor, "assessment:freeze");
  const { actor } = ctx;
  const { id, version, reason } = FreezeAssessmentInput.parse(raw);
  const before = await filesNow(id, ctx.tx);
  if (before.version !== version) throw new DomainError("conflict");
  const result = await computed(compute, before.input);
  const reasons = reasonsAgainstFreezing(result.diagnostics, before.input.packages);
  const unsound = reasons.filter((each) => each === "notConverged" || each === "integratorsDiffer");
  if (unsound.length > 0) throw new DomainError("notConverged", { reasons });
  if (reasons.length > 0) throw new DomainError("notReady", { reasons });

  return inTransaction(ctx, async (tx) => {
    // Nobody else may change or freeze the row until this is done.
    await tx.select({ id: assessments.id }).from(assessments).where(and(eq(assessments.id, id), eq(assessments.version, version))).for("update");
    const now = await filesNow(id, tx);
    if (now.version !== version || now.inputText !== before.inputText || now.contextText !== before.contextText) throw new DomainError("conflict");
    const resultText = canonicalJson(result);
    const hashes = { inputHash: sha256Hex(now.inputText), resultHash: sha256Hex(resultText), contextHash: sha256Hex(now.contextText) };
    const objectHash = objectHashOf(hashes);
    await tx.insert(frozenAssessments).values({
      assessmentId: id,
      input: now.inputText,
      result: resultText,
      context: now.contextText,
      ...hashes,
      engineVersion: result.engine,
      snapshotVersion: SNAPSHOT_VERSION,
      reason: reason.normalize("NFC"),
      frozenBy: actor.id,
      frozenAt: ctx.now,
    });
    await audit(tx, ctx, {
      action: "assessment.freeze",
      subject: `assessment/${id}`,
      objectHash,
      reason,
      facts: { number: now.number, engine: result.engine, undeliverable: now.undeliverable.join(",") },
    });
    return { id, objectHash };
  });
}

async function filesNow(id: string, tx?: Tx) {
  if (await findFrozen(id, tx)) throw new DomainError("frozen", { assessmentId: id });
  const { row, outbreak, packages, measures } = await getAssessment(id, tx);
  const chosen = packages.filter(({ letter }) => row.packageLetters.includes(letter));
  if (chosen.length !== row.packageLetters.length) throw new DomainError("notReady", { reasons: ["packageGone"] });
  const sources = { outbreak, packages: chosen, measures, settings: { draws: row.draws, seed: row.seed, horizonDays: row.horizonDays } };
  const input = toInput(sources);
  const context = toContext(sources, { number: row.number, title: row.title });
  return {
    number: row.number,
    version: row.version,
    input,
    inputText: canonicalJson(input),
    contextText: canonicalJson(context),
    undeliverable: context.packages.filter(({ deliverable }) => !deliverable).map(({ letter }) => letter),
  };
}

async function computed(compute: Compute, input: AssessmentInput): Promise<AssessmentResult> {
  try {
    return await compute(input);
  } catch (error) {
    if (!(error instanceof ComputeError)) throw error;
    throw new DomainError("notReady", { reasons: error.code === "refused" ? error.faults.map(({ path, message }) => `${path}: ${message}`) : [`compute.${error.code}`] });
  }
}
