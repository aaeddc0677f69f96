import type { getTranslations } from "next-intl/server";
import { currentResult } from "@/lib/assessments/current-result";
import { dateOf } from "@/lib/packages/days";
import { type ReasonAgainstFreezing, reasonsAgainstFreezing } from "@/lib/assessments/freeze-rules";
import type { getAssessment } from "@/lib/assessments/queries";
import { placeOf } from "@/lib/assessments/recalculation";
import { toContext } from "@/lib/assessments/to-context";
import { toInput } from "@/lib/assessments/to-input";
import { type AssessmentView, buildView, type ChartWords } from "@/lib/assessments/view";
import { ComputeError } from "@/lib/compute/outcome";
import { formatPercent } from "@/lib/figures/format";
import type { EditablePackage } from "../_edit-fields";

type Assessment = Awaited<ReturnType<typeof getAssessment>>;
type Translate = Awaited<ReturnType<typeof getTranslations<"Assessments">>>;

export type WorkingState = {
  /** null where the stored state can't be calculated; `problem` says why. */
  shown: { view: AssessmentView; horizonDays: number } | null;
  problem: { title: string; lines: string[] } | null;
  reasons: ReasonAgainstFreezing[];
  undeliverable: string[];
};

/** Result of the stored state, or why there is none. */
export async function workingState({ row, outbreak, packages, measures }: Assessment, words: ChartWords, t: Translate): Promise<WorkingState> {
  const chosen = packages.filter(({ letter }) => row.packageLetters.includes(letter));
  const sources = { outbreak, packages: chosen, measures, settings: { draws: row.draws, seed: row.seed, horizonDays: row.horizonDays } };
  const input = toInput(sources);
  const context = toContext(sources, { number: row.number, title: row.title });
  const undeliverable = context.packages.filter(({ deliverable }) => !deliverable).map(({ letter }) => letter);
  const gone: ReasonAgainstFreezing[] = chosen.length < row.packageLetters.length ? ["packageGone"] : [];
  try {
    const result = await currentResult(input);
    return { shown: { view: buildView(input, result, context, words), horizonDays: row.horizonDays }, problem: null, reasons: [...gone, ...reasonsAgainstFreezing(result.diagnostics, input.packages)], undeliverable };
  } catch (error) {
    if (!(error instanceof ComputeError)) throw error;
    const lines =
      error.code === "refused"
        ? [
            ...error.faults.map(({ path, message }) => {
              const { letter, measure } = placeOf(path, input);
              const where = letter && measure ? t("page.faultItem", { letter, measure }) : letter ? t("page.faultPackage", { letter }) : (measure ?? path);
              return t("page.faultAt", { where, message });
            }),
            t("page.refusedText"),
          ]
        : [t(`page.failed.${error.code}`)];
    return { shown: null, problem: { title: t("page.refused"), lines }, reasons: ["notConverged"], undeliverable };
  }
}

const trimmed = (value: number) => String(Number(value.toFixed(6)));

/** What the edit form starts with: stored rows as a person reads them, dates as dates, uptake in per cent. */
export function editDefaults({ row, outbreak, packages, measures }: Assessment): { defaults: Record<string, unknown>; packages: EditablePackage[] } {
  const nameOf = new Map(measures.map(({ id, name }) => [id, name]));
  const percent = (share: number) => formatPercent(share, "en-u-nu-latn");
  return {
    defaults: {
      id: row.id,
      version: row.version,
      title: row.title,
      packageLetters: row.packageLetters,
      draws: row.draws,
      seed: row.seed,
      horizonDays: row.horizonDays,
      dayZero: outbreak.dayZero,
      packages: packages.map(({ letter, version, items }) => ({
        letter,
        version,
        shiftDays: 0,
        items: items.map(({ measureId, uptake, startDay, endDay }) => ({
          measureId,
          ...(typeof uptake === "number" ? { uptakePercent: trimmed(uptake * 100) } : {}),
          from: dateOf(outbreak.dayZero, startDay),
          to: endDay === null ? "" : dateOf(outbreak.dayZero, endDay - 1),
        })),
      })),
    },
    packages: packages.map(({ letter, name, version, items }) => ({
      letter,
      name,
      version,
      items: items.map(({ measureId, uptake }) => ({
        measureId,
        measure: nameOf.get(measureId) ?? measureId,
        uptakeRange: typeof uptake === "number" ? null : `${percent(uptake.central)} (${percent(uptake.low)} to ${percent(uptake.high)})`,
      })),
    })),
  };
}
