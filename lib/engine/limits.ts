/** The domain (engine README, section "Domain"): outside it the engine refuses. */
export const LIMITS = {
  populationMax: 1e10,
  periodDaysMin: 0.01,
  periodDaysMax: 3650,
  reproductionNumberMax: 100,
  /** Of β per day and of reproduction numbers: above 0 in any use, and far enough from it to divide by. */
  transmissionMin: 1e-6,
  /** Infectious and latent together, persons. */
  infectedMin: 1e-6,
  cutMin: -1,
  /** Exclusive. */
  cutMax: 1,
  /** Of what measures in force together leave of transmission. */
  factorMin: 1e-9,
  costMax: 1e15,
  drawsMin: 100,
  drawsMax: 1_000_000,
  measuresMax: 40,
  packagesMax: 8,
  /** Draws × steps of the integrator over all packages: some minutes. */
  stepsMax: 1e9,
  /** Numbers held at a time for one package: draws × (figures + phases), 800 MB. */
  numbersMax: 1e8,
  horizonDaysMax: 36_500,
  dayMax: 36_500,
  seedMax: Number.MAX_SAFE_INTEGER,
  /** β, per day; follows from R ≤ 100 and a period of 0.01 days. */
  rateMax: 10_000,
  /** Growth per day, either way; the lower end that matters depends on the periods. */
  growthRateMax: 10_000,
} as const;
