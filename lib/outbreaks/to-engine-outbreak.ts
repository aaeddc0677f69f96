import type { OutbreakInput, Quantity } from "@/lib/engine/types";
import type { OutbreakProfile, ProfileQuantity } from "./profile";

type Row = {
  name: string;
  place: string;
  dayZero: string;
  populationPersons: number;
  currency: string;
  priceYear: number;
  profile: OutbreakProfile;
};

/** A quantity without a spread is a plain number: taken as certain, and drawn nowhere. */
const quantity = ({ low, central, high, source }: ProfileQuantity): Quantity =>
  low === central && central === high ? central : { low, central, high, ...(source ? { source } : {}) };

/** An outbreak's row as the assessment file's `outbreak`. Persons, days, shares. */
export function toEngineOutbreak({ profile, ...row }: Row): OutbreakInput {
  return {
    name: row.name,
    place: row.place,
    dayZero: row.dayZero,
    population: row.populationPersons,
    ...(profile.exposed ? { exposed: quantity(profile.exposed) } : {}),
    infectious: quantity(profile.infectious),
    removed: quantity(profile.removed),
    transmission: { given: profile.transmission.given, value: quantity(profile.transmission.value) },
    infectiousPeriod: quantity(profile.infectiousPeriodDays),
    latentPeriod: profile.latentPeriodDays ? quantity(profile.latentPeriodDays) : null,
    infectionFatality: quantity(profile.infectionFatality),
    currency: row.currency,
    priceYear: row.priceYear,
  };
}
