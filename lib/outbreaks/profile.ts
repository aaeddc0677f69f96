import type { Quantity, TransmissionGiven } from "../engine/types";

/** Low, central and high with the source; a plain number is taken as certain. */
export type ProfileQuantity = Exclude<Quantity, number>;

/** What the adviser knows about the outbreak on day 0. Persons, days, shares 0..1. */
export type OutbreakProfile = {
  /** Left out: growth-consistent in every draw. */
  exposed?: ProfileQuantity;
  infectious: ProfileQuantity;
  /** Removed or immune before day 0, persons. The rest is susceptible. */
  removed: ProfileQuantity;
  transmission: { given: TransmissionGiven; value: ProfileQuantity };
  infectiousPeriodDays: ProfileQuantity;
  latentPeriodDays: ProfileQuantity | null;
  infectionFatality: ProfileQuantity;
};
