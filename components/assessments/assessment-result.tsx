import { useTranslations } from "next-intl";
import { SettlingCurveChart } from "@/components/charts/settling-curve-chart";
import { ThresholdLadderChart } from "@/components/charts/threshold-ladder-chart";
import { PackageTile } from "@/components/ui/marks";
import { packageFigures, withoutFigures } from "@/lib/assessments/figures-of";
import type { AssessmentView } from "@/lib/assessments/view";
import { CalculationFacts } from "./calculation-facts";
import { ComparisonTable } from "./comparison-table";
import { ContributionsTable } from "./contributions-table";
import { PhasesTable } from "./phases-table";
import { type Shown, useShown } from "./use-shown";
import { Warnings } from "./warnings";

/** Sentence, table, chart, in that order; the sentence stands above, in the page's head. */
export function AssessmentResultView({ view, horizonDays }: { view: AssessmentView; horizonDays: number }) {
  const shown = useShown(view.outbreak);
  // Beside each other where both fit; more than three packages need the whole width.
  const beside = view.result.packages.length <= 3 ? "min-[1380px]:grid-cols-[minmax(0,1fr)_516px]" : "";
  return (
    <div className="grid grid-cols-[minmax(0,1fr)] gap-10">
      <div className={`grid grid-cols-[minmax(0,1fr)] items-start gap-x-7 gap-y-10 ${beside}`}>
        <div className="grid min-w-0 gap-6">
          <ComparisonTable view={view} />
          <Warnings view={view} />
        </div>
        <Ladder view={view} shown={shown} />
      </div>
      <div className="grid grid-cols-[minmax(0,1fr)] items-start gap-x-7 gap-y-10 border-t border-hair pt-6 min-[1380px]:grid-cols-[784px_minmax(0,1fr)]">
        <Settling view={view} shown={shown} />
        <ContributionsTable view={view} />
      </div>
      <div className="border-t border-hair pt-6">
        <PhasesTable view={view} />
      </div>
      <div className="max-w-[44rem] border-t border-hair pt-6">
        <CalculationFacts view={view} horizonDays={horizonDays} />
      </div>
    </div>
  );
}

const NamedPackage = ({ letter, name }: { letter: string; name: string }) => (
  <span className="inline-flex items-center gap-2">
    <PackageTile letter={letter} /> {name}
  </span>
);
const nameOf = (view: AssessmentView, id: string) => view.packages.find(({ letter }) => letter === id)?.name ?? id;

function Ladder({ view, shown }: { view: AssessmentView; shown: Shown }) {
  const t = useTranslations("Charts");
  const c = (key: "package" | "ratio" | "interval" | "others" | "chance" | "rungs") => t(`ladder.columns.${key}`);
  const short = new Map(view.measures.map(({ code, shortName, name }) => [code, shortName || name]));
  const none = withoutFigures(view.result.withoutMeasures).thresholdRatio;
  const rows = view.result.packages.map((each) => {
    const { thresholdRatio: ratio, chanceEnough } = packageFigures(each);
    const rungs = each.contributions.filter(({ logShare }) => logShare !== null).map(({ measure, logShare }) => t("ladder.rung", { name: short.get(measure) ?? measure, percent: Math.round((logShare ?? 0) * 100) }));
    return [<NamedPackage key="p" letter={each.id} name={nameOf(view, each.id)} />, shown.ratio(ratio.mid), shown.ratioOf(ratio).interval, shown.ratio(1 / ratio.mid), chanceEnough === null ? "–" : shown.percent(chanceEnough), <span key="r" className="block min-w-[260px] whitespace-normal">{rungs.join(", ")}</span>];
  });
  return (
    <ThresholdLadderChart
      wide={view.ladder.wide}
      narrow={view.ladder.narrow}
      numberLocale={shown.tag}
      table={{
        columns: [c("package"), c("ratio"), c("interval"), c("others"), c("chance"), c("rungs")],
        rows: [[t("ladder.noMeasures"), shown.ratio(none.mid), shown.ratioOf(none).interval, shown.ratio(1 / none.mid), "–", "–"], ...rows],
      }}
    />
  );
}

function Settling({ view, shown }: { view: AssessmentView; shown: Shown }) {
  const t = useTranslations("Charts");
  const none = withoutFigures(view.result.withoutMeasures);
  const text = ({ value, interval }: { value: string; interval: string | null }) => (interval ? `${value} (${interval})` : value);
  const packages = view.result.packages.map((each) => ({ id: each.id, ...packageFigures(each) }));
  return (
    <SettlingCurveChart
      wide={view.curve.wide}
      narrow={view.curve.narrow}
      numberLocale={shown.tag}
      desc={t("settling.desc", {
        none: text(shown.count(none.finalDeaths)),
        packages: packages.map(({ id, finalDeaths: d }) => t("settling.descPackage", { letter: id, held: text(shown.count(d.heldFromDayZero)), scheduled: text(shown.count(d.asScheduled)) })).join(" "),
      })}
      table={{
        columns: [t("settling.columns.package"), t("settling.columns.ratio"), t("settling.columns.held"), t("settling.columns.scheduled")],
        rows: [
          [t("ladder.noMeasures"), text(shown.ratioOf(none.thresholdRatio)), text(shown.count(none.finalDeaths)), text(shown.count(none.finalDeaths))],
          ...packages.map(({ id, thresholdRatio, finalDeaths: d }) => [<NamedPackage key="p" letter={id} name={nameOf(view, id)} />, text(shown.ratioOf(thresholdRatio)), text(shown.count(d.heldFromDayZero)), text(shown.count(d.asScheduled))]),
        ],
      }}
    />
  );
}
