/** What needs more than one field to refuse: the file's form is `schema.ts`. */
import { EngineError, type Fault } from "./errors";
import { LIMITS } from "./limits";
import { factorFromDayZero, makePlan, pieceFactors } from "./measure-effects";
import { thresholdRatioOf } from "./model";
import { inWords } from "./numeric";
import { outbreakReader } from "./outbreak";
import { central, Draws } from "./quantities";
import { growthRateLimit } from "./transmission";
import type { AssessmentInput } from "./types";

/** Every fault of an input that has the file's form; none where it can be calculated. */
export function domainFaults(input: AssessmentInput): Fault[] {
  const faults = [...peopleFaults(input), ...measureFaults(input), ...packageFaults(input)];
  // The rest runs on inputs that make sense so far.
  return faults.length > 0 ? faults : [...transmissionFaults(input), ...factorFaults(input)];
}

function peopleFaults({ outbreak }: AssessmentInput): Fault[] {
  const faults: Fault[] = [];
  const infectious = central(outbreak.infectious);
  const removed = central(outbreak.removed ?? 0);
  const exposed = outbreak.exposed === undefined ? null : central(outbreak.exposed);
  const { population, latentPeriod } = outbreak;
  if (latentPeriod === null && (exposed ?? 0) > 0) faults.push({ path: "outbreak.exposed", message: "must be 0 or left out where there is no latent stage (latentPeriod null)" });
  if (infectious + (exposed ?? 0) < LIMITS.infectedMin) faults.push({ path: "outbreak.infectious", message: "must be above 0 where nobody is latent: without anybody infected there is no outbreak" });
  if (infectious + removed + (exposed ?? 0) >= population) {
    faults.push({ path: "outbreak.population", message: "must be above infectious + exposed + removed, so that somebody is susceptible" });
  }
  for (const name of ["infectious", "removed", "exposed"] as const) {
    const value = outbreak[name];
    if (typeof value === "object" && value.high > population) {
      faults.push({ path: `outbreak.${name}.high`, message: `must be at most the population ${inWords(population)}` });
    }
  }
  if (outbreak.susceptible !== undefined) {
    const sum = outbreak.susceptible + infectious + removed + (exposed ?? 0);
    if (exposed === null && latentPeriod !== null) faults.push({ path: "outbreak.exposed", message: "must be given where susceptible is given: the four must add up to the population" });
    else if (Math.abs(sum - population) > 1e-9 * population) {
      faults.push({ path: "outbreak.susceptible", message: `must make susceptible + exposed + infectious + removed equal the population ${inWords(population)}; they add up to ${inWords(sum)}` });
    }
    for (const [name, value] of [["exposed", outbreak.exposed], ["infectious", outbreak.infectious], ["removed", outbreak.removed]] as const) {
      if (typeof value === "object") faults.push({ path: `outbreak.${name}`, message: "must be one number where susceptible is given: the four must add up in every draw" });
    }
  }
  return faults;
}

function measureFaults({ measures }: AssessmentInput): Fault[] {
  return measures.flatMap(({ id }, index) =>
    measures.findIndex((other) => other.id === id) < index ? [{ path: `measures[${index}].id`, message: `must be unique; "${id}" is used before` }] : [],
  );
}

function packageFaults({ measures, packages }: AssessmentInput): Fault[] {
  const byId = new Map(measures.map((each) => [each.id, each]));
  return packages.flatMap((each, index) => {
    const at = `packages[${index}]`;
    const faults: Fault[] = [];
    if (packages.findIndex((other) => other.id === each.id) < index) faults.push({ path: `${at}.id`, message: `must be unique; "${each.id}" is used before` });
    each.items.forEach((one, i) => {
      const path = `${at}.items[${i}]`;
      const known = byId.get(one.measure);
      if (!known) faults.push({ path: `${path}.measure`, message: `must be the id of a measure in measures; "${one.measure}" is not` });
      for (let k = 0; k < i; k++) {
        const other = each.items[k]!;
        const together = one.startDay < (other.endDay ?? Number.POSITIVE_INFINITY) && other.startDay < (one.endDay ?? Number.POSITIVE_INFINITY);
        if (!together) continue;
        if (other.measure === one.measure) faults.push({ path, message: `must not overlap items[${k}] of the same measure` });
        else if (known?.ladder != null && byId.get(other.measure)?.ladder === known.ladder) {
          faults.push({ path, message: `must not be in force together with items[${k}]: both are rungs of the ladder "${known.ladder}"` });
        }
      }
    });
    return faults;
  });
}

function transmissionFaults(input: AssessmentInput): Fault[] {
  const { transmission, infectiousPeriod, latentPeriod } = input.outbreak;
  const { given, value } = transmission;
  try {
    const reproductionNumber = 1 / thresholdRatioOf(outbreakReader(input, new Draws(null))(-1));
    if (reproductionNumber > LIMITS.reproductionNumberMax * (1 + 1e-9)) {
      return [{ path: "outbreak.transmission.value", message: `must give a reproduction number of at most ${LIMITS.reproductionNumberMax}; it gives ${inWords(reproductionNumber)}` }];
    }
  } catch (error) {
    if (error instanceof EngineError && error.code === "outsideDomain") return [...error.faults];
    throw error;
  }
  const rates = { removalRate: 1 / central(infectiousPeriod), onsetRate: latentPeriod === null ? null : 1 / central(latentPeriod) };
  const limit = growthRateLimit(rates);
  return given === "growthRate" && typeof value === "object" && value.low <= limit
    ? [{ path: "outbreak.transmission.value.low", message: `must be above ${inWords(limit)} per day, minus the smaller of removal and onset rate` }]
    : [];
}

/** The model has no word for no transmission at all: of several strong measures something must be left. */
function factorFaults({ measures, packages }: AssessmentInput): Fault[] {
  const certain = new Draws(null);
  return packages.flatMap((each, index) => {
    const plan = makePlan(each, measures, certain);
    const least = Math.min(factorFromDayZero(plan, -1), ...pieceFactors(plan, -1, new Float64Array(plan.pieces.length)));
    return least >= LIMITS.factorMin ? [] : [{ path: `packages[${index}].items`, message: `must together leave at least ${LIMITS.factorMin} of transmission; they leave ${least}` }];
  });
}
