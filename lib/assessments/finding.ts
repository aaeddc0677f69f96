import type { AssessmentInput } from "@/lib/engine/types";
import { isMeasurable } from "@/lib/figures/round";
import { endsOf, enoughState, packageFigures, type PackageFigures, type SlimResult, withoutFigures } from "./figures-of";
import type { Range } from "@/lib/charts/axes";

/** One sentence of the finding: a message key, and what stands in it. Numbers are unrounded; messages round. */
export type FindingSentence =
  | { key: "diesOutAnyway"; reproductionNumber: Range; ratio: Range }
  | { key: "onlyEnough" | "enough"; letter: string; reproductionNumber: Range; ratio: Range; held: boolean }
  | { key: "severalEnough"; letters: string[]; held: boolean }
  | { key: "uncertainEnough"; letter: string; chance: number; reproductionNumber: Range; ratio: Range }
  | { key: "noneEnough"; letter: string; single: boolean; reproductionNumber: Range; ratio: Range; furtherCut: number }
  | { key: "afterLift"; letter: string; endDay: number; susceptibleShare: number; outcome: "averts" | "worse" | "noDifference"; deaths: Range }
  | { key: "avertsMost"; letter: string; averted: Range; over: { letter: string; chance: number } | null }
  | { key: "avertAlike"; letter: string; other: string; averted: Range; otherAverted: Range; chance: number; same: boolean }
  | { key: "avertsOnly"; letter: string; averted: Range; single: boolean }
  | { key: "noneAverts"; single: boolean }
  | { key: "worse"; letter: string; more: Range }
  /** `more`: what the first costs beyond the second, the median of paired differences. */
  | { key: "costs"; costs: { letter: string; total: Range }[]; more: number | null };

type Judged = { letter: string; figures: PackageFigures; endDay: number | null };

/** Ahead in fewer paired draws than this, the better of two packages isn't told apart from the other. */
const CLEARLY_AHEAD = 0.6;
/** Neither is ahead in more draws than this: the two do the same. */
const SAME = 0.01;
/** Of packages that are enough and end, this many are followed to what comes after their lift. */
const FOLLOWED_MAX = 2;

const inverse = ({ mid, low, high }: Range): Range => ({ mid: 1 / mid, low: high === null ? null : 1 / high, high: low === null ? null : 1 / low });
const negated = ({ mid, low, high }: Range): Range => ({ mid: -mid, low: high === null ? null : -high, high: low === null ? null : -low });

/**
 * What the assessment found, in sentences: what is enough and what follows its lift, what averts most, what it costs.
 * @param packages of the input, for the days on which they end
 */
export function finding(result: SlimResult, packages: AssessmentInput["packages"]): FindingSentence[] {
  const judged = result.packages.map((each): Judged => {
    const ends = packages.find(({ id }) => id === each.id)?.items.map(({ endDay }) => endDay) ?? [];
    return {
      letter: each.id,
      figures: packageFigures(each),
      endDay: ends.length === 0 || ends.includes(null) ? null : Math.max(...(ends as number[])),
    };
  });
  if (judged.length === 0) return [];
  return [...enoughSentences(result, judged), ...avertedSentences(result, judged)];
}

