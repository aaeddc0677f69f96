import { max, sql } from "drizzle-orm";
import type { z } from "zod";
import { briefings, briefingTexts } from "@/db/schema";
import { findFrozen } from "@/lib/assessments/queries";
import { audit } from "@/lib/audit/audit";
import { requirePermission } from "@/lib/auth/require-permission";
import { inTransaction, type StaffCtx } from "@/lib/context";
import { env } from "@/lib/env";
import { DomainError } from "@/lib/errors";
import { CreateBriefingInput } from "./schema";
import { directionOf, fewOf, startingFigures, templateTexts } from "./template";

/** Two briefings started at once get two numbers. */
const NUMBER_LOCK = 41_730_202;

/** A draft in every language of the outbreak, its wording chosen by the frozen result. @throws DomainError "notReady" where it isn't frozen */
export async function createBriefing(ctx: StaffCtx, raw: z.input<typeof CreateBriefingInput>): Promise<{ id: string; number: number }> {
  requirePermission(ctx.actor, "briefing:write");
  const { assessmentId, packageLetter } = CreateBriefingInput.parse(raw);
  return inTransaction(ctx, async (tx) => {
    const frozen = await findFrozen(assessmentId, tx);
    if (!frozen) throw new DomainError("notReady", { reasons: ["notFrozen"] });
    const { outbreak, packages } = frozen.context;
    const decided = packages.find(({ letter }) => letter === packageLetter);
    if (!decided || decided.items.length === 0) throw new DomainError("notReady", { reasons: ["packageUnknown"] });
    const texts = await templateTexts(outbreak.languages, "en", (locale) => ({
      direction: directionOf(frozen.result, packageLetter),
      illness: outbreak.publicNames[locale]?.name ?? outbreak.name,
      open: decided.endDay === null,
      few: fewOf(frozen.result, packageLetter),
      contact: env().AUTHORITY_CONTACT,
    }));
    await tx.execute(sql`select pg_advisory_xact_lock(${NUMBER_LOCK})`);
    const [last] = await tx.select({ number: max(briefings.number) }).from(briefings);
    const number = (last?.number ?? 0) + 1;
    const words = `${outbreak.name} ${outbreak.place}`.normalize("NFKD").toLowerCase().replace(/[^a-z0-9]+/g, "-").replace(/^-+|-+$/g, "");
    const [row] = await tx
      .insert(briefings)
      .values({ number, slug: `${words || "briefing"}-${number}`, assessmentId, packageLetter, locales: outbreak.languages, figures: startingFigures(packageLetter), createdBy: ctx.actor.id })
      .returning({ id: briefings.id });
    if (!row) throw new Error("no briefing was written");
    await tx.insert(briefingTexts).values(texts.map((text) => ({ ...text, briefingId: row.id, authors: [ctx.actor.id], updatedBy: ctx.actor.id })));
    await audit(tx, ctx, { action: "briefing.create", subject: `briefing/${row.id}`, facts: { number, package: packageLetter, assessment: frozen.number } });
    return { id: row.id, number };
  });
}
