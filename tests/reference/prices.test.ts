import { describe, expect, test } from "vitest";
import { costPerDeath, priceComparison } from "@/lib/engine/prices";
import { expectAccounted, expectRelative, named, type Row, readCases } from "./cases";

const rows = readCases("07-health-economics");
const inGroup = (name: string) => rows.filter(({ group }) => group === name);
const dominance = inGroup("ICER and dominance");
const perDeath = inGroup("cost per death averted");

type Option = { name: string; cost: number; effect: number };

describe("who is worth the price: simple and extended dominance, incremental ratios", () => {
  test.each(named(dominance))("%s", (_, { inputs, expected, tolerance }) => {
    // The engine's point of departure, no further measures, costs and averts nothing: the row's first option.
    const [start, ...options] = inputs.options as [Option, ...Option[]];
    const idOf = (name: string) => (name === start.name ? "none" : name);
    const packages = options.map(({ name, cost, effect }) => ({ id: name, cost: cost - start.cost, deathsAverted: effect - start.effect }));
    const frontier = (expected.frontier as string[]).map(idOf);
    for (const given of [packages, packages.toReversed()]) {
      const found = priceComparison(given);
      expect(found.efficient).toEqual(frontier.filter((id) => id !== "none"));
      expect(found.incremental.map(({ from, to }) => [from, to])).toEqual(frontier.slice(1).map((to, i) => [frontier[i], to]));
      for (const [i, { ratio }] of found.incremental.entries()) {
        expectRelative(ratio ?? Number.NaN, expected.ICER[i + 1], 1e-10, "ratio");
        const published = expected.published?.ICER?.[i];
        if (published !== undefined) expect(Math.abs((ratio ?? Number.NaN) - published)).toBeLessThanOrEqual(Number(tolerance.ICER_absolute));
      }
      const dominatedAs = (kind: string) => found.dominated.filter((each) => each.kind === kind).map(({ id }) => id);
      const wanted = (names: string[]) => names.map(idOf).filter((id) => id !== "none").toSorted();
      expect(dominatedAs("simple").toSorted()).toEqual(wanted(expected.simplyDominated));
      expect(dominatedAs("extended").toSorted()).toEqual(wanted(expected.extendedDominated));
    }
  });
});

test.each(named(perDeath))("cost per death averted: %s", (_, { inputs, expected }) => {
  const found = costPerDeath(Number(inputs.incrementalCost), Number(inputs.deathsAverted));
  if (expected.costPerDeathAverted === null) expect(found).toBeNull();
  else expectRelative(found ?? Number.NaN, expected.costPerDeathAverted, 1e-12);
});

test("every row of the file is tested, or left out for a reason", () => {
  const later: Record<string, string> = {
    "net benefit": "the authority's own value per death averted comes with a later version",
    "official discount rates": "facts about guidance; discounting comes with a later version",
    discounting: "costs past one year are discounted by a later version",
    "years of life lost": "ages come with a later version",
    "acceptability curve": "comes with the authority's own value per death averted",
  };
  const leftOut = rows.filter(({ group }) => group in later).map(({ id, group }) => [id, later[group]] as const);
  expectAccounted(rows, [...dominance, ...perDeath] as Row[], Object.fromEntries(leftOut) as Record<string, string>);
});
