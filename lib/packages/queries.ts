import { asc, eq } from "drizzle-orm";
import { db } from "@/db/client";
import { packages } from "@/db/schema";
import { DomainError } from "@/lib/errors";

export type Package = typeof packages.$inferSelect;

/** By letter. */
export const listPackages = (outbreakId: string): Promise<Package[]> => db.select().from(packages).where(eq(packages.outbreakId, outbreakId)).orderBy(asc(packages.letter));

/** @throws DomainError "notFound" */
export async function getPackage(id: string): Promise<Package> {
  const [row] = /^[0-9a-f-]{36}$/.test(id) ? await db.select().from(packages).where(eq(packages.id, id)) : [];
  if (!row) throw new DomainError("notFound", { packageId: id });
  return row;
}
