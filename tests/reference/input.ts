import type { AssessmentInput, OutbreakInput } from "@/lib/engine";

/** An input with everything certain and no packages; a test names only what matters to it. */
export function anInput(outbreak: Partial<OutbreakInput>, rest: Partial<AssessmentInput> = {}): AssessmentInput {
  return {
    format: "ebbmark.assessment-input/1",
    outbreak: {
      name: "Test illness",
      place: "Test district",
      dayZero: "2027-03-01",
      population: 1_000_000,
      infectious: 10,
      removed: 0,
      transmission: { given: "reproductionNumber", value: 2 },
      infectiousPeriod: 5,
      latentPeriod: null,
      infectionFatality: 0.01,
      currency: "EUR",
      priceYear: 2027,
      ...outbreak,
    },
    measures: [],
    packages: [],
    uncertainty: null,
    ...rest,
  };
}

/** Measures with the given cuts, and one package that holds them all from day 0 for ever. */
export function withCuts(cuts: readonly number[], startDay = 0, endDay: number | null = null): Pick<AssessmentInput, "measures" | "packages"> {
  const measures = cuts.map((cut, index) => ({ id: `m${index}`, name: `Measure ${index}`, cut, ladder: null, maxDays: null, costs: [] }));
  return { measures, packages: [{ id: "A", name: "All", items: measures.map(({ id }) => ({ measure: id, startDay, endDay })) }] };
}
