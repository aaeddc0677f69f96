import { useTranslations } from "next-intl";
import { ChartFrame } from "@/components/charts/chart-frame";
import { Panel } from "@/components/charts/threshold-ladder-chart";
import { EnoughMark } from "@/components/ui/marks";
import { useShown } from "@/components/assessments/use-shown";
import { endsOf, enoughState, packageFigures, withoutFigures } from "@/lib/assessments/figures-of";
import type { AssessmentView } from "@/lib/assessments/view";
import { moneyUnit } from "@/lib/figures/format";
import { isMeasurable, percentShown } from "@/lib/figures/round";

const MARK = { enough: "above", likely: "across", fallsShort: "across", notEnough: "below" } as const;

/** What the package does as scheduled: deaths averted, cost, and whether it is enough at its strongest. */
export function PackageFigures({ view }: { view: AssessmentView }) {
  const t = useTranslations("Packages");
  const a = useTranslations("Assessments");
  const shown = useShown(view.outbreak);
  const [result] = view.result.packages;
  if (!result) return null;
  const { deathsAverted, cost, thresholdRatio: ratio, chanceEnough } = packageFigures(result);
  const averted = deathsAverted.asScheduled;
  const unit = moneyUnit([cost.total.mid]);
  const money = shown.money(cost.total, unit);
  const state = enoughState(ratio);
  const phase = result.phases[result.strongestPhase];
  const ends = phase && phase.toDay !== null ? t("span", { from: shown.day(phase.fromDay), to: shown.lastDay(phase.toDay) }) : t("spanOpen", { from: shown.day(phase?.fromDay ?? 0) });
  const { currency, priceYear } = view.outbreak;
  return (
    <dl className="grid gap-x-11 gap-y-4 sm:grid-cols-[repeat(3,auto)] sm:justify-start">
      <div>
        <dt className="sm mut">{t("averted")}</dt>
        {isMeasurable(averted.mid, endsOf(averted)) ? (
          <>
            <dd className="big">{shown.count(averted).value}</dd>
            <dd className="sm mut">{shown.count(averted).interval}</dd>
          </>
        ) : (
          <dd className="mt-2 max-w-40">{a("table.noMeasurable")}</dd>
        )}
      </div>
      <div>
        <dt className="sm mut">{t("cost")}</dt>
        <dd className="big">
          {money.value}
          <span className="u">{t("money", { currency, power: String(unit.power) })}</span>
        </dd>
        <dd className="sm mut">{money.interval ? t("costInterval", { interval: money.interval, year: String(priceYear) }) : t("costPrices", { year: String(priceYear) })}</dd>
      </div>
      <div>
        <dt className="sm mut">{t("ratioWhile", { when: ends })}</dt>
        <dd className="big">{shown.ratio(ratio.mid)}</dd>
        <dd className="sm mut st whitespace-normal">
          <EnoughMark state={MARK[state]} />
          <span>
            {t(state === "enough" && phase?.toDay !== null ? "state.enoughWhileHeld" : `state.${state}`)}
            {chanceEnough === null ? null : `; ${t("enoughIn", percentShown(chanceEnough))}`}
          </span>
        </dd>
      </div>
    </dl>
  );
}

/** The package's own ladder from the ratio without measures towards the line at 1. */
export function PackageLadder({ view, letter }: { view: AssessmentView; letter: string }) {
  const t = useTranslations("Packages");
  const c = useTranslations("Charts");
  const shown = useShown(view.outbreak);
  const [panel] = view.ladder.narrow;
  const [result] = view.result.packages;
  if (!panel || !result) return null;
  const short = new Map(view.measures.map(({ code, shortName }) => [code, shortName]));
  const none = withoutFigures(view.result.withoutMeasures).thresholdRatio;
  const { thresholdRatio: ratio } = packageFigures(result);
  const rungs = result.contributions.flatMap(({ measure, logShare }) => (logShare === null ? [] : [c("ladder.rung", { name: short.get(measure) ?? measure, percent: Math.round(logShare * 100) })]));
  return (
    <ChartFrame
      id="package-ladder"
      title={t("ladderOf", { letter })}
      description={t("ladderWhile", { count: rungs.length })}
      table={{
        columns: [c("ladder.columns.package"), c("ladder.columns.ratio"), c("ladder.columns.interval"), c("ladder.columns.rungs")],
        rows: [
          [c("ladder.noMeasures"), shown.ratio(none.mid), shown.ratioOf(none).interval, "–"],
          [letter, shown.ratio(ratio.mid), shown.ratioOf(ratio).interval, <span key="r" className="block min-w-[200px] whitespace-normal">{rungs.join(", ")}</span>],
        ],
      }}
    >
      <Panel panel={panel} id="package-ladder-p" className="mt-3 h-auto w-full max-w-[380px]" numberLocale={shown.tag} />
    </ChartFrame>
  );
}
