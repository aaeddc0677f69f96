import { useTranslations } from "next-intl";
import { ScrollFrame } from "@/components/ui/scroll-frame";
import type { ReactNode } from "react";
import { Whisker } from "@/components/charts/whisker";
import { EnoughMark, Figure, PackageTile } from "@/components/ui/marks";
import { endsOf, enoughState, packageFigures, type EnoughState, withoutFigures } from "@/lib/assessments/figures-of";
import type { AssessmentView } from "@/lib/assessments/view";
import type { Range } from "@/lib/charts/axes";
import { whiskerRow } from "@/lib/charts/whisker";
import type { Payer } from "@/lib/engine/types";
import { moneyUnit } from "@/lib/figures/format";
import { isMeasurable, percentShown } from "@/lib/figures/round";
import { useShown } from "./use-shown";

const STICKY = "sticky start-0 z-[1] bg-paper";
/** One width per number of packages, so that columns never get too narrow for a figure and its interval. */
const MIN_WIDTH = ["", "min-w-[470px]", "min-w-[620px]", "min-w-[744px]", "min-w-[900px]", "min-w-[1050px]", "min-w-[1200px]", "min-w-[1350px]", "min-w-[1500px]"];
const MARK: Record<EnoughState, "above" | "across" | "below"> = { enough: "above", likely: "across", fallsShort: "across", notEnough: "below" };
const PAYERS: readonly Payer[] = ["public", "business", "household"];

type Cell = { value: string; interval: string | null };
/** null: nothing to say; text: a word instead of a figure. */
type RowProps = { head: ReactNode; sub: ReactNode; cells: (ReactNode | null)[]; brk?: boolean };

function Row({ head, sub, cells, brk = false }: RowProps) {
  return (
    <tr className={brk ? "brk" : undefined}>
      <th scope="row" className={STICKY}>
        {head}
        <span>{sub}</span>
      </th>
      {cells.map((cell, index) => (
        <td key={index}>{cell}</td>
      ))}
    </tr>
  );
}

