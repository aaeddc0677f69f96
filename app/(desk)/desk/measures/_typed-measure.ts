import type { z } from "zod";
import type { MeasureCostInput, Quantity } from "@/lib/engine/types";
import { COST_KINDS, type CreateMeasureInput, PAYERS } from "@/lib/measures/schema";

type Facts = z.output<typeof CreateMeasureInput>;

const spread = (value: Quantity) => (typeof value === "number" ? { low: value, central: value, high: value } : value);

const typedLines = (lines: readonly MeasureCostInput[]) =>
  Object.fromEntries(
    PAYERS.map((payer) => {
      const line = lines.find((each) => each.payer === payer);
      return [payer, Object.fromEntries(COST_KINDS.flatMap((kind) => (line?.[kind] === undefined ? [] : [[kind, spread(line[kind])]])))];
    }),
  );

/** A parsed form as the form gives it: the command reads what was typed and decides for itself. */
export const typedMeasure = (facts: Facts): z.input<typeof CreateMeasureInput> =>
  ({ ...facts, ladder: facts.ladder ?? "", costs: typedLines(facts.costs), transfers: typedLines(facts.transfers) }) as z.input<typeof CreateMeasureInput>;
