import { outsideDomain } from "./errors";
import type { Parameters } from "./model";
import { type Draws, positiveScale, type Reader, type Scale, shareScale } from "./quantities";
import { startState } from "./transmission";
import type { AssessmentInput, TransmissionGiven } from "./types";

const TRANSMISSION_SCALE: Record<TransmissionGiven, (low: number) => Scale> = {
  rate: positiveScale,
  reproductionNumber: positiveScale,
  effectiveReproductionNumber: positiveScale,
  growthRate: () => "linear",
  doublingTime: positiveScale,
};

/** Reads the outbreak's parameters in a draw. @throws EngineError where that draw lies outside the domain */
export type ParametersAt = (draw: number) => Parameters;

export function outbreakReader({ outbreak }: AssessmentInput, draws: Draws): ParametersAt {
  const { population, transmission } = outbreak;
  const infectious = draws.reader("infectious", outbreak.infectious, positiveScale);
  const removed = draws.reader("removed", outbreak.removed ?? 0, positiveScale);
  const exposed: Reader | null = outbreak.exposed === undefined ? null : draws.reader("exposed", outbreak.exposed, positiveScale);
  // Named by the way it is given, since a fitted growth rate stays a growth rate in every draw.
  const value = draws.reader(`transmission.${transmission.given}`, transmission.value, TRANSMISSION_SCALE[transmission.given]);
  const infectiousPeriod = draws.reader("infectiousPeriod", outbreak.infectiousPeriod, positiveScale);
  const latentPeriod = outbreak.latentPeriod === null ? null : draws.reader("latentPeriod", outbreak.latentPeriod, positiveScale);
  const infectionFatality = draws.reader("infectionFatality", outbreak.infectionFatality, shareScale);
  return (draw) => {
    const rates = { removalRate: 1 / infectiousPeriod(draw), onsetRate: latentPeriod === null ? null : 1 / latentPeriod(draw) };
    const day = { population, infectious: infectious(draw), removed: removed(draw) };
    const start = startState(transmission.given, value(draw), rates, day, exposed?.(draw) ?? null);
    if (!(start.transmissionRate > 0)) throw outsideDomain("outbreak.transmission.value", "must give a transmission rate above 0");
    return {
      population,
      susceptible: outbreak.susceptible ?? start.susceptible,
      exposed: start.exposed,
      infectious: day.infectious,
      removed: day.removed,
      transmissionRate: start.transmissionRate,
      ...rates,
      infectionFatality: infectionFatality(draw),
    };
  };
}
