import { assessOffThread, type OffThreadOptions } from "@/lib/compute/assess-off-thread";
import { ENGINE_VERSION, hashInput } from "@/lib/engine";
import type { AssessmentInput, AssessmentResult } from "@/lib/engine/types";

/** Same input, same result to the bit: what was computed lately needn't be computed again. */
const KEPT_MAX = 24;
const held = globalThis as { ebbmarkResults?: Map<string, AssessmentResult> };

/**
 * The result of an input, from memory where it was computed lately. Freezing never reads from here.
 * @throws {ComputeError} refused | busy | timeLimit | cancelled
 */
export async function currentResult(input: AssessmentInput, options: OffThreadOptions = {}): Promise<AssessmentResult> {
  held.ebbmarkResults ??= new Map();
  const kept = held.ebbmarkResults;
  const key = `${ENGINE_VERSION} ${hashInput(input)}`;
  const known = kept.get(key);
  if (known) {
    // Seen again: last to go.
    kept.delete(key);
    kept.set(key, known);
    return known;
  }
  const result = await assessOffThread(input, options);
  kept.set(key, result);
  for (const oldest of kept.keys()) {
    if (kept.size <= KEPT_MAX) break;
    kept.delete(oldest);
  }
  return result;
}
