import { expect } from "vitest";
import { type AssessmentInput, type AssessmentResult, assess, EngineError } from "@/lib/engine";

/** Refuses with a field and what is allowed, or gives a result that can be believed; says which. */
export function soundOutcome(input: AssessmentInput): "computed" | "refused" {
  let result: AssessmentResult;
  try {
    result = assess(input);
  } catch (error) {
    if (!(error instanceof EngineError)) throw error;
    expect(error.code).toBe("outsideDomain");
    expect(error.faults.length).toBeGreaterThan(0);
    for (const { path, message } of error.faults) expect(`${path}: ${message}`).toMatch(/^[\w.[\]]+: must /);
    return "refused";
  }
  const n = input.outbreak.population;
  const text = JSON.stringify(result, (_, x) => (typeof x === "number" && !Number.isFinite(x) ? "NOT FINITE" : x));
  expect(/.{0,120}NOT FINITE/.exec(text)?.[0] ?? "finite").toBe("finite");
  expect(result.diagnostics.converged).toBe(true);
  expect(result.diagnostics.settledResidual).toBeLessThanOrEqual(1e-12);
  for (const each of [result.withoutMeasures, ...result.packages]) {
    expect(each.finalRemoved).toBeLessThanOrEqual(n * (1 + 1e-9));
    expect(each.peak.infectious).toBeLessThanOrEqual(n * (1 + 1e-9));
  }
  for (const { finalDeaths, uncertainty } of result.packages) {
    const intervals = uncertainty ? Object.values(uncertainty.finalDeaths).flatMap(({ low, median, high }) => [low, median - low, high - median]) : [];
    for (const value of [...Object.values(finalDeaths), ...intervals]) expect(value).toBeGreaterThanOrEqual(0);
    for (const phase of uncertainty?.phases ?? []) {
      for (const chance of [phase.chanceShrinksAtStart, phase.chanceEndsByItself ?? 0]) {
        expect(chance).toBeGreaterThanOrEqual(0);
        expect(chance).toBeLessThanOrEqual(1);
      }
      expect(phase.infectedAtEnd.low).toBeGreaterThanOrEqual(0);
    }
  }
  return "computed";
}
