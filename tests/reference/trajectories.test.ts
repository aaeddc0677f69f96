import { describe, expect, test } from "vitest";
import { type AssessmentInput, assess } from "@/lib/engine";
import { expectAccounted, expectRelative, named, type Row, readCases, relativeError } from "./cases";
import { anInput } from "./input";

const rows = readCases("06-trajectories");

/** The row as an assessment file: one measure per window, whose cut is 1 − factor. */
function inputOf({ inputs }: Row): AssessmentInput {
  const windows = inputs.windows as { from: number | string; to: number | string | null; factor: string }[];
  const measures = windows.map(({ factor }, i) => ({ id: `w${i}`, name: `Window ${i}`, cut: 1 - Number(factor), ladder: null, maxDays: null, costs: [] }));
  return anInput(
    {
      population: inputs.population,
      susceptible: inputs.susceptible0,
      exposed: inputs.exposed0,
      infectious: inputs.infectious0,
      removed: inputs.removed0,
      transmission: { given: "rate", value: Number(inputs.beta) },
      infectiousPeriod: 1 / Number(inputs.gamma),
      latentPeriod: inputs.sigma === null ? null : 1 / Number(inputs.sigma),
      infectionFatality: Number(inputs.ifr),
    },
    {
      measures,
      packages: [{ id: "A", name: "Windows", items: windows.map(({ from, to }, i) => ({ measure: `w${i}`, startDay: Number(from), endDay: to === null ? null : Number(to) })) }],
      horizonDays: inputs.horizon,
    },
  );
}

let largestFinal = 0;
let largestState = 0;

describe("piecewise constant transmission", () => {
  test.each(named(rows))("%s", (_, row) => {
    const { inputs, expected } = row;
    const result = assess(inputOf(row));
    const [a] = result.packages;
    expect(a).toBeDefined();
    expectRelative(result.withoutMeasures.thresholdRatio, expected.thresholdRatio, 1e-9, "b");
    expectRelative(result.withoutMeasures.finalDeaths, expected.finalDeathsUnmitigated, 1e-11, "deaths without measures");
    largestFinal = Math.max(largestFinal, relativeError(a!.finalDeaths.asScheduled, Number(expected.finalDeaths)));
    expectRelative(a!.finalDeaths.asScheduled, expected.finalDeaths, 1e-8, "final deaths");
    expect(Math.abs(a!.peak.day - Number(expected.peak.day)), `peak day ${a!.peak.day}`).toBeLessThanOrEqual(1e-4);
    expectRelative(a!.peak.infectious, expected.peak.infectious, 1e-8, "peak");
    for (const { at, factor, b } of expected.effectiveRatiosByWindow as { at: string; factor: string; b: string }[]) {
      const phase = a!.phases.find(({ fromDay }) => fromDay === Number(at));
      expect(phase, `phase from day ${at}`).toBeDefined();
      expectRelative(phase!.factor, factor, 1e-12, "factor");
      expectRelative(phase!.thresholdRatio, b, 1e-9, "b of the phase");
    }
    for (const point of expected.trajectory as Record<"t" | "S" | "E" | "I" | "D", string>[]) {
      const drawn = a!.course.find(({ day }) => day === Number(point.t));
      if (!drawn) continue;
      for (const [value, wanted] of [
        [drawn.susceptible, point.S],
        [drawn.latent, point.E],
        [drawn.infectious, point.I],
        [drawn.cumulativeDeaths, point.D],
      ] as const) {
        const error = Math.abs(value - Number(wanted)) / inputs.population;
        largestState = Math.max(largestState, error);
        expect(error, `day ${point.t}: ${value} against ${wanted}`).toBeLessThanOrEqual(1e-9);
      }
    }
    expect(result.diagnostics.converged).toBe(true);
    expect(result.diagnostics.integratorDifferencePersons).toBeLessThanOrEqual(1e-9 * inputs.population);
  });
});

describe("measures never lifted are charged until E + I stays below 1", () => {
  test.each(named(rows))("%s", (_, row) => {
    const input = inputOf(row);
    // A cut of 0 for ever changes nothing but the days that are charged.
    const nothing = { id: "nothing", name: "Nothing", cut: 0, ladder: null, maxDays: null, costs: [{ payer: "public" as const, perDay: 7 }] };
    const [first] = input.packages;
    const items = [...first!.items, { measure: "nothing", startDay: 0, endDay: null }];
    const found = assess({ ...input, measures: [...input.measures, nothing], packages: [{ ...first!, items }] }).packages[0]!;
    // The row gives the end of the half day in which it happens.
    const end = Number(row.expected.firstStepWithEplusIBelowExtinction);
    expect(found.chargedUntilDay).toBeGreaterThan(end - 0.5);
    expect(found.chargedUntilDay).toBeLessThanOrEqual(end);
    expectRelative(found.cost.total, 7 * found.chargedUntilDay!, 1e-12, "cost");
    expectRelative(found.finalDeaths.asScheduled, row.expected.finalDeaths, 1e-8, "final deaths");
  });
});

test("every row of the file is tested", () => expectAccounted(rows, rows, {}));

test("largest errors over the file", () => {
  console.log(`check 06: largest relative error of final deaths ${largestFinal.toExponential(2)}; of a state, in shares of the population, ${largestState.toExponential(2)}`);
  expect(largestFinal).toBeLessThanOrEqual(1e-8);
});
