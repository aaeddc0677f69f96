import Link from "next/link";
import { useFormatter, useTranslations } from "next-intl";
import { Fragment } from "react";
import { Figure } from "@/components/ui/marks";
import { type WhiskerCell, whiskerRow } from "@/lib/charts/whisker";
import { central } from "@/lib/engine";
import type { Measure } from "@/lib/measures/queries";
import { PayerBar } from "./_payer-bar";

type Row = Omit<Measure, "createdAt" | "updatedAt">;
type Props = { rows: readonly Row[]; /** Of the outbreak whose residents the cost a day is counted for. */ population: number; currency: string };

/** The catalogue: cuts on one scale, law, and what a day costs whom; rungs of a ladder stand on it. */
export function CatalogueTable({ rows, population, currency }: Props) {
  const t = useTranslations("Measures");
  const groups = groupByLadder(rows);
  const cuts = whiskerRow(rows.map(({ cut }) => ({ mid: cut.central, low: cut.low, high: cut.high })), 0);
  const cellOf = new Map(rows.map((row, index) => [row.id, cuts.cells[index] ?? null]));
  return (
    // biome-ignore lint/a11y/noNoninteractiveTabindex: a frame that scrolls must be reachable by keyboard
    <section aria-label={t("title")} tabIndex={0} className="mt-4 overflow-x-auto">
      <table className="head min-w-[1100px]">
        <thead>
          <tr>
            <th scope="col" className="sticky start-0 z-[1] w-[190px] bg-paper md:w-[300px]">{t("columns.measure")}</th>
            <th scope="col" className="w-[240px]">{t("columns.cut")}</th>
            <th scope="col">{t("columns.evidence")}</th>
            <th scope="col">{t("columns.law")}</th>
            <th scope="col" className="r">{t("columns.longest")}</th>
            <th scope="col" className="r">{t("columns.lead")}</th>
            <th scope="col" className="r w-[104px]">{t("columns.cost", { currency })}</th>
            <th scope="col">{t("columns.payer")}</th>
          </tr>
        </thead>
        <tbody>
          {groups.map(({ ladder, measures }) => (
            <Fragment key={ladder ?? "others"}>
              {groups.length > 1 ? (
                <tr className="grp">
                  <th colSpan={8} scope="colgroup" className="first-letter:uppercase">
                    {ladder ? t("ladder", { name: ladder }) : t("others")}
                  </th>
                </tr>
              ) : null}
              {measures.map((row, index) => (
                <MeasureRow key={row.id} row={row} population={population} cell={cellOf.get(row.id) ?? null} zero={cuts.line} rung={ladder ? { first: index === 0, last: index === measures.length - 1 } : null} />
              ))}
            </Fragment>
          ))}
        </tbody>
      </table>
    </section>
  );
}

type RowProps = { row: Row; population: number; cell: WhiskerCell | null; zero: number | null; rung: { first: boolean; last: boolean } | null };

function MeasureRow({ row, population, cell, zero, rung }: RowProps) {
  const t = useTranslations("Measures");
  const format = useFormatter();
  const percent = (share: number) => format.number(share * 100, { maximumFractionDigits: 1 }).replace("-", "−");
  const perDay = (payer: string) =>
    row.costs.filter((cost) => cost.payer === payer && !cost.transfer).reduce((sum, cost) => sum + central(cost.perDay ?? 0) + central(cost.perResidentDay ?? 0) * population, 0);
  const shares = { public: perDay("public"), business: perDay("business"), household: perDay("household") };
  return (
    <tr>
      <th scope="row" className={`sticky start-0 z-[1] max-w-[190px] bg-paper md:max-w-[300px] ${rung ? "!ps-8" : ""}`}>
        {rung ? <Rung {...rung} /> : null}
        <Link className="q font-semibold" href={`/desk/measures/${row.id}`}>
          {row.name}
        </Link>
        <span className="sm mut block font-normal">{row.instruction}</span>
      </th>
      <td>
        <span className="flex items-center gap-3">
          <span className="w-[116px] flex-none">
            <Figure value={percent(row.cut.central)} interval={t("interval", { low: percent(row.cut.low), high: percent(row.cut.high) })} unit="%" />
          </span>
          <CutWhisker cell={cell} zero={zero} />
        </span>
      </td>
      <td className="sm mut max-w-[190px]">{row.evidence ? <span className="line-clamp-2 leading-[20px]">{row.evidence}</span> : <span className="st look">{t("evidenceNone")}</span>}</td>
      <td className="sm nw">
        {row.legalBasis === "" ? (
          <span className="st look">{t("noLaw")}</span>
        ) : row.legalLink ? (
          <a className="q" href={row.legalLink} rel="noreferrer">
            {row.legalBasis}
          </a>
        ) : (
          row.legalBasis
        )}
      </td>
      <td className="r nw">{row.maxDays ? t("days", { count: row.maxDays }) : t("noLimit")}</td>
      <td className="r nw">{t("days", { count: row.leadTimeDays })}</td>
      <td className="r">{format.number((shares.public + shares.business + shares.household) / 1000, { maximumSignificantDigits: 3 })}</td>
      <td>
        <PayerBar shares={shares} names={{ public: t("payers.public"), business: t("payers.business"), household: t("payers.household") }} />
      </td>
    </tr>
  );
}

/** The ladder that a measure is a rung of: rails run through the rows of one ladder. */
function Rung({ first, last }: { first: boolean; last: boolean }) {
  const [top, bottom] = [first ? "12" : "0", last ? "34" : "100%"];
  return (
    <svg className="absolute start-1 top-0 h-full" width="16" aria-hidden="true">
      <line x1="3" x2="3" y1={top} y2={bottom} strokeWidth="1.5" className="stroke-rule" />
      <line x1="13" x2="13" y1={top} y2={bottom} strokeWidth="1.5" className="stroke-rule" />
      <line x1="2" x2="14" y1="21" y2="21" strokeWidth="3" className="stroke-ink" />
    </svg>
  );
}

/** The interval of a cut on the catalogue's scale, with a line at no effect. Decoration: the figures stand beside it. */
function CutWhisker({ cell, zero }: { cell: WhiskerCell | null; zero: number | null }) {
  if (!cell) return null;
  const at = (percent: number) => `${percent}%`;
  return (
    <svg width="96" height="11" aria-hidden="true" className="flex-none">
      {zero === null ? null : <line x1={at(zero)} x2={at(zero)} y1="0" y2="11" className="stroke-rule" />}
      <g className="stroke-ink">
        <line x1={at(cell.low)} x2={at(cell.high)} y1="5.5" y2="5.5" />
        <line x1={at(cell.low)} x2={at(cell.low)} y1="3" y2="8" />
        <line x1={at(cell.high)} x2={at(cell.high)} y1="3" y2="8" />
        <line x1={at(cell.mid)} x2={at(cell.mid)} y1="2" y2="9" strokeWidth="3" />
      </g>
    </svg>
  );
}

function groupByLadder(rows: readonly Row[]): { ladder: string | null; measures: Row[] }[] {
  const groups = new Map<string | null, Row[]>();
  for (const row of rows) groups.set(row.ladder, [...(groups.get(row.ladder) ?? []), row]);
  return [...groups].map(([ladder, measures]) => ({ ladder, measures }));
}
