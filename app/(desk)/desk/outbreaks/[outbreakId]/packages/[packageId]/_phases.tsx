import { useTranslations } from "next-intl";
import { EnoughMark } from "@/components/ui/marks";
import { useShown } from "@/components/assessments/use-shown";
import type { AssessmentView } from "@/lib/assessments/view";
import { percentShown } from "@/lib/figures/round";
import type { Measure } from "@/lib/measures/queries";
import type { Outbreak } from "@/lib/outbreaks/queries";
import { readOut } from "@/lib/outbreaks/read-out";
import { phaseFactors } from "@/lib/packages/phase-factors";
import type { Package } from "@/lib/packages/queries";

type Props = { outbreak: Outbreak; row: Package; measures: readonly Measure[]; view: AssessmentView | null };

/** From each change of measures on: others per case and threshold ratio, central figures with day 0's susceptibles. */
export function PhaseRatios({ outbreak, row, measures, view }: Props) {
  const t = useTranslations("Packages");
  const shown = useShown(outbreak);
  const ratio = unmeasuredRatio(outbreak);
  if (ratio === null) return <p className="mut">{t("noProfile")}</p>;
  const phases = phaseFactors(row.items, measures);
  const last = view?.result.packages[0]?.phases.at(-1);
  const susceptible = view?.result.packages[0]?.susceptibleShareAtLift ?? null;
  const inForce = (names: string[], index: number) => {
    if (names.length > 0) return names.join(", ");
    if (index === 0) return t("phaseNone");
    if (index < phases.length - 1 || susceptible === null || !last) return t("phaseAllLifted");
    return t("phaseLifted", { ...percentShown(susceptible), number: shown.ratio(1 / last.effectiveRatioAtStart) });
  };
  return (
    // biome-ignore lint/a11y/noNoninteractiveTabindex: a frame that scrolls must be reachable by keyboard
    <section aria-label={t("phasesTable")} tabIndex={0} className="overflow-x-auto">
      <table className="head min-w-[560px]">
        <thead>
          <tr>
            <th scope="col" className="sticky start-0 z-[1] bg-paper">{t("phaseFrom")}</th>
            <th scope="col" className="r">{t("phaseR")}</th>
            <th scope="col" className="r">{t("phaseB")}</th>
            <th scope="col">{t("phaseWhat")}</th>
          </tr>
        </thead>
        <tbody>
          {phases.map(({ fromDay, factor, names }, index) => {
            const b = ratio / factor;
            return (
              <tr key={fromDay}>
                <th scope="row" className="nw sticky start-0 z-[1] bg-paper">{shown.day(fromDay)}</th>
                <td className="r">{shown.ratio(1 / b)}</td>
                <td className="r">
                  <b>{shown.ratio(b)}</b>
                </td>
                <td>
                  <span className="st whitespace-normal">
                    <EnoughMark state={b >= 1 ? "above" : "below"} />
                    <span className="sr-only">{b >= 1 ? t("above") : t("below")}</span>
                    {inForce(names, index)}
                  </span>
                </td>
              </tr>
            );
          })}
        </tbody>
      </table>
    </section>
  );
}

/** b without measures, central, or null where the profile is missing or doesn't fit together. */
function unmeasuredRatio({ profile, populationPersons: population }: Outbreak): number | null {
  const out =
    profile &&
    readOut({
      population,
      infectious: profile.infectious.central,
      removed: profile.removed.central,
      exposed: profile.latentPeriodDays ? (profile.exposed?.central ?? null) : 0,
      given: profile.transmission.given,
      value: profile.transmission.value.central,
      infectiousPeriodDays: profile.infectiousPeriodDays.central,
      latentPeriodDays: profile.latentPeriodDays?.central ?? null,
    });
  return out ? out.thresholdRatio : null;
}
