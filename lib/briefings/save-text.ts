import { and, eq, sql } from "drizzle-orm";
import type { z } from "zod";
import { briefingTexts, briefings } from "@/db/schema";
import { audit } from "@/lib/audit/audit";
import { requirePermission } from "@/lib/auth/require-permission";
import { inTransaction, type StaffCtx } from "@/lib/context";
import { DomainError } from "@/lib/errors";
import { beginEdit } from "./begin-edit";
import type { Paragraph } from "./constants";
import { sourceHash } from "./hash";
import { recordAuthor } from "./record-author";
import { AddFigureInput, SaveBriefingSettingsInput, SaveTextInput } from "./schema";

/**
 * Saves one language. In the source language an emptied paragraph is removed and a new one gets an id; a translation
 * is bound to the source paragraph that it was made from, when it is written or said to be current.
 * @throws DomainError "conflict" where somebody saved this language in between
 */
export async function saveText(ctx: StaffCtx, raw: z.input<typeof SaveTextInput>): Promise<void> {
  requirePermission(ctx.actor, "briefing:write");
  const input = SaveTextInput.parse(raw);
  const { briefingId, locale } = input;
  await inTransaction(ctx, async (tx) => {
    // The briefing is locked first, as by every other command: two of them can't wait for each other.
    const { row, source, texts } = await beginEdit(tx, ctx, briefingId, `text changed (${locale})`);
    const held = texts.find((text) => text.locale === locale);
    if (!held) throw new DomainError("notFound", { briefingId });
    if (held.version !== input.version) throw new DomainError("conflict", { briefingId, locale });
    const isSource = locale === row.sourceLocale;
    const values = isSource ? sourceValues(input, held.paragraphs, texts) : translationValues(input, held, source);
    await tx
      .update(briefingTexts)
      .set({ ...values, authors: [...new Set([...held.authors, ctx.actor.id])], version: sql`${briefingTexts.version} + 1`, updatedBy: ctx.actor.id, updatedAt: ctx.now })
      .where(and(eq(briefingTexts.briefingId, briefingId), eq(briefingTexts.locale, locale)));
    await audit(tx, ctx, { action: isSource ? "briefing.update" : "briefing.translate", subject: `briefing/${briefingId}`, facts: { locale } });
  });
}

type Input = z.output<typeof SaveTextInput>;

function sourceValues({ title, paragraphs, raise }: Input, before: readonly Paragraph[], texts: readonly { paragraphs: readonly Paragraph[] }[]) {
  // A number that a translation still holds is never given again: its text would turn up under the new paragraph.
  let next = Math.max(0, ...texts.flatMap((text) => text.paragraphs.map(({ id }) => Number(id.slice(1))))) + 1;
  const known = new Set(before.map(({ id }) => id));
  const kept = paragraphs.filter(({ id, text }) => text !== "" && (id === "new" || known.delete(id))).map(({ id, part, text }): Paragraph => ({ id: id === "new" ? `p${next++}` : id, part, text }));
  return { title, paragraphs: raise ? raised(kept, raise) : kept };
}

/** The same paragraphs with one put before the one above it in its part. */
function raised(paragraphs: Paragraph[], id: string): Paragraph[] {
  const at = paragraphs.findIndex((each) => each.id === id);
  const moved = paragraphs[at];
  const above = paragraphs.findLastIndex((each, index) => index < at && each.part === moved?.part);
  if (!moved || above < 0) return paragraphs;
  return paragraphs.toSpliced(at, 1).toSpliced(above, 0, moved);
}

function translationValues({ title, titleCurrent, paragraphs }: Input, held: { title: string; titleSourceHash: string | null; paragraphs: Paragraph[] }, source: { title: string; paragraphs: Paragraph[] }) {
  const bind = (changed: boolean, current: boolean, text: string, before: string | null | undefined) => (changed || current ? sourceHash(text) : (before ?? null));
  return {
    title,
    titleSourceHash: bind(title !== held.title, titleCurrent, source.title, held.titleSourceHash),
    paragraphs: source.paragraphs.flatMap((from): Paragraph[] => {
      const typed = paragraphs.find(({ id }) => id === from.id);
      const before = held.paragraphs.find(({ id }) => id === from.id);
      if (!typed) return before ? [before] : [];
      const hash = bind(typed.text !== (before?.text ?? ""), typed.current, from.text, before?.sourceHash);
      const madeFrom = hash === sourceHash(from.text) ? from.text : before?.madeFrom;
      return [{ id: from.id, part: from.part, text: typed.text, ...(hash ? { sourceHash: hash } : {}), ...(madeFrom ? { madeFrom } : {}) }];
    }),
  };
}

/** The day on which the authority looks again. */
export async function saveBriefingSettings(ctx: StaffCtx, raw: z.input<typeof SaveBriefingSettingsInput>): Promise<void> {
  requirePermission(ctx.actor, "briefing:write");
  const { briefingId, version, reviewDate } = SaveBriefingSettingsInput.parse(raw);
  await inTransaction(ctx, async (tx) => {
    const { row } = await beginEdit(tx, ctx, briefingId, "review date changed", version);
    await recordAuthor(tx, ctx, briefingId, row.sourceLocale);
    await tx.update(briefings).set({ reviewDate }).where(eq(briefings.id, briefingId));
    await audit(tx, ctx, { action: "briefing.update", subject: `briefing/${briefingId}`, facts: { reviewDate: reviewDate ?? "none" } });
  });
}

/** Puts another figure of the frozen assessment at the writers' disposal under the next reference. */
export async function addFigure(ctx: StaffCtx, raw: z.input<typeof AddFigureInput>): Promise<void> {
  requirePermission(ctx.actor, "briefing:write");
  const { briefingId, version, figure, package: letter, form } = AddFigureInput.parse(raw);
  await inTransaction(ctx, async (tx) => {
    const { row } = await beginEdit(tx, ctx, briefingId, "figures changed", version);
    if (row.figures.some((each) => each.figure === figure && each.package === letter && each.form === form)) throw new DomainError("invalid", { reasons: ["figureThere"] });
    const ref = `F${Math.max(0, ...row.figures.map((each) => Number(each.ref.slice(1)))) + 1}`;
    await recordAuthor(tx, ctx, briefingId, row.sourceLocale);
    await tx.update(briefings).set({ figures: [...row.figures, { ref, figure, package: letter, form }] }).where(eq(briefings.id, briefingId));
    await audit(tx, ctx, { action: "briefing.update", subject: `briefing/${briefingId}`, facts: { figure: ref } });
  });
}
