import { useTranslations } from "next-intl";
import { packageHue } from "@/components/ui/marks";
import type { LadderColumn, LadderPanel } from "@/lib/charts/threshold-ladder";
import { formatRatio } from "@/lib/figures/format";
import { percentShown } from "@/lib/figures/round";
import { type ChartTable, ChartFrame, NARROW, WIDE } from "./chart-frame";
import { hueDash, hueStroke, Interval, Tile } from "./mark-parts";

type Range = { mid: number; low: number | null; high: number | null };

export function ThresholdLadderChart({ wide, narrow, numberLocale, table }: { wide: LadderPanel[]; narrow: LadderPanel[]; numberLocale: string; table: ChartTable }) {
  const t = useTranslations("Charts");
  return (
    <ChartFrame id="ladder" title={t("ladder.title")} description={t("ladder.description")} how={t("ladder.how")} table={table}>
      <div className="flex flex-wrap gap-x-7 gap-y-6">
        {wide.map((panel, index) => (
          <Panel key={index} panel={panel} id={`ladder-w${index}`} className={WIDE} numberLocale={numberLocale} />
        ))}
        {narrow.map((panel, index) => (
          <Panel key={index} panel={panel} id={`ladder-n${index}`} className={NARROW} numberLocale={numberLocale} />
        ))}
      </div>
    </ChartFrame>
  );
}

export function Panel({ panel, id, className, numberLocale }: { panel: LadderPanel; id: string; className: string; numberLocale: string }) {
  const t = useTranslations("Charts");
  const { width, height, left, right, top, bottom, line, none } = panel;
  const ratio = (value: number) => formatRatio(value, numberLocale);
  const ends = ({ low, high }: Range) => (low === null || high === null ? null : t("interval", { low: ratio(low), high: ratio(high) }));
  const axis = (value: number) => new Intl.NumberFormat(numberLocale, { minimumFractionDigits: 1, maximumFractionDigits: 2 }).format(value);
  return (
    <svg viewBox={`0 0 ${width} ${height}`} width={width} height={height} role="img" aria-labelledby={`${id}-t ${id}-d`} className={className}>
      <title id={`${id}-t`}>{t("ladder.title")}</title>
      <desc id={`${id}-d`}>{t("ladder.desc", { none: ratio(none.value.mid), packages: panel.columns.map(({ letter, value }) => t("ladder.descPackage", { letter, value: ratio(value.mid) })).join(" ") })}</desc>
      {panel.water.map(({ y, opacity }) => (
        <line key={y} x1={left} y1={y} x2={right} y2={y} className="stroke-water" opacity={opacity} />
      ))}
      {panel.ticks.map(({ value, at }) => (
        <g key={value} data-tick={value} data-at={at}>
          {value === 1 ? null : <line x1={left - 5} y1={at} x2={left} y2={at} className="stroke-rule" />}
          <text x={left - 9} y={at + 4} textAnchor="end" className={value === 1 ? "lbl s b" : "ax"}>
            {axis(value)}
          </text>
        </g>
      ))}
      {panel.mirrored.map(({ value, at }) => (
        <g key={value} data-mirror={value} data-at={at}>
          {value === 1 ? null : <line x1={right} y1={at} x2={right + 5} y2={at} className="stroke-rule" />}
          <text x={right + 9} y={at + 4} className={value === 1 ? "lbl s b" : "ax"}>
            {axis(value)}
          </text>
        </g>
      ))}
      <path d={`M${left},${top}V${bottom} M${right},${top}V${bottom}`} className="stroke-rule" />
      <line x1={left - 5} y1={line} x2={right + 5} y2={line} strokeWidth={2} className="stroke-ink" data-mark="one" />
      <text x={left + 8} y={line - 8} className="axl halo">
        {t("diesOut")}
      </text>
      <text x={left + 8} y={line + 19} className="axl halo">
        {t("grows")}
      </text>
      <text x={0} y={14} className="axl">
        {t("ladder.axis")}
      </text>
      <text x={width} y={14} textAnchor="end" className="axl">
        {t("ladder.mirrorAxis")}
      </text>
      <line x1={left} y1={none.y} x2={right} y2={none.y} strokeWidth={1.5} strokeDasharray={hueDash.n} className="stroke-pkg-n" data-mark="none" data-y={none.y} />
      {none.whisker ? <Interval across={none.whisker.x} low={none.whisker.low} high={none.whisker.high} upright className="stroke-pkg-n" mark="none-whisker" /> : null}
      <circle cx={none.x} cy={none.y} r={4.5} strokeWidth={2} className="fill-paper stroke-pkg-n" />
      {none.label ? <ValueLabel x={none.label.x} y={none.label.y} value={ratio(none.value.mid)} interval={ends(none.value)} /> : null}
      <text x={left + 4} y={bottom + 20} className="lbl b">
        {t("ladder.none")}
      </text>
      <text x={left + 4} y={bottom + 37} className="iv-t">
        {none.label ? t("ladder.asItIs") : ratio(none.value.mid)}
      </text>
      {panel.columns.map((column) => (
        <Column key={column.letter} column={column} bottom={bottom} value={ratio(column.value.mid)} interval={ends(column.value)} chance={column.chanceEnough === null ? null : t("ladder.chance", { ...percentShown(column.chanceEnough) })} />
      ))}
    </svg>
  );
}

