import { hashInput } from "./canonical";
import { type Check, runPackage, runWithoutMeasures } from "./central-run";
import { makePlan } from "./measure-effects";
import { outbreakReader } from "./outbreak";
import { makeTariff, priceComparison } from "./prices";
import { Draws } from "./quantities";
import { central, parseAssessmentInput } from "./schema";
import type { Parameters } from "./taylor-kernel";
import { growthRateAt } from "./transmission";
import type { AssessmentInput, AssessmentResult, Diagnostics, Warning } from "./types";
import { runDraws } from "./uncertainty";
import { ENGINE_VERSION } from "./version";

export type AssessOptions = {
  /** Share of the draws done, 0..1. */
  onProgress?: (share: number) => void;
  /** Asked between draws; true ends the calculation with EngineError "cancelled". */
  shouldStop?: () => boolean;
};

const HORIZON_DAYS_DEFAULT = 365;
/** Freezing is refused where the two integrators differ by more than this share of the population. */
const INTEGRATORS_AGREE = 1e-6;

/**
 * One calculation over one outbreak and its packages: from the assessment file's input to its result.
 * Same input and seed, same output to the bit.
 * @throws EngineError "outsideDomain" (naming fields and allowed ranges), "notConverged", "cancelled"
 */
export function assess(raw: AssessmentInput, options: AssessOptions = {}): AssessmentResult {
  const input = parseAssessmentInput(raw);
  const draws = new Draws(input.uncertainty);
  const parametersAt = outbreakReader(input, draws);
  const plans = input.packages.map((each) => makePlan(each, input.measures, draws));
  const tariffs = plans.map((plan) => makeTariff(plan, draws));
  const horizonDays = input.horizonDays ?? HORIZON_DAYS_DEFAULT;

  const p = parametersAt(-1);
  const without = runWithoutMeasures(p, horizonDays);
  const packages = plans.map((plan, index) => runPackage(p, plan, tariffs[index]!, without.result, horizonDays));
  const drawn = input.uncertainty ? runDraws(parametersAt, plans, tariffs, input.uncertainty.draws, options) : null;

  const results = packages.map(({ result }, index) => ({ ...result, uncertainty: drawn?.packages[index] ?? null }));
  const priced = results.map((each) => ({
    id: each.id,
    cost: each.uncertainty?.cost.total.median ?? each.cost.total,
    deathsAverted: each.uncertainty?.deathsAverted.asScheduled.median ?? each.deathsAverted.asScheduled,
  }));
  return {
    format: "ebbmark.assessment-result/1",
    engine: ENGINE_VERSION,
    inputHash: hashInput(raw),
    withoutMeasures: { ...without.result, uncertainty: drawn?.without ?? null },
    packages: results,
    comparison: { ...priceComparison(priced), pairs: drawn?.pairs ?? [] },
    diagnostics: diagnose([without.check, ...packages.map(({ check }) => check)], p.population, drawn?.refusedDraws ?? 0),
    warnings: outbreakWarnings(input, p, without.result.finalDeaths, drawn?.refusedDraws ?? 0),
  };
}

function diagnose(checks: readonly Check[], population: number, refusedDraws: number): Diagnostics {
  const integratorDifferencePersons = Math.max(...checks.map((check) => check.integratorDifferencePersons));
  const integratorAllowedPersons = INTEGRATORS_AGREE * population;
  return {
    converged: checks.every(({ converged }) => converged) && integratorDifferencePersons <= integratorAllowedPersons,
    integratorDifferencePersons,
    integratorAllowedPersons,
    settledResidual: Math.max(...checks.map((check) => check.settledResidual)),
    refusedDraws,
  };
}

function outbreakWarnings({ outbreak }: AssessmentInput, p: Parameters, finalDeaths: number, refusedDraws: number): Warning[] {
  const warnings: Warning[] = [];
  if (finalDeaths < 10) warnings.push({ code: "chanceDominates", message: "Settled deaths without measures are below 10: chance decides, and the deterministic figure is no forecast." });
  if (p.infectious > 0.05 * p.population) warnings.push({ code: "manyInfectious", message: "More than 5 % of the population is infectious on day 0: the assumptions about the start are strained.", path: "outbreak.infectious" });
  if (refusedDraws > 0) warnings.push({ code: "refusedDraws", message: `${refusedDraws} draws lay outside the domain and are left out.` });
  if (outbreak.exposed !== undefined && p.onsetRate !== null) {
    const growth = growthRateAt((p.transmissionRate * (p.population - p.removed - p.infectious)) / (p.removalRate * p.population), p as Parameters & { onsetRate: number });
    const consistent = growth <= -p.removalRate ? 0 : (p.infectious * (growth + p.removalRate)) / p.onsetRate;
    const given = central(outbreak.exposed);
    if (given > 2 * consistent + 1 || given < consistent / 2 - 1) {
      warnings.push({ code: "exposedFarFromGrowth", message: `The number latent (${given}) is far from the ${consistent.toPrecision(3)} that goes with this growth.`, path: "outbreak.exposed" });
    }
  }
  return warnings;
}
