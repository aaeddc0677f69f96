/**
 * The assessment file as types: what goes into a calculation and what comes out (see README.md for symbols).
 * Field names are those of the file format and are fixed; later versions only add fields.
 */

/** A number taken as certain, or its 2.5 %, 50 % and 97.5 % quantiles. */
export type Quantity = number | { low: number; central: number; high: number; source?: string };

export type TransmissionGiven =
  | "rate"
  | "reproductionNumber"
  | "effectiveReproductionNumber"
  | "growthRate"
  | "doublingTime";
export type Payer = "public" | "business" | "household";

export type OutbreakInput = {
  name: string;
  place: string;
  /** Calendar date of day 0, ISO 8601 (yyyy-mm-dd). */
  dayZero: string;
  /** N, persons. */
  population: number;
  /** S on day 0, persons. Absent: whatever the others leave, in every draw. */
  susceptible?: number;
  /** E on day 0, persons. Absent: growth-consistent in every draw. */
  exposed?: Quantity;
  /** I on day 0, persons. */
  infectious: Quantity;
  /** Removed or immune before day 0, persons. Default 0. */
  removed?: Quantity;
  transmission: { given: TransmissionGiven; value: Quantity };
  /** Days. */
  infectiousPeriod: Quantity;
  /** Days; null where there is no latent stage. */
  latentPeriod: Quantity | null;
  /** Share of the removed who have died, 0..1. */
  infectionFatality: Quantity;
  /** ISO 4217. */
  currency: string;
  priceYear: number;
};

export type MeasureCostInput = {
  payer: Payer;
  setUp?: Quantity;
  perDay?: Quantity;
  perResidentDay?: Quantity;
  /** Paid by one payer to another: shown, never in the total. */
  transfer?: boolean;
};

export type MeasureInput = {
  id: string;
  name: string;
  /** Share of β removed at full uptake; negative where the measure may raise it. */
  cut: Quantity;
  /** Measures that share a ladder exclude each other on any day. */
  ladder: string | null;
  /** Longest lawful duration, days. */
  maxDays: number | null;
  /** `maxDays` counts within this many rolling days. */
  maxDaysWithin?: number;
  daysUsed?: number;
  reviewEveryDays?: number;
  costs: MeasureCostInput[];
  legalBasis?: string;
  evidence?: string;
};

export type PackageItemInput = {
  measure: string;
  /** Share of the full cut that is reached, 0..1. Default 1. */
  uptake?: Quantity;
  startDay: number;
  /** First day no longer in force; null: never lifted. */
  endDay: number | null;
};
export type PackageInput = { id: string; name: string; items: PackageItemInput[] };

export type AssessmentInput = {
  format: "ebbmark.assessment-input/1";
  outbreak: OutbreakInput;
  measures: MeasureInput[];
  packages: PackageInput[];
  /** How far trajectories are drawn, days. Default 365. */
  horizonDays?: number;
  uncertainty: { draws: number; seed: number } | null;
};

/** Median and 95 % interval of the draws. */
export type Interval = { median: number; low: number; high: number };

export type Phase = {
  fromDay: number;
  /** First day of the next phase; null: for ever. */
  toDay: number | null;
  /** Product of the factors in force, central. */
  factor: number;
  /** b with day-0 susceptibles. */
  thresholdRatio: number;
  /** b with that day's susceptibles. */
  effectiveRatioAtStart: number;
  /** At the limit t → ∞ in the last phase. */
  effectiveRatioAtEnd: number;
  /** E + I, persons. */
  infectedAtEnd: number;
  /** At a lift: chance that the chains end by themselves afterwards; null where nothing is lifted. */
  chanceEndsByItself: number | null;
};

export type PeakInfectious = { day: number; infectious: number };
export type WorstDay = { day: number; deaths: number };
export type Warning = { code: string; message: string; path?: string };

export type CostResult = {
  total: number;
  byPayer: Record<Payer, number>;
  /** Per payer, transfers that stay outside the total; absent where there are none. */
  transfers?: Record<Payer, number>;
  /** null where deaths averted are not above 0. */
  perDeathAverted: number | null;
};

/** One phase over the draws. */
export type PhaseUncertainty = {
  effectiveRatioAtStart: Interval;
  effectiveRatioAtEnd: Interval;
  /** E + I, persons. */
  infectedAtEnd: Interval;
  /** Share of the draws with an effective ratio of 1 or more at its start. */
  chanceShrinksAtStart: number;
  /** Mean over the draws; null where nothing is lifted at its end. */
  chanceEndsByItself: number | null;
};

