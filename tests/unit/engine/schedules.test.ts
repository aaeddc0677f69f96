import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { type AssessmentInput, assess, EngineError } from "@/lib/engine";
import { anInput } from "../../reference/input";

const share = (min: number, max: number) => fc.double({ min, max, noNaN: true });
const lengthOrNull = fc.option(share(0.3, 400), { nil: null });
const scheduled = fc
  .record({
    population: fc.integer({ min: 100, max: 50_000_000 }),
    infectedShare: share(-6, -2.5).map((e) => 10 ** e),
    reproductionNumber: share(0.3, 12),
    infectiousPeriod: share(0.7, 20),
    latentPeriod: fc.option(share(0.3, 15), { nil: null }),
    windows: fc.array(fc.record({ cut: share(-0.5, 0.97), startDay: share(0, 200), length: lengthOrNull }), { minLength: 1, maxLength: 6 }),
  })
  .map(({ population, infectedShare, reproductionNumber, infectiousPeriod, latentPeriod, windows }) =>
    anInput(
      { population, infectious: population * infectedShare, transmission: { given: "reproductionNumber", value: reproductionNumber }, infectiousPeriod, latentPeriod },
      {
        measures: windows.map(({ cut }, i) => ({ id: `m${i}`, name: `M${i}`, cut, ladder: null, maxDays: null, costs: [{ payer: "public", perDay: 1 }] })),
        packages: [{ id: "A", name: "A", items: windows.map(({ startDay, length }, i) => ({ measure: `m${i}`, startDay, endDay: length === null ? null : startDay + length })) }],
        horizonDays: 60,
      },
    ),
  );

describe("random schedules", () => {
  test("the two integrators agree to a thousandth of what is allowed, and nobody is lost", () => {
    fc.assert(
      fc.property(scheduled, (input) => {
        const { diagnostics, packages } = assess(input);
        const [a] = packages;
        const n = input.outbreak.population;
        expect(diagnostics.converged).toBe(true);
        expect(diagnostics.integratorDifferencePersons).toBeLessThanOrEqual(1e-9 * n);
        expect(diagnostics.settledResidual).toBeLessThanOrEqual(1e-13);
        expect(a!.finalRemoved).toBeLessThanOrEqual(n * (1 + 1e-12));
        for (const { day, susceptible, latent, infectious, cumulativeDeaths } of a!.course) {
          const removed = cumulativeDeaths / Number(input.outbreak.infectionFatality);
          expect(Math.abs(susceptible + latent + infectious + removed - n), `day ${day}`).toBeLessThanOrEqual(1e-9 * n);
          expect(infectious).toBeLessThanOrEqual(a!.peak.infectious * (1 + 1e-9));
        }
      }),
      { numRuns: 150 },
    );
  });

  test("phases follow one another, the strongest has the smallest factor, and ratios are b = b₀S₀/(mS)", () => {
    fc.assert(
      fc.property(scheduled, (input) => {
        const { withoutMeasures, packages } = assess(input);
        const { phases, strongestPhase } = packages[0]!;
        expect(phases[0]!.fromDay).toBe(0);
        expect(phases.at(-1)!.toDay).toBeNull();
        expect(phases.slice(1).map(({ fromDay }) => fromDay)).toEqual(phases.slice(0, -1).map(({ toDay }) => toDay));
        expect(phases[strongestPhase]!.factor).toBe(Math.min(...phases.map(({ factor }) => factor)));
        for (const [k, { factor, thresholdRatio, effectiveRatioAtStart, effectiveRatioAtEnd }] of phases.entries()) {
          expect(Math.abs((thresholdRatio * factor) / withoutMeasures.thresholdRatio - 1)).toBeLessThanOrEqual(1e-12);
          expect(effectiveRatioAtEnd).toBeGreaterThanOrEqual(effectiveRatioAtStart * (1 - 1e-12));
          const next = phases[k + 1];
          if (next) expect(Math.abs((next.effectiveRatioAtStart * next.factor) / (effectiveRatioAtEnd * factor) - 1)).toBeLessThanOrEqual(1e-9);
        }
      }),
      { numRuns: 100 },
    );
  });
});

