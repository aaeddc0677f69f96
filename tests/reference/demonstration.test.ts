import { readFileSync } from "node:fs";
import { describe, expect, test } from "vitest";
import { type AssessmentInput, assess } from "@/lib/engine";
import { relativeError } from "./cases";

const input = JSON.parse(readFileSync(new URL("../../db/demo/kelmaren.json", import.meta.url), "utf8")) as AssessmentInput;

/** Central run of the invented demonstration by an independent reference (two programs agreed to seven digits). */
const WANTED = {
  none: { thresholdRatio: 0.476316, asScheduled: 2032.3289, peak: [80.608, 46477.85] },
  A: { thresholdRatio: 0.71612, asScheduled: 1557.3189, heldToEnd: 1258.5867, heldFromDayZero: 1257.9142, peak: [152.6594, 12378.82] },
  B: { thresholdRatio: 0.893843, asScheduled: 1353.1074, heldToEnd: 1257.0312, heldFromDayZero: 511.2856, peak: [98.9456, 25644.98] },
  C: { thresholdRatio: 1.39485, asScheduled: 2030.6695, heldToEnd: 5.2683, heldFromDayZero: 2.2931, peak: [173.6292, 46174.47] },
} as const;
/** With nobody latent on day 0, as the figures were first drawn. */
const NOBODY_LATENT = { none: 2032.2466, A: 1610.3143, B: 1453.0258, C: 2031.2207 };

/** Half a unit of the last digit given. */
const agrees = (value: number, digits: number) => {
  const decimals = String(digits).split(".")[1]?.length ?? 0;
  expect(Math.abs(value - digits), `${value} against ${digits}`).toBeLessThanOrEqual(0.5 * 10 ** -decimals + 1e-12);
};

describe("the demonstration, central run", () => {
  const result = assess({ ...input, uncertainty: null });
  test("no further measures", () => {
    agrees(result.withoutMeasures.thresholdRatio, WANTED.none.thresholdRatio);
    agrees(result.withoutMeasures.finalDeaths, WANTED.none.asScheduled);
    agrees(result.withoutMeasures.peak.day, WANTED.none.peak[0]);
    agrees(result.withoutMeasures.peak.infectious, WANTED.none.peak[1]);
  });
  test.each(["A", "B", "C"] as const)("package %s", (id) => {
    const found = result.packages.find((each) => each.id === id)!;
    const wanted = WANTED[id];
    agrees(found.thresholdRatio, wanted.thresholdRatio);
    agrees(found.finalDeaths.asScheduled, wanted.asScheduled);
    agrees(found.finalDeaths.heldToEnd, wanted.heldToEnd);
    agrees(found.finalDeaths.heldFromDayZero, wanted.heldFromDayZero);
    agrees(found.peak.day, wanted.peak[0]);
    agrees(found.peak.infectious, wanted.peak[1]);
  });
  test("with nobody latent on day 0", () => {
    const { withoutMeasures, packages } = assess({ ...input, outbreak: { ...input.outbreak, exposed: 0 }, uncertainty: null });
    agrees(withoutMeasures.finalDeaths, NOBODY_LATENT.none);
    for (const id of ["A", "B", "C"] as const) agrees(packages.find((each) => each.id === id)!.finalDeaths.asScheduled, NOBODY_LATENT[id]);
  });
});

describe("the demonstration, draws (medians of an independent program with 2,000 draws of its own, nobody latent)", () => {
  const result = assess({ ...input, outbreak: { ...input.outbreak, exposed: 0 } });
  // Two samples of 2,000 differ by Monte-Carlo error and three-figure rounding: 3 % of a median, 6 % of an end.
  test.each([
    ["A", 1670, 1090, 2560],
    ["B", 1580, 1020, 2450],
    ["C", 2030, 1320, 3120],
  ] as const)("final deaths of %s", (id, median, low, high) => {
    const { asScheduled } = result.packages.find((each) => each.id === id)!.uncertainty!.finalDeaths;
    expect(relativeError(asScheduled.median, median)).toBeLessThanOrEqual(0.03);
    expect(relativeError(asScheduled.low, low)).toBeLessThanOrEqual(0.06);
    expect(relativeError(asScheduled.high, high)).toBeLessThanOrEqual(0.06);
  });
  test("what it teaches: only C is enough, and lifted after ten weeks it saves almost nobody", () => {
    const [a, b, c] = result.packages;
    expect([a!.enough, b!.enough, c!.enough]).toEqual([false, false, true]);
    expect(c!.uncertainty!.deathsAverted.asScheduled.median).toBeLessThan(10);
    expect(b!.uncertainty!.deathsAverted.asScheduled.median).toBeGreaterThan(300);
    expect(result.comparison.dominated.map(({ id }) => id)).toContain("C");
  });
});
