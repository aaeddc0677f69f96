import { removalsToCome, SUSCEPTIBLE_LEAST, type Solved, type State } from "./settled-state";

/** What drives the outbreak, in one draw or in the central run. Persons, per day, share. */
export type Parameters = {
  population: number;
  susceptible: number;
  exposed: number;
  infectious: number;
  removed: number;
  transmissionRate: number;
  removalRate: number;
  /** null where there is no latent stage. */
  onsetRate: number | null;
  infectionFatality: number;
};

/** b = γN/(βS): the threshold ratio with the given susceptibles and factor on β. Dimensionless, > 0. */
export const thresholdRatioOf = (p: Parameters, susceptible = p.susceptible, factor = 1): number =>
  (p.removalRate * p.population) / (p.transmissionRate * factor * Math.max(susceptible, SUSCEPTIBLE_LEAST));

/** Removals from day 0 to t → ∞ where a factor on β holds for ever from a state on. Persons. */
export function removalsHeld(p: Parameters, from: State, factor: number): Solved {
  const solved = removalsToCome(from, p.population, p.transmissionRate * factor, p.removalRate);
  return { ...solved, value: from.removed + solved.value };
}

/** Removals from day 0 to t → ∞ where a factor on β holds for ever from day 0 on. Persons. */
export const removalsFromDayZero = (p: Parameters, factor: number): Solved =>
  removalsHeld(p, { susceptible: p.susceptible, latent: p.exposed, infectious: p.infectious, removed: 0 }, factor);
