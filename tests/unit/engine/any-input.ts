import fc from "fast-check";
import type { AssessmentInput, MeasureInput, PackageInput, Payer, Quantity } from "@/lib/engine";

/**
 * Inputs from all over the domain, its edges more often than real life has them: almost nothing susceptible, cuts that
 * leave a trillionth, periods of minutes, windows of decades, ratios a billionth from 1. Many are refused; that is meant.
 */
const between = (min: number, max: number) => fc.double({ min, max, noNaN: true });
const magnitude = (min: number, max: number) => between(min, max).map((e) => 10 ** e);
const mostly = <T>(usual: fc.Arbitrary<T>, rare: fc.Arbitrary<T>, weight = 9) => fc.oneof({ weight, arbitrary: usual }, { weight: 1, arbitrary: rare });

const quantityAround = (value: fc.Arbitrary<number>, min: number, max: number): fc.Arbitrary<Quantity> =>
  fc.tuple(value, between(0, 0.5), between(0, 1), fc.boolean()).map(([central, down, up, certain]) =>
    certain ? central : { low: Math.max(min, Math.min(central, central - Math.abs(central) * down)), central, high: Math.min(max, Math.max(central, central + Math.abs(central) * up)) },
  );

const cut = quantityAround(fc.oneof({ weight: 6, arbitrary: between(0, 0.95) }, { weight: 1, arbitrary: between(-0.99, 0) }, { weight: 1, arbitrary: magnitude(-12, -1).map((rest) => 1 - rest) }), -1, 1 - 1e-13);
const cost = quantityAround(magnitude(-4, 6), 0, 1e15);
const measures = fc
  .array(fc.record({ cut, rung: mostly(fc.constant(false), fc.constant(true), 5), costs: fc.array(fc.record({ payer: fc.constantFrom<Payer>("public", "business", "household"), setUp: cost, perDay: cost, perResidentDay: cost, transfer: fc.boolean() }), { maxLength: 2 }) }), { maxLength: 6 })
  .map((list) => list.map(({ rung, ...rest }, i): MeasureInput => ({ id: `m${i}`, name: `M${i}`, ladder: rung ? "ladder" : null, maxDays: null, ...rest })));
const item = fc.record({
  taken: fc.boolean(),
  uptake: quantityAround(between(0, 1), 0, 1),
  startDay: mostly(between(0, 200), fc.oneof(fc.constant(0), magnitude(0, 4.5)), 2),
  length: fc.option(mostly(magnitude(-1, 2.5), magnitude(2, 4.5)), { nil: null }),
});
const packagesOf = (list: MeasureInput[]): fc.Arbitrary<PackageInput[]> =>
  fc.array(fc.tuple(...list.map(() => item)), { maxLength: 3 }).map((packages) =>
    packages.map((items, k) => ({
      id: `P${k}`,
      name: `P${k}`,
      items: items.flatMap(({ taken, uptake, startDay, length }, i) => (taken ? [{ measure: `m${i}`, uptake, startDay, endDay: length === null ? null : Math.min(36_500, startDay + length) }] : [])),
    })),
  );

const days = (usual: fc.Arbitrary<number>) => quantityAround(mostly(usual, magnitude(-2, 3.5)), 0.01, 3650);
const reproductionNumber = fc.oneof({ weight: 6, arbitrary: magnitude(-0.7, 0.9) }, { weight: 2, arbitrary: fc.tuple(magnitude(-10, -1), fc.boolean()).map(([d, above]) => (above ? 1 + d : 1 - d)) }, { weight: 1, arbitrary: magnitude(0, 2) });
const transmission = fc.oneof(
  fc.record({ given: fc.constantFrom("reproductionNumber" as const, "effectiveReproductionNumber" as const), value: quantityAround(reproductionNumber, 1e-6, 100) }),
  fc.record({ given: fc.constant("rate" as const), value: quantityAround(magnitude(-1.5, 1), 1e-6, 1e4) }),
  fc.record({ given: fc.constant("growthRate" as const), value: quantityAround(between(-0.1, 0.5), -1e4, 1e4) }),
  fc.record({ given: fc.constant("doublingTime" as const), value: quantityAround(magnitude(-0.5, 2), 0.01, 3650) }),
);

export const anyInput: fc.Arbitrary<AssessmentInput> = measures.chain((list) =>
  fc
    .record({
      population: magnitude(0, 10),
      infectedShare: mostly(magnitude(-7, -2), magnitude(-9, -0.05), 5),
      removedShare: fc.oneof(fc.constant(0), between(0, 0.95)),
      transmission,
      infectiousPeriod: days(magnitude(0, 1.3)),
      latentPeriod: fc.option(days(magnitude(-0.3, 1)), { nil: null }),
      infectionFatality: quantityAround(magnitude(-4, 0), 0, 1),
      packages: packagesOf(list),
      seed: fc.nat(),
      horizonDays: fc.constantFrom(1, 30, 365),
      drawn: fc.boolean(),
    })
    .map(({ population, infectedShare, removedShare, packages, seed, horizonDays, drawn, ...outbreak }) => ({
      format: "ebbmark.assessment-input/1",
      outbreak: { name: "Any", place: "Anywhere", dayZero: "2027-03-01", currency: "EUR", priceYear: 2027, population, infectious: population * infectedShare, removed: population * removedShare, ...outbreak },
      measures: list,
      packages,
      horizonDays,
      uncertainty: drawn ? { draws: 100, seed } : null,
    })),
);
