import { desc, eq } from "drizzle-orm";
import { db } from "@/db/client";
import { outbreaks } from "@/db/schema";
import { DomainError } from "@/lib/errors";

export type Outbreak = typeof outbreaks.$inferSelect;

/** @throws DomainError "notFound" */
export async function getOutbreak(id: string): Promise<Outbreak> {
  const [row] = /^[0-9a-f-]{36}$/.test(id) ? await db.select().from(outbreaks).where(eq(outbreaks.id, id)) : [];
  if (!row) throw new DomainError("notFound", { outbreakId: id });
  return row;
}

/** Newest first. */
export const listOutbreaks = () =>
  db
    .select({ id: outbreaks.id, name: outbreaks.name, place: outbreaks.place, populationPersons: outbreaks.populationPersons, dayZero: outbreaks.dayZero, profile: outbreaks.profile, updatedAt: outbreaks.updatedAt })
    .from(outbreaks)
    .orderBy(desc(outbreaks.createdAt));
