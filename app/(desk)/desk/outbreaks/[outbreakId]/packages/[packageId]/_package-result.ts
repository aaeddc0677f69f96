import { currentResult } from "@/lib/assessments/current-result";
import { DRAWS_DEFAULT, HORIZON_DAYS_DEFAULT } from "@/lib/assessments/constants";
import { toContext } from "@/lib/assessments/to-context";
import { toInput } from "@/lib/assessments/to-input";
import { type AssessmentView, buildView, type ChartWords } from "@/lib/assessments/view";
import { ComputeError } from "@/lib/compute/outcome";
import type { Measure } from "@/lib/measures/queries";
import type { Outbreak } from "@/lib/outbreaks/queries";
import type { Package } from "@/lib/packages/queries";

/** One seed for every look at a package, so that the same schedule shows the same figures. */
const SEED = 1;

/** A package calculated by itself, nothing stored; or why it can't be. */
export type PackageResult = { view: AssessmentView; faults: null } | { view: null; faults: string[] };

export async function packageResult(outbreak: Outbreak, row: Package, measures: readonly Measure[], words: ChartWords): Promise<PackageResult | null> {
  const { profile } = outbreak;
  if (profile === null || row.items.length === 0) return null;
  const sources = { outbreak: { ...outbreak, profile }, packages: [row], measures: [...measures], settings: { draws: DRAWS_DEFAULT, seed: SEED, horizonDays: HORIZON_DAYS_DEFAULT } };
  const input = toInput(sources);
  try {
    return { view: buildView(input, await currentResult(input), toContext(sources, { number: 0, title: "" }), words), faults: null };
  } catch (error) {
    if (!(error instanceof ComputeError)) throw error;
    return { view: null, faults: error.faults.map(({ message }) => message) };
  }
}
