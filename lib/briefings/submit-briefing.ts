import { eq, sql } from "drizzle-orm";
import type { z } from "zod";
import { briefings, briefingVersions } from "@/db/schema";
import { audit } from "@/lib/audit/audit";
import { requirePermission } from "@/lib/auth/require-permission";
import { canonicalJson, sha256Hex } from "@/lib/canonical-json";
import { inTransaction, type StaffCtx } from "@/lib/context";
import { DomainError } from "@/lib/errors";
import { getWhole, renderFacts, stepFacts, type WholeBriefing } from "./queries";
import { pairedParagraphs, renderBriefing } from "./render";
import type { CorrectionNotes } from "./constants";
import type { RenderedBriefing } from "./rendered";
import { SubmitBriefingInput } from "./schema";
import { reasonsAgainst } from "./workflow";

export type VersionContent = {
  rendered: RenderedBriefing[];
  assessment: { inputHash: string; resultHash: string; contextHash: string };
  /** What a correction tells residents, per language; absent where this is none. */
  correction?: CorrectionNotes;
};

/** The exact content of the version being written: every language rendered, and what it rests on. */
export async function versionContent(whole: WholeBriefing): Promise<{ content: string; contentHash: string }> {
  const { row, texts, source, frozen } = whole;
  const rendered = await Promise.all(
    row.locales.map((locale) => {
      const text = texts.find((each) => each.locale === locale);
      return renderBriefing(frozen, renderFacts(row), { locale, title: text?.title ?? "", paragraphs: pairedParagraphs(source.paragraphs, text?.paragraphs ?? []) });
    }),
  );
  const body: VersionContent = {
    rendered,
    assessment: { inputHash: frozen.inputHash, resultHash: frozen.resultHash, contextHash: frozen.contextHash },
    ...(row.revision?.kind === "correction" ? { correction: row.revision.notes } : {}),
  };
  const content = canonicalJson(body);
  return { content, contentHash: sha256Hex(content) };
}

/** Hands the present version to legal review; what is stored is what every language shows. @throws DomainError "notReady" with all reasons */
export async function submitBriefing(ctx: StaffCtx, raw: z.input<typeof SubmitBriefingInput>): Promise<{ versionId: string }> {
  requirePermission(ctx.actor, "briefing:submit");
  const { briefingId, version } = SubmitBriefingInput.parse(raw);
  return inTransaction(ctx, async (tx) => {
    const [locked] = await tx.select({ version: briefings.version }).from(briefings).where(eq(briefings.id, briefingId)).for("update");
    if (locked && locked.version !== version) throw new DomainError("conflict", { briefingId });
    const whole = await getWhole(briefingId, tx);
    const { frozen } = whole;
    const reasons = reasonsAgainst("submit", stepFacts(whole, ctx.actor.id));
    if (sha256Hex(frozen.inputText) !== frozen.inputHash || sha256Hex(frozen.resultText) !== frozen.resultHash) reasons.push("assessmentChanged");
    if (reasons.length > 0) throw new DomainError("notReady", { reasons });
    const body = await versionContent(whole);
    const authors = [...new Set([...whole.texts.flatMap((text) => text.authors), ctx.actor.id])];
    const [row] = await tx
      .insert(briefingVersions)
      .values({ briefingId, number: whole.row.versionNumber, ...body, authors, submittedBy: ctx.actor.id, submittedAt: ctx.now })
      .returning({ id: briefingVersions.id });
    if (!row) throw new Error("no version was written");
    await tx.update(briefings).set({ state: "legalReview", version: sql`${briefings.version} + 1`, updatedAt: ctx.now }).where(eq(briefings.id, briefingId));
    await audit(tx, ctx, { action: "briefing.submit", subject: `briefing/${briefingId}`, objectHash: body.contentHash, facts: { version: whole.row.versionNumber } });
    return { versionId: row.id };
  });
}
