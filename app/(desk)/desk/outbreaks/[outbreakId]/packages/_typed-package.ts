import type { z } from "zod";
import type { Quantity } from "@/lib/engine/types";
import type { UpdatePackageInput } from "@/lib/packages/schema";

const spread = (value: Quantity) => (typeof value === "number" ? { central: value } : value);

/** A parsed form as the form gives it: the command reads what was typed and decides for itself. */
export function typedPackage(input: z.output<typeof UpdatePackageInput>): z.input<typeof UpdatePackageInput> {
  const lines = (input.lines ?? []).flatMap((line) =>
    line === null ? [] : [{ measureId: line.measureId, included: true, uptakePercent: spread(line.uptakePercent), from: line.from, until: line.until ?? "", never: line.until === null }],
  );
  return { ...input, lines };
}
