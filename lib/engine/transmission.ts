import { outsideDomain } from "./errors";
import { inWords } from "./numeric";
import type { TransmissionGiven } from "./types";

/** γ and σ, per day; σ is null where there is no latent stage. */
export type Rates = { removalRate: number; onsetRate: number | null };

/**
 * Reproduction number at an exponential growth rate.
 * R = 1 + r/γ, with a latent stage R = (1 + r/σ)(1 + r/γ).
 * @param growthRate per day, > −min(σ, γ)
 * @see Wallinga & Lipsitch (2007), Proc. R. Soc. B 274:599
 */
export function reproductionNumberAtGrowth(growthRate: number, { removalRate, onsetRate }: Rates): number {
  return (1 + growthRate / removalRate) * (onsetRate === null ? 1 : 1 + growthRate / onsetRate);
}

/** Inverse of `reproductionNumberAtGrowth`: the dominant growth rate, per day. @param reproductionNumber ≥ 0 */
export function growthRateAt(reproductionNumber: number, { removalRate: g, onsetRate: s }: Rates): number {
  if (s === null) return g * (reproductionNumber - 1);
  const sum = g + s;
  const rest = g * s * (reproductionNumber - 1);
  // r² + (σ + γ) r − σγ(R − 1) = 0, in the form that doesn't cancel near R = 1.
  return (2 * rest) / (sum + Math.sqrt(sum * sum + 4 * rest));
}

/** Per day. @param days > 0 */
export const growthRateOfDoubling = (days: number): number => Math.LN2 / days;
/** Days; negative where the outbreak halves. @param growthRate per day, not 0 */
export const doublingTimeOfGrowth = (growthRate: number): number => Math.LN2 / growthRate;

export type DayZero = { population: number; infectious: number; removed: number };
export type StartState = { transmissionRate: number; susceptible: number; exposed: number };

/** The growth-consistent number latent, persons: I(r + γ)/σ with r the growth rate at R = β(N − Z − I)/(γN); 0 where r ≤ −γ. */
export function consistentExposed(transmissionRate: number, { removalRate, onsetRate }: { removalRate: number; onsetRate: number }, day: DayZero): number {
  const reproductionNumber = (transmissionRate * (day.population - day.removed - day.infectious)) / (removalRate * day.population);
  const growth = growthRateAt(reproductionNumber, { removalRate, onsetRate });
  return growth <= -removalRate ? 0 : (day.infectious * (growth + removalRate)) / onsetRate;
}

const FIXED_POINT_STEPS = 60;

/**
 * β, and who is latent and susceptible on day 0, from transmission given in one of the five ways.
 * The last three ways are measured on day 0 with that day's susceptibles, who depend on how many are latent; those
 * depend on growth, hence the iteration, which contracts strongly where few are infectious.
 * @param exposed persons, or null for the growth-consistent number
 * @throws EngineError "outsideDomain" where the growth rate is ≤ −min(σ, γ), nobody is left susceptible, or so many are
 * infectious that no number latent is consistent
 */
export function startState(given: TransmissionGiven, value: number, rates: Rates, day: DayZero, exposed: number | null): StartState {
  const { removalRate, onsetRate } = rates;
  const rest = day.population - day.removed - day.infectious;
  const measured = measuredReproductionNumber(given, value, rates);
  const rateWith = (susceptible: number): number => {
    if (!(susceptible > 0)) throw outsideDomain("outbreak.susceptible", `must be above 0 and at most the population; ${Math.max(0, rest)} are left before those latent`);
    if (given === "rate") return value;
    return given === "reproductionNumber" ? value * removalRate : (measured * removalRate * day.population) / susceptible;
  };
  if (exposed !== null || onsetRate === null) {
    const latent = exposed ?? 0;
    return { transmissionRate: rateWith(rest - latent), susceptible: rest - latent, exposed: latent };
  }
  let latent = 0;
  for (let step = 0; step < FIXED_POINT_STEPS; step++) {
    const next = consistentExposed(rateWith(rest - latent), { removalRate, onsetRate }, day);
    if (next >= rest) throw outsideDomain("outbreak.exposed", `must be given: the number that goes with this growth, ${inWords(next)}, is more than the ${inWords(rest)} who are left`);
    const settled = Math.abs(next - latent) <= 4 * Number.EPSILON * next;
    latent = next;
    if (settled) return { transmissionRate: rateWith(rest - latent), susceptible: rest - latent, exposed: latent };
  }
  throw outsideDomain("outbreak.exposed", "must be given: with so many infectious no number latent goes with this growth");
}

/** Growth rates at or below this have no reproduction number: −min(σ, γ), per day. */
export const growthRateLimit = ({ removalRate, onsetRate }: Rates): number => -Math.min(removalRate, onsetRate ?? Number.POSITIVE_INFINITY);

function measuredReproductionNumber(given: TransmissionGiven, value: number, rates: Rates): number {
  if (given === "effectiveReproductionNumber") return value;
  if (given !== "growthRate" && given !== "doublingTime") return Number.NaN;
  const growth = given === "growthRate" ? value : growthRateOfDoubling(value);
  const limit = growthRateLimit(rates);
  if (!(growth > limit)) throw outsideDomain("outbreak.transmission.value", `must be above ${inWords(limit)} per day, minus the smaller of removal and onset rate`);
  return reproductionNumberAtGrowth(growth, rates);
}

/**
 * Chance that all chains end by themselves (branching process with exponential infectious periods): min(1, b)^infected.
 * @param effectiveRatio b with the day's susceptibles, > 0
 * @param infected E + I, persons, ≥ 0
 */
export const chanceChainsEnd = (effectiveRatio: number, infected: number): number => Math.min(1, effectiveRatio) ** infected;

/**
 * Chance that one case's chain ends by itself where cases lead to a negative-binomial number of others.
 * @param reproductionNumber mean number of others, ≥ 0
 * @param dispersion k > 0; Infinity is Poisson, 1 is geometric (exponential infectious periods)
 * @returns smallest root in [0, 1] of q = (1 + R(1 − q)/k)^(−k)
 * @see Lloyd-Smith et al. (2005), Nature 438:355
 */
export function chanceOneChainEnds(reproductionNumber: number, dispersion: number): number {
  if (reproductionNumber <= 1) return 1;
  const next = (q: number) =>
    dispersion === Number.POSITIVE_INFINITY
      ? Math.exp(-reproductionNumber * (1 - q))
      : (1 + (reproductionNumber * (1 - q)) / dispersion) ** -dispersion;
  // From below the iteration climbs monotonically to the smallest root; Newton finishes it.
  let q = 0;
  for (let i = 0; i < 20; i++) q = next(q);
  for (let i = 0; i < 100; i++) {
    const value = next(q) - q;
    const slope =
      (dispersion === Number.POSITIVE_INFINITY
        ? reproductionNumber * next(q)
        : (reproductionNumber * next(q)) / (1 + (reproductionNumber * (1 - q)) / dispersion)) - 1;
    const step = value / slope;
    q -= step;
    if (Math.abs(step) <= 2 * Number.EPSILON * q) break;
  }
  return q;
}