/** All packages side by side with no further measures: figure, interval beside it, whisker below on the row's scale. */
export function ComparisonTable({ view }: { view: AssessmentView }) {
  const t = useTranslations("Assessments");
  const shown = useShown(view.outbreak);
  const none = withoutFigures(view.result.withoutMeasures);
  const columns = view.result.packages.map((each) => ({ ...each, figures: packageFigures(each), own: view.packages.find(({ letter }) => letter === each.id) }));
  const letters = columns.map(({ id }) => id);
  const dim = (word: string) => <span className="dim">{word}</span>;

  /** A row of figures: first without measures, then each package. */
  const figures = (ranges: (Range | null)[], write: (range: Range) => Cell, options: { line?: number; fromZero?: boolean; empty?: string; bare?: boolean } = {}) => {
    const row = whiskerRow(ranges, options.line ?? null, options.fromZero ?? false);
    return ranges.map((range, index) => {
      if (range === null) return dim(options.empty ?? t("table.none"));
      const { value, interval } = write(range);
      return (
        <>
          <Figure value={value} interval={interval} />
          {options.bare ? null : <Whisker cell={row.cells[index] ?? null} line={row.line} letter={index === 0 ? "none" : (letters[index - 1] ?? "none")} />}
        </>
      );
    });
  };
  const enough = (range: Range, chance: number | null, held: boolean) => {
    const state = enoughState(range);
    return (
      <>
        <span className={`st ${state === "enough" ? "ok" : ""}`}>
          <EnoughMark state={MARK[state]} />
          {state === "enough" ? <b>{t(held ? "table.enoughWhileHeld" : "table.enough")}</b> : t(`table.${state}`)}
        </span>
        <small className="mut block">
          {chance === null ? null : t("table.ofDraws", percentShown(chance))}
          {chance === null || range.mid >= 1 ? null : "; "}
          {range.mid >= 1 ? null : t("table.furtherCut", { cut: shown.percent(1 - range.mid) })}
        </small>
      </>
    );
  };
  const averted = columns.map(({ figures: f }) => f.deathsAverted.asScheduled);
  const measurable = averted.map((range) => isMeasurable(range.mid, endsOf(range)));
  const totals = columns.map(({ figures: f }) => f.cost.total);
  const unit = moneyUnit(totals.map(({ mid }) => mid));
  const per = columns.map(({ figures: f }, index) => (measurable[index] && (averted[index]?.mid ?? 0) > 0 ? f.perDeathAverted : null));
  const perUnit = moneyUnit(per.map((range) => range?.mid ?? 0));
  const price = (power: number) => t("table.price", { currency: view.outbreak.currency, power: String(power), year: String(view.outbreak.priceYear) });
  const dominated = (id: string) => view.result.comparison.dominated.find((each) => each.id === id);
  const list = (ids: string[]) => new Intl.ListFormat(shown.tag, { type: "conjunction" }).format(ids.map((id) => (id === "none" ? t("table.noMeasures") : id)));

  return (
    <ScrollFrame label={t("table.caption")}>
      <table className={`cmp head ${MIN_WIDTH[columns.length] ?? ""}`}>
        <caption className="skip">{t("table.caption")}</caption>
        <thead>
          <tr>
            <th scope="col" className={`${STICKY} w-[150px] min-w-[118px]`}>
              <span className="sub">{view.uncertainty ? t("table.corner", { draws: view.uncertainty.draws }) : t("table.cornerCentral")}</span>
            </th>
            <th scope="col">
              <span className="t">
                <PackageTile letter="none" />
                {t("table.noMeasures")}
              </span>
              <span className="sub">{t("table.alwaysShown")}</span>
            </th>
            {columns.map(({ id, own }) => (
              <th key={id} scope="col">
                <span className="t">
                  <PackageTile letter={id} />
                  {own?.name ?? id}
                </span>
                <span className="sub">
                  {own?.startDay == null ? t("table.noLines") : own.endDay === null ? t("table.fromOn", { from: shown.day(own.startDay) }) : t("table.fromTo", { from: shown.day(own.startDay), to: shown.lastDay(own.endDay), weeks: Math.round((own.endDay - own.startDay) / 7) })}
                </span>
                {own && !own.deliverable ? <span className="sub font-semibold text-brass">{t("table.undeliverable")}</span> : null}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          <Row head={t("table.others")} sub={t("table.othersSub")} cells={figures([none.reproductionNumber, ...columns.map(({ figures: { thresholdRatio: b } }) => ({ mid: 1 / b.mid, low: b.high === null ? null : 1 / b.high, high: b.low === null ? null : 1 / b.low }))], shown.ratioOf, { bare: true })} />
          <Row head={t("table.ratio")} sub={t("table.ratioSub")} cells={figures([none.thresholdRatio, ...columns.map(({ figures: f }) => f.thresholdRatio)], shown.ratioOf, { line: 1 })} />
          <Row head={t("table.isEnough")} sub={t("table.isEnoughSub")} cells={[enough(none.thresholdRatio, none.chanceShrinks, false), ...columns.map(({ figures: f, own }) => enough(f.thresholdRatio, f.chanceEnough, own?.endDay !== null))]} />
          <Row brk head={t("table.finalDeaths")} sub={t("table.asScheduled")} cells={figures([none.finalDeaths, ...columns.map(({ figures: f }) => f.finalDeaths.asScheduled)], shown.count, { fromZero: true })} />
          <Row head={t("table.central")} sub={t("table.centralSub")} cells={[none.central.finalDeaths, ...columns.map(({ figures: f }) => f.central.finalDeaths)].map((value, index) => <span key={index} className="mut">{shown.count({ mid: value, low: null, high: null }).value}</span>)} />
          <Row head={t("table.heldToEnd")} sub={t("table.heldToEndSub")} cells={figures([null, ...columns.map(({ figures: f }) => f.finalDeaths.heldToEnd)], shown.count, { fromZero: true, empty: t("table.same") })} />
          <Row head={t("table.averted")} sub={t("table.asScheduled")} cells={[dim(t("table.none")), ...figures([null, ...averted], shown.count, { fromZero: true }).slice(1).map((cell, index) => (measurable[index] ? cell : <NoDifference key={index} range={averted[index]!} interval={shown.count(averted[index]!).interval} />))]} />
          <Row head={t("table.worstDay")} sub={t("table.worstDaySub")} cells={figures([none.peakDay, ...columns.map(({ figures: f }) => f.peakDay)], shown.dayOf, { bare: true })} />
          <Row brk head={t("table.cost")} sub={price(unit.power)} cells={figures([null, ...totals], (range) => shown.money(range, unit), { fromZero: true })} />
          {PAYERS.map((payer) => (
            <Row key={payer} head={<span className="!text-[13px] !text-ink-2">{t(`table.payer.${payer}`)}</span>} sub={null} cells={figures([null, ...columns.map(({ figures: f }) => f.cost.byPayer[payer])], (range) => shown.money(range, unit), { bare: true })} />
          ))}
          <Row
            head={t("table.perDeath")}
            sub={price(perUnit.power)}
            cells={[
              dim(t("table.none")),
              ...columns.map(({ id }, index) => {
                const range = per[index];
                const out = dominated(id);
                const figure = range ? shown.money(range, perUnit) : null;
                return (
                  <span key={id}>
                    {figure ? <Figure value={figure.value} interval={figure.interval} /> : <span className="dim">{t("table.noMeasurable")}</span>}
                    {out ? <small className="mut block">{t(`table.dominated.${out.kind}`, { by: list(out.by) })}</small> : null}
                  </span>
                );
              }),
            ]}
          />
        </tbody>
      </table>
    </ScrollFrame>
  );
}

function NoDifference({ range, interval }: { range: Range; interval: string | null }) {
  const t = useTranslations("Assessments");
  return (
    <>
      <span className="dim">{t("table.noMeasurable")}</span>
      {interval && range.low !== null ? <small className="mut block num">{interval}</small> : null}
    </>
  );
}
