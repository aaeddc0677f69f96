import { DomainError } from "@/lib/errors";
import { dayOf } from "@/lib/packages/days";
import type { EditAssessmentInput, EditedItem } from "./schema";
import type { SourcePackage, Sources } from "./to-input";

type Item = SourcePackage["items"][number];

/** Per cent to share, without the digits that dividing a decimal leaves behind. */
const share = (percent: number) => Number((percent / 100).toPrecision(15));

/** Lines as edited on the lines as saved. A line that was saved meanwhile by somebody else makes it a conflict. */
function editedItem(saved: Item | undefined, edited: EditedItem, dayZero: string, shiftDays: number): Item {
  if (!saved || saved.measureId !== edited.measureId || edited.from === undefined) throw new DomainError("conflict");
  return {
    measureId: saved.measureId,
    uptake: edited.uptakePercent === undefined ? saved.uptake : share(edited.uptakePercent),
    startDay: dayOf(dayZero, edited.from) + shiftDays,
    endDay: edited.to === undefined ? null : dayOf(dayZero, edited.to) + 1 + shiftDays,
  };
}

/**
 * Sources with what was changed beside the result: chosen packages, draws, seed, horizon, uptake and dates.
 * @param all every package of the outbreak
 * @throws DomainError "conflict" where a package was changed by somebody else meanwhile
 */
export function applyEdit(sources: Omit<Sources, "packages" | "settings">, all: readonly SourcePackage[], edit: EditAssessmentInput): Sources {
  if (edit.dayZero !== sources.outbreak.dayZero) throw new DomainError("conflict");
  const packages = edit.packageLetters.map((letter) => {
    const saved = all.find((each) => each.letter === letter);
    if (!saved) throw new DomainError("conflict", { letter });
    const edited = edit.packages.find((each) => each.letter === letter);
    if (!edited) return saved;
    if (edited.version !== saved.version || edited.items.length !== saved.items.length) throw new DomainError("conflict", { letter });
    return { ...saved, items: edited.items.map((item, index) => editedItem(saved.items[index], item, sources.outbreak.dayZero, edited.shiftDays)) };
  });
  return { ...sources, packages, settings: { draws: edit.draws, seed: edit.seed, horizonDays: edit.horizonDays } };
}
