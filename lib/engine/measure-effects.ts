import type { Draws, Reader } from "./quantities";
import { shareScale } from "./quantities";
import type { AssessmentInput, MeasureInput, PackageInput } from "./types";
import { piecesOf, strongestOf, type Piece } from "./windows";

/** A package made ready to run: its pieces, and per item the factor 1 − uptake × cut on β. */
export type Plan = {
  id: string;
  items: { measure: MeasureInput; startDay: number; endDay: number | null; cut: Reader; uptake: Reader }[];
  pieces: Piece[];
  starts: number[];
  /** Index of the piece with the smallest central factor. */
  strongest: number;
  /** Items that make up "held from day 0": each measure once, of a ladder the rung with the smallest central factor. */
  fromDayZero: number[];
  /** Some item has no end. */
  neverLifted: boolean;
  /** There are items, and every one has an end. */
  endsWithoutMeasures: boolean;
};

/** Factor of one item on β: m = 1 − uptake × cut. */
export const itemFactor = (plan: Plan, item: number, draw: number): number => {
  const { cut, uptake } = plan.items[item]!;
  return 1 - uptake(draw) * cut(draw);
};

const productOver = (plan: Plan, items: readonly number[], draw: number) =>
  items.reduce((product, item) => product * itemFactor(plan, item, draw), 1);

/** Factors of a plan's pieces in one draw, written into `into`. */
export function pieceFactors(plan: Plan, draw: number, into: Float64Array): Float64Array {
  for (const [k, piece] of plan.pieces.entries()) into[k] = productOver(plan, piece.items, draw);
  return into;
}

/** Factor with every measure of the package in force together, for ever. */
export const factorFromDayZero = (plan: Plan, draw: number): number => productOver(plan, plan.fromDayZero, draw);

export function makePlan(input: PackageInput, measures: AssessmentInput["measures"], draws: Draws): Plan {
  const byId = new Map(measures.map((measure) => [measure.id, measure]));
  const items = input.items.map((item) => {
    const measure = byId.get(item.measure)!;
    return {
      measure,
      startDay: item.startDay,
      endDay: item.endDay,
      cut: draws.reader(`cut.${measure.id}`, measure.cut, () => "logOfRest"),
      // One measure's uptake rises and falls together in all packages: they are compared on the same draws.
      uptake: draws.reader(`uptake.${measure.id}`, item.uptake ?? 1, shareScale),
    };
  });
  const pieces = piecesOf(input.items);
  const neverLifted = items.some(({ endDay }) => endDay === null);
  const plan: Plan = {
    id: input.id,
    items,
    pieces,
    starts: pieces.map(({ fromDay }) => fromDay),
    strongest: 0,
    fromDayZero: [],
    neverLifted,
    endsWithoutMeasures: items.length > 0 && !neverLifted,
  };
  plan.strongest = strongestOf(pieceFactors(plan, -1, new Float64Array(pieces.length)));
  plan.fromDayZero = strongestRungs(plan);
  return plan;
}

function strongestRungs(plan: Plan): number[] {
  const best = new Map<string, number>();
  plan.items.forEach(({ measure }, index) => {
    const key = measure.ladder === null ? `measure ${measure.id}` : `ladder ${measure.ladder}`;
    const held = best.get(key);
    if (held === undefined || itemFactor(plan, index, -1) < itemFactor(plan, held, -1)) best.set(key, index);
  });
  return [...best.values()];
}