function enoughSentences(result: SlimResult, judged: Judged[]): FindingSentence[] {
  const without = withoutFigures(result.withoutMeasures);
  if (enoughState(without.thresholdRatio) === "enough") {
    return [{ key: "diesOutAnyway", reproductionNumber: without.reproductionNumber, ratio: without.thresholdRatio }];
  }
  const enough = judged.filter(({ figures }) => enoughState(figures.thresholdRatio) === "enough");
  const [first] = enough;
  if (first && enough.length === 1) {
    const ratio = first.figures.thresholdRatio;
    const key = judged.length > 1 ? ("onlyEnough" as const) : ("enough" as const);
    return [{ key, letter: first.letter, reproductionNumber: inverse(ratio), ratio, held: first.endDay !== null }, ...lifts(enough)];
  }
  if (first) return [{ key: "severalEnough", letters: enough.map(({ letter }) => letter), held: enough.some(({ endDay }) => endDay !== null) }, ...lifts(enough)];

  const closest = judged.reduce((best, each) => (each.figures.thresholdRatio.mid > best.figures.thresholdRatio.mid ? each : best));
  const { thresholdRatio: ratio, chanceEnough } = closest.figures;
  const common = { letter: closest.letter, reproductionNumber: inverse(ratio), ratio };
  if (enoughState(ratio) !== "notEnough" && chanceEnough !== null) {
    const likely = enoughState(ratio) === "likely" ? lifts([closest]) : [];
    return [{ key: "uncertainEnough", ...common, chance: chanceEnough }, ...likely];
  }
  return [{ key: "noneEnough", ...common, single: judged.length === 1, furtherCut: 1 - ratio.mid }];
}

function lifts(enough: Judged[]): FindingSentence[] {
  return enough
    .filter(({ endDay, figures }) => endDay !== null && figures.susceptibleShareAtLift !== null)
    .slice(0, FOLLOWED_MAX)
    .map(({ letter, figures, endDay }) => {
      const averted = figures.deathsAverted.asScheduled;
      const outcome = !isMeasurable(averted.mid, endsOf(averted)) ? "noDifference" : averted.mid > 0 ? "averts" : "worse";
      return {
        key: "afterLift",
        letter,
        endDay: endDay ?? 0,
        susceptibleShare: figures.susceptibleShareAtLift?.mid ?? 0,
        outcome,
        deaths: outcome === "worse" ? negated(averted) : averted,
      };
    });
}

function avertedSentences(result: SlimResult, judged: Judged[]): FindingSentence[] {
  const measurable = judged.filter(({ figures: { deathsAverted } }) => isMeasurable(deathsAverted.asScheduled.mid, endsOf(deathsAverted.asScheduled)));
  const worse = measurable.filter(({ figures }) => figures.deathsAverted.asScheduled.mid < 0);
  const better = measurable
    .filter(({ figures }) => figures.deathsAverted.asScheduled.mid > 0)
    .sort((a, b) => b.figures.deathsAverted.asScheduled.mid - a.figures.deathsAverted.asScheduled.mid);
  const sentences: FindingSentence[] = worse.map(({ letter, figures }) => ({ key: "worse", letter, more: negated(figures.deathsAverted.asScheduled) }));
  const [best, second] = better;
  const single = judged.length === 1;
  if (!best) return [...sentences, ...(measurable.length === 0 ? [{ key: "noneAverts" as const, single }] : [])];
  const averted = best.figures.deathsAverted.asScheduled;
  if (!second) return [{ key: "avertsOnly", letter: best.letter, averted, single }, ...sentences, costs([best], result.comparison)];

  const ahead = (one: string, other: string) => result.comparison.pairs.find(({ a, b }) => a === one && b === other)?.chanceAvertsMore ?? null;
  const chance = ahead(best.letter, second.letter);
  const same = chance !== null && Math.max(chance, ahead(second.letter, best.letter) ?? chance) < SAME;
  return [
    chance !== null && chance <= CLEARLY_AHEAD
      ? { key: "avertAlike", letter: best.letter, other: second.letter, averted, otherAverted: second.figures.deathsAverted.asScheduled, chance, same }
      : { key: "avertsMost", letter: best.letter, averted, over: chance === null ? null : { letter: second.letter, chance } },
    ...sentences,
    costs([best, second], result.comparison),
  ];
}

function costs(named: Judged[], { incremental }: SlimResult["comparison"]): FindingSentence {
  const [first, second] = named;
  const step = incremental.find(({ from, to }) => to === first?.letter && from === second?.letter);
  return { key: "costs", costs: named.map(({ letter, figures }) => ({ letter, total: figures.cost.total })), more: step?.cost ?? null };
}
