import { sql } from "drizzle-orm";
import { assessments } from "@/db/schema";
import { audit } from "@/lib/audit/audit";
import { requirePermission } from "@/lib/auth/require-permission";
import { type Ctx, inTransaction } from "@/lib/context";
import { DomainError } from "@/lib/errors";
import { readSources } from "./queries";
import { CreateAssessmentInput } from "./schema";

// Any fixed number does: it keeps two at once from taking the same number.
const NUMBER_LOCK = 41_730_201;

/** Opens an assessment of some packages of one outbreak. @throws DomainError forbidden | notFound | notReady */
export async function createAssessment(ctx: Ctx, raw: unknown): Promise<{ id: string; number: number }> {
  requirePermission(ctx.actor, "assessment:write");
  const { actor } = ctx;
  const input = CreateAssessmentInput.parse(raw);
  return inTransaction(ctx, async (tx) => {
    const { packages } = await readSources(input.outbreakId, tx);
    const unknown = input.packageLetters.filter((letter) => !packages.some((each) => each.letter === letter));
    if (unknown.length > 0) throw new DomainError("conflict", { letters: unknown });
    await tx.execute(sql`select pg_advisory_xact_lock(${NUMBER_LOCK})`);
    const [next] = await tx.select({ number: sql<number>`coalesce(max(${assessments.number}), 0) + 1` }).from(assessments);
    const [made] = await tx
      .insert(assessments)
      .values({
        outbreakId: input.outbreakId,
        number: Number(next?.number ?? 1),
        title: input.title,
        packageLetters: input.packageLetters,
        draws: input.draws,
        seed: input.seed,
        horizonDays: input.horizonDays,
        createdBy: actor.id,
        createdAt: ctx.now,
        updatedAt: ctx.now,
      })
      .returning({ id: assessments.id, number: assessments.number });
    if (!made) throw new Error("the assessment was not inserted");
    await audit(tx, ctx, {
      action: "assessment.create",
      subject: `assessment/${made.id}`,
      facts: { number: made.number, packages: input.packageLetters.join(","), draws: input.draws },
    });
    return made;
  });
}
