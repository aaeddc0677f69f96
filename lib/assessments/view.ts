import type { Range } from "@/lib/charts/axes";
import { SETTLING_NARROW, SETTLING_WIDE, type SettlingInput, type SettlingModel, settlingCurve } from "@/lib/charts/settling-curve";
import { LADDER_NARROW, LADDER_WIDE, type LadderInput, type LadderPanel, thresholdLadder } from "@/lib/charts/threshold-ladder";
import type { AssessmentInput, AssessmentResult, Quantity } from "@/lib/engine/types";
import { formatPersons } from "@/lib/figures/format";
import { isFew } from "@/lib/figures/round";
import { packageFigures, type SlimResult, withoutCourses, withoutFigures } from "./figures-of";
import { type FindingSentence, finding } from "./finding";
import type { ContextSnapshot, PackageSnapshot } from "./snapshot";

/** Words that charts carry; everything else in them is a number or a name. */
export type ChartWords = { noMeasures: string; asScheduled: string; heldFromDayZero: string; few: string; numberLocale: string };

/** All that a page shows of one result, ready to draw: plain data, so that it can cross to the browser. */
export type AssessmentView = {
  result: SlimResult;
  outbreak: Pick<ContextSnapshot["outbreak"], "name" | "place" | "dayZero" | "currency" | "priceYear" | "populationPersons">;
  packages: PackageSnapshot[];
  measures: { code: string; name: string; shortName: string }[];
  uncertainty: AssessmentInput["uncertainty"];
  finding: FindingSentence[];
  ladder: { wide: LadderPanel[]; narrow: LadderPanel[] };
  curve: { wide: SettlingModel; narrow: SettlingModel };
};

/** Result and context → what is shown. Used for the frozen files and for the working rows alike. */
export function buildView(input: AssessmentInput, full: AssessmentResult, context: ContextSnapshot, words: ChartWords): AssessmentView {
  const result = withoutCourses(full);
  const ladder = ladderInput(result, context);
  const settling = settlingInput(input, full, words);
  const { name, place, dayZero, currency, priceYear, populationPersons } = context.outbreak;
  return {
    result,
    outbreak: { name, place, dayZero, currency, priceYear, populationPersons },
    packages: context.packages,
    measures: context.measures.map(({ code, name: full_, shortName }) => ({ code, name: full_, shortName })),
    uncertainty: input.uncertainty,
    finding: finding(result, input.packages),
    ladder: { wide: thresholdLadder(ladder, LADDER_WIDE), narrow: thresholdLadder(ladder, LADDER_NARROW) },
    curve: { wide: settlingCurve(settling, SETTLING_WIDE), narrow: settlingCurve(settling, SETTLING_NARROW) },
  };
}

function ladderInput(result: SlimResult, { packages, measures }: ContextSnapshot): LadderInput {
  const short = new Map(measures.map(({ code, shortName, name }) => [code, shortName || name]));
  return {
    none: withoutFigures(result.withoutMeasures).thresholdRatio,
    packages: result.packages.map((each) => {
      const own = packages.find(({ letter }) => letter === each.id);
      const figures = packageFigures(each);
      const strongest = each.phases[each.strongestPhase];
      return {
        letter: each.id,
        name: own?.name ?? each.id,
        ratio: figures.thresholdRatio,
        chanceEnough: figures.chanceEnough,
        rungs: each.contributions.flatMap(({ measure, logShare }) => {
          if (logShare === null) return [];
          // The run of this measure that is in force in the strongest phase.
          const item = own?.items.find((line) => line.measureCode === measure && strongest && line.startDay <= strongest.fromDay && (line.endDay ?? Number.POSITIVE_INFINITY) > strongest.fromDay);
          return [{ key: measure, name: short.get(measure) ?? measure, startDay: item?.startDay ?? 0, logShare }];
        }),
      };
    }),
  };
}

const central = (value: Quantity): number => (typeof value === "number" ? value : value.central);

function settlingInput(input: AssessmentInput, full: AssessmentResult, words: ChartWords): SettlingInput {
  const dayZero = full.withoutMeasures.course[0];
  const without = withoutFigures(full.withoutMeasures);
  const persons = ({ mid }: Range) => (isFew(mid) ? words.few : formatPersons(mid, words.numberLocale));
  return {
    start: {
      infected: (dayZero?.latent ?? 0) + (dayZero?.infectious ?? central(input.outbreak.infectious)),
      susceptible: dayZero?.susceptible ?? input.outbreak.population,
      fatality: central(input.outbreak.infectionFatality),
    },
    none: { ratio: without.thresholdRatio, deaths: without.finalDeaths, text: [persons(without.finalDeaths), words.noMeasures] },
    packages: full.packages.map((each) => {
      const figures = packageFigures(each);
      const { heldFromDayZero: held, asScheduled: scheduled } = figures.finalDeaths;
      return {
        letter: each.id,
        ratio: heldRatio(input, each.id, each.phases[each.strongestPhase]?.factor ?? 1, figures.thresholdRatio, without.thresholdRatio.mid),
        held,
        scheduled,
        heldText: [persons(held), words.heldFromDayZero],
        scheduledText: [persons(scheduled), words.asScheduled],
      };
    }),
  };
}

/**
 * Ratio of a package with all its measures together, of a ladder the strongest rung: where "held from day 0" lies. It
 * is the strongest phase's own where that phase holds them all.
 */
function heldRatio(input: AssessmentInput, id: string, strongestFactor: number, strongest: Range, without: number): Range {
  const best = new Map<string, number>();
  for (const item of input.packages.find((each) => each.id === id)?.items ?? []) {
    const measure = input.measures.find((each) => each.id === item.measure);
    if (!measure) continue;
    const factor = 1 - central(item.uptake ?? 1) * central(measure.cut);
    const key = measure.ladder === null ? `measure ${measure.id}` : `ladder ${measure.ladder}`;
    best.set(key, Math.min(best.get(key) ?? Number.POSITIVE_INFINITY, factor));
  }
  const factor = [...best.values()].reduce((product, each) => product * each, 1);
  if (Math.abs(factor / strongestFactor - 1) < 1e-9) return strongest;
  return { mid: without / factor, low: null, high: null };
}
