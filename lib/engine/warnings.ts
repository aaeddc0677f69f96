/** What a result says beside its numbers. Screens go by the code; the message is for those who read the file. */
import type { Plan } from "./measure-effects";
import type { Parameters } from "./model";
import { central } from "./quantities";
import { TEN_YEARS_DAYS } from "./taylor-kernel";
import { chanceChainsEnd, consistentExposed } from "./transmission";
import type { AssessmentInput, Phase, Warning } from "./types";

/** Settled deaths below this are decided by chance. */
const FEW_DEATHS = 10;
const MANY_INFECTIOUS = 0.05;
const NEAR_THRESHOLD = 0.02;
const percent = (share: number) => `${Number((100 * share).toPrecision(3))} %`;

export function outbreakWarnings({ outbreak }: AssessmentInput, p: Parameters, found: { finalDeaths: number; thresholdRatio: number; refusedDraws: number; peakFound: boolean }): Warning[] {
  const warnings: Warning[] = [];
  if (found.finalDeaths < FEW_DEATHS) {
    const chance = percent(chanceChainsEnd(found.thresholdRatio, p.exposed + p.infectious));
    warnings.push({ code: "chanceDominates", message: `Settled deaths without measures are below 10: chance decides. The chance that the chains end by themselves is ${chance}.` });
  }
  if (p.infectious > MANY_INFECTIOUS * p.population) {
    warnings.push({ code: "manyInfectious", message: "More than 5 % of the population is infectious on day 0: the assumptions about the start are strained.", path: "outbreak.infectious" });
  }
  if (found.refusedDraws > 0) warnings.push({ code: "refusedDraws", message: `${found.refusedDraws} draws lay outside the domain and are left out.` });
  if (!found.peakFound) warnings.push(peakBeyondSearch);
  if (outbreak.exposed !== undefined && p.onsetRate !== null) {
    const given = central(outbreak.exposed);
    const consistent = consistentExposed(p.transmissionRate, { removalRate: p.removalRate, onsetRate: p.onsetRate }, p);
    if (given > 2 * consistent + 1 || given < consistent / 2 - 1) {
      warnings.push({ code: "exposedFarFromGrowth", message: `The number latent (${given}) is far from the ${Number(consistent.toPrecision(3))} that goes with this growth.`, path: "outbreak.exposed" });
    }
  }
  return warnings;
}

export function packageWarnings(plan: Plan, found: { finalDeaths: number; chargedUntilDay: number | null; phases: readonly Phase[]; peakFound: boolean }): Warning[] {
  const warnings: Warning[] = [];
  if (found.finalDeaths < FEW_DEATHS) {
    const lift = found.phases.findLast(({ chanceEndsByItself }) => chanceEndsByItself !== null)?.chanceEndsByItself;
    const chance = lift == null ? "" : ` The chance that the chains end by themselves after the last lift is ${percent(lift)}.`;
    warnings.push({ code: "chanceDominates", message: `Settled deaths are below 10: chance decides.${chance}` });
  }
  if (found.chargedUntilDay !== null && found.chargedUntilDay >= TEN_YEARS_DAYS) {
    warnings.push({ code: "chargedTenYears", message: "Somebody is still infected after ten years; measures that are never lifted are charged for ten years only." });
  }
  if (found.phases.some(({ thresholdRatio }) => Math.abs(thresholdRatio - 1) < NEAR_THRESHOLD)) {
    warnings.push({ code: "nearThreshold", message: "The threshold ratio is within 0.02 of 1: small changes decide whether the outbreak grows." });
  }
  if (!found.peakFound) warnings.push(peakBeyondSearch);
  for (const measure of new Set(plan.items.map((item) => item.measure))) {
    const { maxDays } = measure;
    const over = maxDays !== null && plan.items.some((item) => item.measure === measure && (item.endDay === null || item.endDay - item.startDay > maxDays));
    if (over) warnings.push({ code: "overMaxDays", message: `${measure.name} is in force for longer than its longest lawful duration of ${maxDays} days.`, path: `measures.${measure.id}` });
  }
  return warnings;
}

const peakBeyondSearch: Warning = { code: "peakBeyondSearch", message: "Growth is so slow that the peak lies more than a century away: the peak shown is the last day searched." };
