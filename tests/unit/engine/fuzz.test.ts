import fc from "fast-check";
import { expect, test } from "vitest";
import { anyInput } from "./any-input";
import { soundOutcome } from "./soundness";

test("inputs from all over the domain: a refusal with its field, or a finite, converged, possible result", () => {
  const seen = { computed: 0, refused: 0 };
  fc.assert(
    fc.property(anyInput, (input) => {
      seen[soundOutcome(input)]++;
    }),
    { numRuns: 150 },
  );
  expect(Math.min(seen.computed, seen.refused)).toBeGreaterThan(10);
}, 60_000);
