import { eq } from "drizzle-orm";
import type { z } from "zod";
import { measures } from "@/db/schema";
import type { Tx } from "@/lib/context";
import { DomainError } from "@/lib/errors";
import type { UpdateMeasureInput } from "./schema";

export type MeasureFacts = Omit<z.output<typeof UpdateMeasureInput>, "id" | "version">;

/** Percent to share, without the digits that dividing a decimal leaves behind. */
const share = (percent: number) => Number((percent / 100).toPrecision(15));

/** What was typed as a row's columns. Cut: share of β. */
export function measureValues({ cutPercent, costs, transfers, ...facts }: MeasureFacts) {
  const { low, central, high, source } = cutPercent;
  return { ...facts, cut: { low: share(low), central: share(central), high: share(high), ...(source ? { source } : {}) }, costs: [...costs, ...transfers] };
}

export const codeTaken = () => new DomainError("invalid", { reasons: ["codeTaken"] });

/** Id of the measure that has a code, or null. */
export async function holderOfCode(tx: Tx, code: string): Promise<string | null> {
  const [row] = await tx.select({ id: measures.id }).from(measures).where(eq(measures.code, code));
  return row?.id ?? null;
}
