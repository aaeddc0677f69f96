import type { Draws, Reader } from "./quantities";
import { costScale } from "./quantities";
import type { Plan } from "./measure-effects";
import type { Comparison, Payer } from "./types";

export const PAYERS = ["public", "business", "household"] as const satisfies readonly Payer[];
export type ByPayer = Record<Payer, number>;

type Line = { measure: string; payer: Payer; transfer: boolean; setUp: Reader; perDay: Reader; perResidentDay: Reader };

/** What a package costs in a draw; made once per package. */
export type Tariff = { lines: Line[]; hasTransfers: boolean };

export function makeTariff(plan: Plan, draws: Draws): Tariff {
  const measures = new Map(plan.items.map(({ measure }) => [measure.id, measure]));
  const lines = [...measures.values()].flatMap((measure) =>
    measure.costs.map((cost, index): Line => {
      const name = `cost.${measure.id}.${index}.${cost.payer}`;
      return {
        measure: measure.id,
        payer: cost.payer,
        transfer: cost.transfer ?? false,
        setUp: draws.reader(`${name}.setUp`, cost.setUp ?? 0, costScale),
        perDay: draws.reader(`${name}.perDay`, cost.perDay ?? 0, costScale),
        perResidentDay: draws.reader(`${name}.perResidentDay`, cost.perResidentDay ?? 0, costScale),
      };
    }),
  );
  return { lines, hasTransfers: lines.some(({ transfer }) => transfer) };
}

/**
 * Set-up once per measure + per day × days + per resident per day × N × uptake × days, in the currency's major unit.
 * Transfers from one payer to another are shown apart and are in no total.
 * @param chargedUntilDay day on which measures that are never lifted stop being charged
 */
export function packageCost(plan: Plan, tariff: Tariff, population: number, chargedUntilDay: number, draw: number): { total: number; byPayer: ByPayer; transfers: ByPayer } {
  const byPayer: ByPayer = { public: 0, business: 0, household: 0 };
  const transfers: ByPayer = { public: 0, business: 0, household: 0 };
  for (const line of tariff.lines) {
    let amount = line.setUp(draw);
    for (const item of plan.items) {
      if (item.measure.id !== line.measure) continue;
      const days = Math.max(0, (item.endDay ?? chargedUntilDay) - item.startDay);
      amount += line.perDay(draw) * days + line.perResidentDay(draw) * population * item.uptake(draw) * days;
    }
    (line.transfer ? transfers : byPayer)[line.payer] += amount;
  }
  return { total: byPayer.public + byPayer.business + byPayer.household, byPayer, transfers };
}

/** Cost per death averted; null where none is averted, or so little that the quotient is no number. */
export function costPerDeath(cost: number, deathsAverted: number): number | null {
  const quotient = deathsAverted > 0 ? cost / deathsAverted : Number.NaN;
  return Number.isFinite(quotient) ? quotient : null;
}

/** What one package costs and averts beyond another. */
export type Difference = { cost: number; deathsAverted: number };

/** A package as the price plane sees it. */
export type Priced = { id: string; cost: number; deathsAverted: number };

/**
 * Which packages are worth their price: simple dominance (another averts at least as much for no more), then extended
 * dominance (a mixture of two others does), then incremental ratios along what is left, from "none" on.
 * Ties are broken by id, so that the answer never depends on the order of the input.
 * @param difference what the second package costs and averts beyond the first: where draws exist, medians of paired differences
 * @see Drummond et al. (2015), Methods for the Economic Evaluation of Health Care Programmes, 4th ed., ch. 4
 */
export function priceComparison(packages: readonly Priced[], difference?: (from: string, to: string) => Difference): Omit<Comparison, "pairs"> {
  const none: Priced = { id: "none", cost: 0, deathsAverted: 0 };
  const all = [none, ...packages].sort((a, b) => a.cost - b.cost || b.deathsAverted - a.deathsAverted || (a.id === "none" ? -1 : b.id === "none" ? 1 : a.id < b.id ? -1 : 1));
  const dominated: Comparison["dominated"] = [];
  const left: Priced[] = [];
  for (const each of all) {
    const by = left.filter((other) => other.deathsAverted >= each.deathsAverted).map(({ id }) => id);
    if (by.length > 0) dominated.push({ id: each.id, by, kind: "simple" });
    else left.push(each);
  }
  // The upper hull of averted deaths over cost: ratios must rise along it.
  const hull: Priced[] = [];
  for (const each of left) {
    while (hull.length >= 2 && ratio(hull.at(-2)!, hull.at(-1)!) > ratio(hull.at(-1)!, each)) {
      const out = hull.pop()!;
      dominated.push({ id: out.id, by: [hull.at(-1)!.id, each.id], kind: "extended" });
    }
    hull.push(each);
  }
  const incremental = hull.slice(1).map((to, index) => {
    const from = hull[index]!;
    const { cost, deathsAverted } = difference?.(from.id, to.id) ?? { cost: to.cost - from.cost, deathsAverted: to.deathsAverted - from.deathsAverted };
    return { from: from.id, to: to.id, cost, deathsAverted, ratio: costPerDeath(cost, deathsAverted) };
  });
  return {
    efficient: hull.filter(({ id }) => id !== "none").map(({ id }) => id),
    dominated: dominated.filter(({ id }) => id !== "none").sort((a, b) => (a.id < b.id ? -1 : 1)),
    incremental,
  };
}

const ratio = (from: Priced, to: Priced) => (to.cost - from.cost) / (to.deathsAverted - from.deathsAverted);