export type PackageUncertainty = {
  thresholdRatio: Interval;
  /** b' − b, paired. */
  thresholdShift?: Interval;
  finalDeaths: { asScheduled: Interval; heldToEnd: Interval; heldFromDayZero: Interval };
  /** Quantiles of paired differences. */
  deathsAverted: { asScheduled: Interval; heldToEnd: Interval };
  /** All infected since day 0, persons, as scheduled. */
  finalInfected: Interval;
  cost: { total: Interval; byPayer: Record<Payer, Interval> };
  /** Day of the highest I, as scheduled. */
  peakDay: Interval;
  peakInfectious?: Interval;
  /** Deaths on the day on which they are highest. */
  worstDayDeaths?: Interval;
  /** null where never lifted. */
  susceptibleShareAtLift?: Interval | null;
  /** null where every item has an end. */
  chargedUntilDay?: Interval | null;
  /** null where some draws avert no deaths: the ratio has no interval then. */
  perDeathAverted: Interval | null;
  chanceEnough: number;
  phases: PhaseUncertainty[];
  /** Standard error by dotted path: of a median and a chance under its own path, of an interval's ends under `.low` and `.high`. */
  monteCarloError: Record<string, number>;
};

export type PackageResult = {
  id: string;
  phases: Phase[];
  /** Index into phases: smallest factor, earliest on a tie. */
  strongestPhase: number;
  thresholdRatio: number;
  thresholdShift: number;
  enough: boolean;
  /** Further factor needed on β where not enough (b' itself); null where enough. */
  furtherFactor: number | null;
  finalDeaths: { asScheduled: number; heldToEnd: number; heldFromDayZero: number };
  /** Removed at t → ∞ including those removed before day 0, persons, as scheduled. */
  finalRemoved: number;
  deathsAverted: { asScheduled: number; heldToEnd: number };
  peak: PeakInfectious;
  worstDay: WorstDay;
  /** Share of the day-0 susceptibles still susceptible when the last measure is lifted; null where never lifted. */
  susceptibleShareAtLift: number | null;
  cost: CostResult;
  /** Day until which measures that are never lifted are charged; null where every item has an end. */
  chargedUntilDay: number | null;
  contributions: { measure: string; logShare: number | null }[];
  uncertainty: PackageUncertainty | null;
  /** Daily points over the horizon, for the drawn course. */
  course: CoursePoint[];
  warnings: Warning[];
};

export type CoursePoint = {
  day: number;
  susceptible: number;
  latent: number;
  infectious: number;
  deathsPerDay: number;
  cumulativeDeaths: number;
};

export type WithoutMeasuresResult = {
  thresholdRatio: number;
  reproductionNumber: number;
  finalDeaths: number;
  finalRemoved: number;
  peak: PeakInfectious;
  worstDay: WorstDay;
  /** Chance that the chains end by themselves from day 0. */
  chanceDiesOut: number;
  uncertainty: {
    thresholdRatio: Interval;
    reproductionNumber: Interval;
    finalDeaths: Interval;
    finalInfected: Interval;
    peakDay: Interval;
    peakInfectious?: Interval;
    worstDayDeaths?: Interval;
    chanceShrinks: number;
    monteCarloError: Record<string, number>;
  } | null;
  course: CoursePoint[];
};

export type Comparison = {
  efficient: string[];
  dominated: { id: string; by: string[]; kind: "simple" | "extended" }[];
  incremental: { from: string; to: string; cost: number; deathsAverted: number; ratio: number | null }[];
  /** Share of paired draws in which `a` averts more deaths as scheduled than `b`; empty without draws. */
  pairs: { a: string; b: string; chanceAvertsMore: number; monteCarloError?: number }[];
};

/** Whether the calculation may be frozen, and the evidence for it. */
export type Diagnostics = {
  converged: boolean;
  /** Largest difference of final deaths/φ between the drawn and the fast integrator, persons. */
  integratorDifferencePersons: number;
  /** integratorDifference allowed: 1e-6 × N. */
  integratorAllowedPersons: number;
  /** Largest relative residual of the settled values. */
  settledResidual: number;
  refusedDraws: number;
};

export type AssessmentResult = {
  format: "ebbmark.assessment-result/1";
  engine: string;
  /** SHA-256 (hex) of the RFC 8785 canonical form of the input as given. */
  inputHash: string;
  withoutMeasures: WithoutMeasuresResult;
  packages: PackageResult[];
  comparison: Comparison;
  diagnostics: Diagnostics;
  warnings: Warning[];
};
