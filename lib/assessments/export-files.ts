import { canonicalJson } from "@/lib/canonical-json";
import { DomainError } from "@/lib/errors";
import { findFrozen, getAssessment } from "./queries";
import { toInput } from "./to-input";

export type ExportFile = { name: string; text: string };

/** The input: as frozen, or of the rows as they stand. null where there is no such assessment. */
export async function exportInput(id: string): Promise<ExportFile | null> {
  const frozen = await findFrozen(id);
  if (frozen) return { name: `assessment-${frozen.number}-input.json`, text: frozen.inputText };
  try {
    const { row, outbreak, packages, measures } = await getAssessment(id);
    const chosen = packages.filter(({ letter }) => row.packageLetters.includes(letter));
    const input = toInput({ outbreak, packages: chosen, measures, settings: { draws: row.draws, seed: row.seed, horizonDays: row.horizonDays } });
    return { name: `assessment-${row.number}-input-in-work.json`, text: canonicalJson(input) };
  } catch (error) {
    if (error instanceof DomainError) return null;
    throw error;
  }
}

/** Only what is frozen is kept. */
export async function exportResult(id: string): Promise<ExportFile | null> {
  const frozen = await findFrozen(id);
  return frozen ? { name: `assessment-${frozen.number}-result.json`, text: frozen.resultText } : null;
}

export async function exportContext(id: string): Promise<ExportFile | null> {
  const frozen = await findFrozen(id);
  return frozen ? { name: `assessment-${frozen.number}-context.json`, text: frozen.contextText } : null;
}
