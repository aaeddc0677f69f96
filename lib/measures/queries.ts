import { and, asc, eq, inArray } from "drizzle-orm";
import { db } from "@/db/client";
import { measures } from "@/db/schema";
import { DomainError } from "@/lib/errors";

export type Measure = typeof measures.$inferSelect;

/** The catalogue in a steady order: ladders together, weakest rung first. */
export async function listMeasures({ archived = false }: { archived?: boolean } = {}): Promise<Measure[]> {
  const rows = await db.select().from(measures).where(eq(measures.archived, archived)).orderBy(asc(measures.createdAt), asc(measures.code));
  const rank = (row: Measure) => rows.findIndex((other) => (row.ladder ? other.ladder === row.ladder : other.id === row.id));
  return rows.toSorted((a, b) => rank(a) - rank(b) || a.cut.central - b.cut.central);
}

/** @throws DomainError "notFound" */
export async function getMeasure(id: string): Promise<Measure> {
  const [row] = /^[0-9a-f-]{36}$/.test(id) ? await db.select().from(measures).where(eq(measures.id, id)) : [];
  if (!row) throw new DomainError("notFound", { measureId: id });
  return row;
}

/** Those named, archived ones too: an old package goes on knowing its measures. */
export const listMeasuresById = (ids: readonly string[]): Promise<Measure[]> =>
  ids.length === 0 ? Promise.resolve([]) : db.select().from(measures).where(and(inArray(measures.id, [...ids])));