/** A short strong measure, then growth again; and one measure for ever that is charged by the day. */
const secondWave = (endDay: number): AssessmentInput =>
  anInput(
    { population: 100_000, infectious: 20, transmission: { given: "reproductionNumber", value: 2 }, infectiousPeriod: 5 },
    {
      measures: [
        { id: "strong", name: "Strong", cut: 0.9, ladder: null, maxDays: null, costs: [] },
        { id: "ever", name: "For ever", cut: 0.02, ladder: null, maxDays: null, costs: [{ payer: "public", perDay: 10 }] },
      ],
      packages: [{ id: "A", name: "A", items: [{ measure: "strong", startDay: 0, endDay }, { measure: "ever", startDay: 0, endDay: null }] }],
    },
  );

describe("what a schedule leaves behind", () => {
  test("a measure for ever is charged through a second wave, though E + I was below 1 before it", () => {
    const { packages } = assess(secondWave(60));
    const [a] = packages;
    expect(a!.phases[0]!.infectedAtEnd).toBeLessThan(1);
    expect(a!.peak.infectious).toBeGreaterThan(1_000);
    expect(a!.chargedUntilDay).toBeGreaterThan(a!.peak.day);
    expect(a!.cost.total).toBeCloseTo(10 * a!.chargedUntilDay!, 6);
  });
  test("a lift gives the chance that the chains end by themselves, min(1, b)^(E + I); the end of a rung that another follows is one too", () => {
    const [lift, after] = assess(secondWave(60)).packages[0]!.phases;
    expect(lift!.chanceEndsByItself).toBeCloseTo(after!.effectiveRatioAtStart ** lift!.infectedAtEnd, 12);
    expect(after!.chanceEndsByItself).toBeNull();
  });
  test("an outbreak held down for decades doesn't come back from rounding", () => {
    const { packages, diagnostics } = assess(secondWave(20_000));
    expect(packages[0]!.finalDeaths.asScheduled).toBeLessThan(1);
    expect(diagnostics.converged).toBe(true);
  });
  test("ten years of charges at most, with a warning", () => {
    const slow = anInput(
      { population: 1_000_000, infectious: 1_000, transmission: { given: "reproductionNumber", value: 1.01 }, infectiousPeriod: 30 },
      {
        measures: [{ id: "ever", name: "For ever", cut: 0.001, ladder: null, maxDays: null, costs: [{ payer: "household", perResidentDay: 0.01 }] }],
        packages: [{ id: "A", name: "A", items: [{ measure: "ever", uptake: 0.5, startDay: 30, endDay: null }] }],
      },
    );
    const [a] = assess(slow).packages;
    expect(a!.chargedUntilDay).toBe(3650);
    expect(a!.warnings.map(({ code }) => code)).toContain("chargedTenYears");
    expect(a!.cost.byPayer.household).toBeCloseTo(0.01 * 1_000_000 * 0.5 * (3650 - 30), 3);
  });
  test("set-up is charged once for a measure that comes back, and a transfer is shown but not added", () => {
    const input = anInput(
      {},
      {
        measures: [
          {
            id: "m",
            name: "M",
            cut: 0.1,
            ladder: null,
            maxDays: null,
            costs: [
              { payer: "public", setUp: 1000, perDay: 10 },
              { payer: "business", perDay: 5, transfer: true },
            ],
          },
        ],
        packages: [{ id: "A", name: "A", items: [{ measure: "m", startDay: 0, endDay: 10 }, { measure: "m", startDay: 20, endDay: 25.5 }] }],
      },
    );
    const { cost } = assess(input).packages[0]!;
    expect(cost.byPayer).toEqual({ public: 1000 + 10 * 15.5, business: 0, household: 0 });
    expect(cost.total).toBe(1155);
    expect(cost.transfers).toEqual({ public: 0, business: 5 * 15.5, household: 0 });
  });
  test("more draws than minutes allow are refused before they start, with how many are allowed", () => {
    const many = { ...secondWave(20_000), uncertainty: { draws: 1_000_000, seed: 1 } };
    expect(() => assess(many)).toThrow(/uncertainty\.draws: must be at most [\d,]+ for schedules this long/);
  });
  test("periods of minutes beside a schedule of decades are refused, with the field", () => {
    const input = secondWave(36_500);
    const [, slight] = input.measures;
    const packages = [{ id: "A", name: "A", items: [{ measure: "ever", startDay: 0, endDay: 36_500 }] }];
    const stiff = { ...input, outbreak: { ...input.outbreak, infectiousPeriod: 0.01, latentPeriod: 3_000, exposed: 10 }, measures: [slight!], packages };
    expect(() => assess(stiff)).toThrow(EngineError);
    expect(() => assess(stiff)).toThrow(/^outsideDomain\noutbreak\.infectiousPeriod: must be longer/);
  });
});
