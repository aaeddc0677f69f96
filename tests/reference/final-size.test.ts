import { describe, expect, test } from "vitest";
import { assess, otherFixedPoint, settledState, stabilitySlope } from "@/lib/engine";
import { expectAccounted, expectRelative, named, type Row, readCases, relativeError } from "./cases";
import { anInput } from "./input";

const rows = readCases("01-final-size");
const inGroup = (test: (group: string) => boolean) => rows.filter(({ group }) => test(group));

/** 1 − b and a − 1 from the row's own decimals: as doubles, a and b have lost them near the threshold. */
function marginOf(b: string): { thresholdRatio: number; margin: number } {
  const near = /^1([+-])(\d.*e-\d+)$/.exec(b);
  if (near) return { thresholdRatio: Number(near[1] === "-" ? 1 - Number(near[2]) : 1 + Number(near[2])), margin: near[1] === "-" ? Number(near[2]) : -Number(near[2]) };
  const decimal = /^(\d)\.(\d+)$/.exec(b);
  if (!decimal) return { thresholdRatio: Number(b), margin: 1 - Number(b) };
  const scale = 10n ** BigInt(decimal[2]!.length);
  const units = scale - (BigInt(decimal[1]!) * scale + BigInt(decimal[2]!));
  return { thresholdRatio: Number(b), margin: Number(units) / Number(scale) };
}
function excessOf(a: string): number {
  const sum = /^1\+(.*)$/.exec(a);
  if (sum) return Number(sum[1]);
  const decimal = /^1\.(\d+)$/.exec(a);
  return decimal ? Number(BigInt(decimal[1]!)) / 10 ** decimal[1]!.length : Number(a) - 1;
}

const tables = inGroup((group) => group === "a=1 table by R0" || group === "published roundings");
const roots = inGroup((group) => group.startsWith("roots") || group.startsWith("near threshold"));
const people = inGroup((group) => group === "people");
let largest = 0;
const note = (actual: number, expected: string) => {
  const error = relativeError(actual, Number(expected));
  if (Number(expected) !== 0) largest = Math.max(largest, error);
  return error;
};

describe("final size by reproduction number", () => {
  test.each(named(tables))("%s", (_, { inputs, expected, tolerance }) => {
    const r = Number(inputs.R0);
    // 1 − 1/R = (R − 1)/R, with R − 1 from the decimals.
    const margin = -marginOf(inputs.R0).margin / r;
    const solved = settledState({ excess: 0, thresholdRatio: 1 / r, margin });
    expect(solved.outcome).toBe("converged");
    const attack = solved.value / r;
    if (tolerance.absolute) {
      expect(Math.abs(attack - Number(expected.attackRate_z))).toBeLessThanOrEqual(Number(tolerance.absolute));
      return;
    }
    expect(note(solved.value, expected.uStar)).toBeLessThanOrEqual(1e-13);
    expectRelative(attack, expected.attackRate_z, 1e-13, "attack rate");
    expectRelative(Math.exp(-solved.value), expected.Sinf_over_S0, 1e-12, "left susceptible");
    expect(stabilitySlope(1 / r, solved.value)).toBeLessThan(0);
    expectRelative(stabilitySlope(1 / r, solved.value), expected.fprime_at_uStar, 1e-12, "slope");
    expect(otherFixedPoint({ excess: 0, thresholdRatio: 1 / r, margin }).value).toBe(0);
  });
});

describe("both fixed points", () => {
  test.each(named(roots))("%s", (_, { inputs, expected }) => {
    const given = { excess: excessOf(inputs.a), ...marginOf(inputs.b) };
    const stable = settledState(given);
    const other = otherFixedPoint(given);
    expect([stable.outcome, other.outcome]).toEqual(["converged", "converged"]);
    if (Number(expected.uStar) === 0) expect(stable.value).toBe(0);
    else expect(note(stable.value, expected.uStar), `u* ${stable.value}`).toBeLessThanOrEqual(1e-13);
    if (expected.otherRoot === undefined) return;
    if (Number(expected.otherRoot) === 0) expect(other.value === 0).toBe(true);
    else expectRelative(other.value, expected.otherRoot, 1e-13, "other root");
    if (expected.stability === "stable") {
      expect(stabilitySlope(given.thresholdRatio, stable.value)).toBeLessThanOrEqual(0);
      expect(stabilitySlope(given.thresholdRatio, other.value)).toBeGreaterThanOrEqual(0);
    }
  });
});

describe("people, through an assessment", () => {
  test.each(named(people))("%s", (_, { inputs, expected }) => {
    const result = assess(
      anInput({
        population: Number(inputs.population),
        susceptible: Number(inputs.susceptible0),
        infectious: Number(inputs.infectious0),
        removed: Number(inputs.removed0),
        transmission: { given: "rate", value: Number(inputs.beta) },
        infectiousPeriod: 1 / Number(inputs.gamma),
        infectionFatality: Number(inputs.ifr),
      }),
    ).withoutMeasures;
    expectRelative(result.thresholdRatio, expected.b, 1e-11, "b");
    expectRelative(result.reproductionNumber, expected.R, 1e-11, "R");
    const removed = result.finalRemoved - Number(inputs.removed0);
    expect(note(removed, expected.removedFromDay0)).toBeLessThanOrEqual(1e-11);
    expectRelative(result.finalDeaths, expected.finalDeaths, 1e-11, "deaths");
  });
});

test("every row of the file is tested", () => expectAccounted(rows, [...tables, ...roots, ...people] as Row[], {}));

test("largest relative error over the file", () => {
  console.log(`check 01: largest relative error ${largest.toExponential(2)}`);
  expect(largest).toBeLessThanOrEqual(1e-11);
});
