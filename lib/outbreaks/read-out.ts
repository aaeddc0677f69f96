import { doublingTimeOfGrowth, growthRateAt, startState } from "../engine";
import { EngineError } from "../engine/errors";
import type { TransmissionGiven } from "../engine/types";

export type ReadOutInput = {
  population: number;
  infectious: number;
  removed: number;
  exposed: number | null;
  given: TransmissionGiven;
  value: number;
  infectiousPeriodDays: number;
  latentPeriodDays: number | null;
};

export type ReadOut = { thresholdRatio: number; reproductionNumber: number; growthRate: number; doublingDays: number | null; exposed: number };

/** What the central figures of a profile amount to; null where they don't fit together (yet). */
export function readOut(input: ReadOutInput): ReadOut | null {
  const { population, infectious, removed, infectiousPeriodDays, latentPeriodDays } = input;
  if (![population, infectious, removed, input.value, infectiousPeriodDays].every(Number.isFinite) || infectiousPeriodDays <= 0 || (latentPeriodDays !== null && !(latentPeriodDays > 0))) return null;
  const rates = { removalRate: 1 / infectiousPeriodDays, onsetRate: latentPeriodDays === null ? null : 1 / latentPeriodDays };
  try {
    const start = startState(input.given, input.value, rates, { population, infectious, removed }, input.exposed);
    const reproductionNumber = (start.transmissionRate * start.susceptible) / (rates.removalRate * population);
    const growthRate = growthRateAt(reproductionNumber, rates);
    if (!Number.isFinite(reproductionNumber) || reproductionNumber <= 0) return null;
    return {
      thresholdRatio: 1 / reproductionNumber,
      reproductionNumber,
      growthRate,
      doublingDays: growthRate === 0 ? null : doublingTimeOfGrowth(growthRate),
      exposed: start.exposed,
    };
  } catch (error) {
    if (error instanceof EngineError) return null;
    throw error;
  }
}

