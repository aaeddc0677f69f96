import fc from "fast-check";
import { expect, test } from "vitest";
import { anyInput } from "../unit/engine/any-input";
import { soundOutcome } from "../unit/engine/soundness";

test("ten thousand inputs from all over the domain: refused with a field, or finite, converged and possible", () => {
  const seen = { computed: 0, refused: 0 };
  fc.assert(
    fc.property(anyInput, (input) => {
      seen[soundOutcome(input)]++;
    }),
    { numRuns: 10_000, endOnFailure: true },
  );
  expect(Math.min(seen.computed, seen.refused)).toBeGreaterThan(1_000);
});
