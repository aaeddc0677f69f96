import { eq } from "drizzle-orm";
import type { z } from "zod";
import { outbreaks, packages } from "@/db/schema";
import { audit } from "@/lib/audit/audit";
import { requirePermission } from "@/lib/auth/require-permission";
import { inTransaction, type StaffCtx } from "@/lib/context";
import { DomainError } from "@/lib/errors";
import { CreatePackageInput, LETTERS } from "./schema";

/**
 * A new package under the first free letter, empty or as a copy of one of the same outbreak.
 * @throws DomainError "notFound"; "notReady" where all eight letters are taken
 */
export async function createPackage(ctx: StaffCtx, raw: z.input<typeof CreatePackageInput>): Promise<{ id: string; letter: string }> {
  requirePermission(ctx.actor, "package:write");
  const { outbreakId, name, copyOf } = CreatePackageInput.parse(raw);
  return inTransaction(ctx, async (tx) => {
    // The outbreak's row orders those who ask for a letter at the same time.
    const [outbreak] = await tx.select({ id: outbreaks.id }).from(outbreaks).where(eq(outbreaks.id, outbreakId)).for("update");
    if (!outbreak) throw new DomainError("notFound", { outbreakId });
    const held = await tx.select({ id: packages.id, letter: packages.letter, items: packages.items }).from(packages).where(eq(packages.outbreakId, outbreakId));
    const letter = LETTERS.find((each) => held.every((row) => row.letter !== each));
    if (!letter) throw new DomainError("notReady", { reasons: ["eightPackages"] });
    const original = held.find(({ id }) => id === copyOf);
    if (copyOf && !original) throw new DomainError("notFound", { packageId: copyOf });
    const [row] = await tx.insert(packages).values({ outbreakId, letter, name, items: original?.items ?? [], createdBy: ctx.actor.id }).returning({ id: packages.id, letter: packages.letter });
    if (!row) throw new Error("no package was written");
    await audit(tx, ctx, { action: "package.create", subject: `package/${row.id}`, facts: { letter, ...(original ? { copyOf: original.letter } : {}) } });
    return row;
  });
}