function ValueLabel({ x, y, value, interval }: { x: number; y: number; value: string; interval: string | null }) {
  return (
    <>
      <text x={x} y={interval ? y : y + 14} className="lbl b halo">
        {value}
      </text>
      {interval ? (
        <text x={x} y={y + 14} className="iv-t halo">
          {interval}
        </text>
      ) : null}
    </>
  );
}

function Column({ column, bottom, value, interval, chance }: { column: LadderColumn; bottom: number; value: string; interval: string | null; chance: string | null }) {
  const hue = packageHue(column.letter);
  const { rails, whisker, label, footX, letter } = column;
  return (
    <g>
      <g className={hueStroke[hue]} strokeWidth={2}>
        <line x1={rails.x1} y1={rails.from} x2={rails.x1} y2={rails.to} data-mark="rail" data-letter={letter} data-from={rails.from} data-to={rails.to} />
        <line x1={rails.x2} y1={rails.from} x2={rails.x2} y2={rails.to} />
      </g>
      {column.rungs.map((rung) => (
        <g key={rung.key}>
          <line x1={rails.x1 - 1} y1={rung.y} x2={rails.x2 + 1} y2={rung.y} strokeWidth={3.5} className={hueStroke[hue]} data-mark="rung" data-letter={letter} data-key={rung.key} data-y={rung.y} />
          {rung.leader ? <path d={`M${rails.x2 + 1},${rung.y}L${rung.labelX - 2},${rung.labelY}`} fill="none" className="stroke-rule" /> : null}
          <text x={rung.labelX} y={rung.labelY + 4} className="lbl s halo" data-label={rung.key} data-y={rung.labelY}>
            {rung.name}
          </text>
        </g>
      ))}
      {whisker ? (
        <>
          <Interval across={whisker.x} low={whisker.low} high={whisker.high} upright className="stroke-ink" mark={`whisker-${letter}`} />
          <line x1={whisker.x - 5} y1={whisker.mid} x2={whisker.x + 5} y2={whisker.mid} strokeWidth={3} className="stroke-ink" />
        </>
      ) : null}
      <ValueLabel x={label.x} y={label.y} value={value} interval={interval} />
      <Tile letter={letter} x={footX + 8} y={bottom + 16} />
      {column.name.map((words, row) => (
        <text key={row} x={footX + 22} y={bottom + 20 + row * 15} className="lbl b">
          {words}
        </text>
      ))}
      {chance ? (
        <text x={footX} y={bottom + 23 + column.name.length * 15} className="iv-t">
          {chance}
        </text>
      ) : null}
    </g>
  );
}
