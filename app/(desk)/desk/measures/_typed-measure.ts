import type { z } from "zod";
import type { Quantity } from "@/lib/engine/types";
import { COST_KINDS, type CreateMeasureInput, PAYERS } from "@/lib/measures/schema";

type Facts = z.output<typeof CreateMeasureInput>;

const spread = (value: Quantity) => (typeof value === "number" ? { low: value, central: value, high: value } : value);

/** A parsed form as the form gives it: the command reads what was typed and decides for itself. */
export function typedMeasure(facts: Facts): z.input<typeof CreateMeasureInput> {
  const costs = Object.fromEntries(
    PAYERS.map((payer) => {
      const line = facts.costs.find((each) => each.payer === payer);
      return [payer, Object.fromEntries(COST_KINDS.flatMap((kind) => (line?.[kind] === undefined ? [] : [[kind, spread(line[kind])]])))];
    }),
  );
  return { ...facts, ladder: facts.ladder ?? "", costs } as z.input<typeof CreateMeasureInput>;
}
