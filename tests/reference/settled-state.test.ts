import { readFileSync } from "node:fs";
import { expect, test } from "vitest";
import { otherFixedPoint, settledState } from "@/lib/engine";
import { relativeError } from "./cases";

type GridRow = Record<"excess" | "thresholdRatio" | "margin" | "stable" | "other", string>;
const grid = JSON.parse(readFileSync(new URL("./cases/settled-state.json", import.meta.url), "utf8")) as {
  source: { kind: string };
  tolerance: { relative: number };
  rows: GridRow[];
};

/** b in [1e-3, 1e3], c in [0, 10], a third within 1e-13 to 0.3 of the threshold, and b = 1 ± 1e-12. */
test(`both fixed points to 1e-13 over ${grid.rows.length} inputs, ${grid.source.kind}`, () => {
  let largest = 0;
  for (const row of grid.rows) {
    const input = { excess: Number(row.excess), thresholdRatio: Number(row.thresholdRatio), margin: Number(row.margin) };
    for (const [found, wanted] of [
      [settledState(input), Number(row.stable)],
      [otherFixedPoint(input), Number(row.other)],
    ] as const) {
      expect(found.outcome).toBe("converged");
      const error = relativeError(found.value, wanted);
      largest = Math.max(largest, error);
      expect(error, `${JSON.stringify(row)}: ${found.value} against ${wanted}`).toBeLessThanOrEqual(grid.tolerance.relative);
      expect(found.residual).toBeLessThanOrEqual(1e-14);
    }
  }
  console.log(`settled values against mpmath: largest relative error ${largest.toExponential(2)}`);
});
