import { hashInput } from "./canonical";
import { type Check, runPackage, runWithoutMeasures } from "./central-run";
import { outsideDomain } from "./errors";
import { LIMITS } from "./limits";
import { makePlan, type Plan } from "./measure-effects";
import { inWords } from "./numeric";
import { figuresPerDraw } from "./one-draw";
import { outbreakReader } from "./outbreak";
import { makeTariff, priceComparison } from "./prices";
import { Draws } from "./quantities";
import { parseAssessmentInput } from "./schema";
import type { AssessmentInput, AssessmentResult, Diagnostics } from "./types";
import { type Progress, runDraws } from "./uncertainty";
import { ENGINE_VERSION } from "./version";
import { outbreakWarnings } from "./warnings";

/** Both are asked and told between draws. */
export type AssessOptions = Progress;

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
  const checks = [without.check, ...packages.map(({ check }) => check)];
  refuseHours(input, plans, checks);
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
    comparison: { ...priceComparison(priced, drawn?.difference), pairs: drawn?.pairs ?? [] },
    diagnostics: diagnose(checks, p.population, drawn?.refusedDraws ?? 0),
    warnings: outbreakWarnings(input, p, {
      finalDeaths: without.result.finalDeaths,
      thresholdRatio: without.result.thresholdRatio,
      refusedDraws: drawn?.refusedDraws ?? 0,
      peakFound: without.check.peakFound,
    }),
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

/** The central run shows what a draw costs: more than minutes, or more than memory, is refused before it starts. */
function refuseHours({ uncertainty }: AssessmentInput, plans: readonly Plan[], checks: readonly Check[]): void {
  if (!uncertainty) return;
  const steps = checks.reduce((sum, check) => sum + check.steps, 0);
  const numbers = Math.max(0, ...plans.map(({ pieces }) => figuresPerDraw(pieces.length)));
  const most = Math.floor(Math.min(LIMITS.stepsMax / Math.max(1, steps), LIMITS.numbersMax / Math.max(1, numbers)));
  if (uncertainty.draws > most) {
    throw outsideDomain("uncertainty.draws", `must be at most ${inWords(most)} for schedules this long with periods this short`);
  }
}
