import { useTranslations } from "next-intl";
import type { AssessmentView } from "@/lib/assessments/view";
import { useShown } from "./use-shown";

/** How the figures were made, and how far they can be trusted as numbers. */
export function CalculationFacts({ view, horizonDays }: { view: AssessmentView; horizonDays: number }) {
  const t = useTranslations("Assessments");
  const shown = useShown(view.outbreak);
  const { diagnostics: d, engine } = view.result;
  const small = (value: number) => (value === 0 ? "0" : new Intl.NumberFormat(shown.tag, value < 0.001 ? { notation: "scientific", maximumSignificantDigits: 2 } : { maximumSignificantDigits: 3 }).format(value));
  const errors = [view.result.withoutMeasures.uncertainty?.monteCarloError["finalDeaths"], ...view.result.packages.map(({ uncertainty }) => uncertainty?.monteCarloError["finalDeaths.asScheduled"])].filter((value): value is number => value !== undefined);
  const facts: [string, string][] = [
    [t("facts.engine"), engine],
    [t("facts.draws"), view.uncertainty ? t("facts.drawsValue", { draws: view.uncertainty.draws, seed: String(view.uncertainty.seed) }) : t("facts.none")],
    [t("facts.horizon"), t("facts.days", { days: horizonDays })],
    [t("facts.integrators"), t("facts.integratorsValue", { difference: small(d.integratorDifferencePersons), allowed: small(d.integratorAllowedPersons) })],
    [t("facts.converged"), d.converged ? t("facts.yes") : t("facts.no")],
    [t("facts.residual"), small(d.settledResidual)],
    [t("facts.refused"), String(d.refusedDraws)],
    ...(errors.length > 0 ? ([[t("facts.monteCarlo"), t("facts.monteCarloValue", { error: small(Math.max(...errors)) })]] satisfies [string, string][]) : []),
  ];
  return (
    <section aria-labelledby="facts-title" className="min-w-0">
      <h2 id="facts-title" className="!text-[16px] !leading-[23px]">
        {t("facts.title")}
      </h2>
      <dl className="sm mt-2 grid grid-cols-[auto_minmax(0,1fr)] gap-x-6">
        {facts.map(([name, value]) => (
          <div key={name} className="col-span-2 grid grid-cols-subgrid border-b border-hair py-[7px]">
            <dt className="mut">{name}</dt>
            <dd className="text-end">{value}</dd>
          </div>
        ))}
      </dl>
    </section>
  );
}
