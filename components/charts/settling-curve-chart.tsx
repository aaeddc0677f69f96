import { useTranslations } from "next-intl";
import { packageHue } from "@/components/ui/marks";
import type { Cross, SettlingModel } from "@/lib/charts/settling-curve";
import { type ChartTable, ChartFrame, NARROW, WIDE } from "./chart-frame";
import { hueDash, hueStroke, Interval, Tile } from "./mark-parts";

export function SettlingCurveChart({ wide, narrow, numberLocale, table, desc }: { wide: SettlingModel; narrow: SettlingModel; numberLocale: string; table: ChartTable; desc: string }) {
  const t = useTranslations("Charts");
  return (
    <ChartFrame id="settling" title={t("settling.title")} description={t("settling.description")} how={t("settling.how")} table={table}>
      <Drawing model={wide} id="settling-w" className={WIDE} numberLocale={numberLocale} desc={desc} />
      <Drawing model={narrow} id="settling-n" className={NARROW} numberLocale={numberLocale} desc={desc} />
    </ChartFrame>
  );
}

export function Drawing({ model, id, className, numberLocale, desc }: { model: SettlingModel; id: string; className: string; numberLocale: string; desc: string }) {
  const t = useTranslations("Charts");
  const { width, height, left, right, top, bottom, line } = model;
  const count = new Intl.NumberFormat(numberLocale, { maximumFractionDigits: 0 });
  const ratio = new Intl.NumberFormat(numberLocale, { minimumFractionDigits: 1, maximumFractionDigits: 2 });
  return (
    <svg viewBox={`0 0 ${width} ${height}`} width={width} height={height} role="img" aria-labelledby={`${id}-t ${id}-d`} className={className}>
      <title id={`${id}-t`}>{t("settling.title")}</title>
      <desc id={`${id}-d`}>{desc}</desc>
      {model.water.map(({ x, opacity }) => (
        <line key={x} x1={x} y1={top} x2={x} y2={bottom} className="stroke-water" opacity={opacity * 0.8} />
      ))}
      {model.yTicks.map(({ value, at }) => (
        <g key={value} data-y-tick={value} data-at={at}>
          <line x1={left - 5} y1={at} x2={left} y2={at} className="stroke-rule" />
          <text x={left - 9} y={at + 4} textAnchor="end" className="ax">
            {count.format(value)}
          </text>
        </g>
      ))}
      {model.xTicks.map(({ value, at }) => (
        <g key={value} data-x-tick={value} data-at={at}>
          <line x1={at} y1={bottom} x2={at} y2={bottom + 5} className="stroke-rule" />
          <text x={at} y={bottom + 20} textAnchor="middle" className={value === 1 ? "lbl s b" : "ax"}>
            {ratio.format(value)}
          </text>
        </g>
      ))}
      <path d={`M${left},${top}V${bottom}H${right}`} fill="none" className="stroke-rule" />
      <line x1={line} y1={top - 8} x2={line} y2={bottom} strokeWidth={2} className="stroke-ink" />
      <text x={line - 7} y={top - 1} textAnchor="end" className="axl halo">
        {t("grows")}
      </text>
      <text x={line + 7} y={top - 1} className="axl halo">
        {t("diesOut")}
      </text>
      <text x={0} y={12} className="axl">
        {t("settling.yAxis")}
      </text>
      <text x={right} y={height - 6} textAnchor="end" className="axl">
        {t("settling.xAxis")}
      </text>
      <path d={model.curve} fill="none" strokeWidth={2} className="stroke-ink" data-mark="curve" />
      {model.labels.map(({ leader }, index) => (leader ? <line key={index} {...leader} className="stroke-rule" /> : null))}
      <Arms at={model.none} className="stroke-pkg-n" />
      <circle cx={model.none.x} cy={model.none.y} r={4.5} strokeWidth={2} className="fill-paper stroke-pkg-n" data-mark="none" data-x={model.none.x} data-y={model.none.y} />
      {model.marks.map(({ letter, held, scheduled }) => {
        const hue = hueStroke[packageHue(letter)];
        return (
          <g key={letter}>
            <Arms at={held} className={hue} mark={`held-${letter}`} />
            <path d={`M${held.x},${held.y}H${scheduled.x}V${scheduled.y}`} fill="none" strokeWidth={1.5} strokeDasharray={hueDash[packageHue(letter)] ?? "2 3"} className={hue} />
            <Arms at={scheduled} className={hue} thin mark={`scheduled-${letter}`} />
            <Tile letter={letter} x={scheduled.x} y={scheduled.y} open mark="scheduled" />
            <Tile letter={letter} x={held.x} y={held.y} mark="held" />
          </g>
        );
      })}
      {model.labels.map(({ x, y, anchor, lines }, index) => (
        <g key={index}>
          {lines.map((text, row) => (
            <text key={row} x={x} y={y + row * 14} textAnchor={anchor} className={row === 0 ? "lbl b halo" : "iv-t halo"}>
              {text}
            </text>
          ))}
        </g>
      ))}
    </svg>
  );
}

function Arms({ at, className, thin = false, mark }: { at: Cross; className: string; thin?: boolean; mark?: string }) {
  const shared = { className, width: thin ? 1 : 1.5, cap: thin ? 3 : 4 };
  return (
    <>
      {at.horizontal ? <Interval across={at.y} low={at.horizontal.low} high={at.horizontal.high} upright={false} {...shared} {...(mark ? { mark: `${mark}-ratio` } : {})} /> : null}
      {at.vertical ? <Interval across={at.x} low={at.vertical.low} high={at.vertical.high} upright {...shared} {...(mark ? { mark } : {})} /> : null}
    </>
  );
}
