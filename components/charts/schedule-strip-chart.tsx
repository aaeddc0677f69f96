import type { SVGAttributes } from "react";
import { type StripItem, type StripRow, scheduleStrip } from "@/lib/charts/schedule-strip";
import { packageHue } from "@/components/ui/marks";

const FILL = { a: "var(--pkg-a)", b: "var(--pkg-b)", c: "var(--pkg-c)", n: "var(--pkg-n)" } as const;

type Props = {
  items: StripItem[];
  dayZero: string;
  letter: string;
  title: string;
  description: string;
  monthOf: (iso: string) => string;
  dateOfDay: (day: number) => string;
  /** Last day shown, where strips share a scale. */
  last?: number;
  /** When an item is in force, in words. */
  spanOf: (item: StripItem) => string;
  /** Moves an item by whole days; bars then take the keyboard's focus. */
  onMove?: (index: number, days: number) => void;
};

const STEP: Record<string, number> = { ArrowLeft: -1, ArrowDown: -1, ArrowRight: 1, ArrowUp: 1 };

/** A package's schedule: names in the margin, bars in the package's colour, dates on the bars. */
export function ScheduleStripChart({ items, dayZero, letter, title, description, monthOf, dateOfDay, last, spanOf, onMove }: Props) {
  const model = scheduleStrip(items, dayZero, last);
  const colour = FILL[packageHue(letter)];
  const at = (percent: number) => `${percent}%`;
  return (
    // biome-ignore lint/a11y/noNoninteractiveTabindex: a frame that scrolls must be reachable by keyboard
    <section aria-label={title} tabIndex={0} className="overflow-x-auto py-1">
      <div className="grid min-w-[720px] grid-cols-[150px_minmax(0,1fr)] gap-x-4 pe-1 md:grid-cols-[220px_minmax(0,1fr)]">
        <ul className="pt-[26px]">
          {model.rows.map((row) => (
            <li key={row.key} className="flex h-9 items-center overflow-hidden border-t border-hair text-13 font-medium leading-tight first:border-rule">
              {row.name}
            </li>
          ))}
        </ul>
        <svg width="100%" height={model.height} role={onMove ? "group" : "img"} aria-label={title}>
          <title>{title}</title>
          <desc>{description}</desc>
          {model.months.map(({ x, iso }) => (
            <g key={iso}>
              <line x1={at(x)} x2={at(x)} y1="18" y2={model.height} className="stroke-hair" />
              <text className="ax" x={at(x)} dx="4" y="14">
                {monthOf(iso)}
              </text>
            </g>
          ))}
          {model.rows.map((row, index) => (
            <Row key={row.key} row={row} item={items[index] as StripItem} first={index === 0} colour={colour} dateOfDay={dateOfDay} spanOf={spanOf} {...(onMove ? { move: (days: number) => onMove(index, days) } : {})} />
          ))}
        </svg>
      </div>
    </section>
  );
}

type RowProps = Pick<Props, "dateOfDay" | "spanOf"> & { row: StripRow; item: StripItem; first: boolean; colour: string; move?: (days: number) => void };

function Row({ row, item, first, colour, dateOfDay, spanOf, move }: RowProps) {
  const at = (percent: number) => `${percent}%`;
  const { bar, over, lead, law } = row;
  const [top, middle, end] = [row.y + 7, row.y + 18, bar.x + bar.width];
  return (
    <g>
      <line x1="0" x2="100%" y1={row.y} y2={row.y} className={first ? "stroke-rule" : "stroke-hair"} />
      {lead ? <rect x={at(lead.x)} y={top} width={at(lead.width)} height="22" fill="none" strokeDasharray="3 3" className="stroke-rule" /> : null}
      {law ? <line x1={at(law.x)} x2={at(law.x + law.width)} y1={middle} y2={middle} strokeWidth="1.5" strokeDasharray="4 4" className="stroke-rule" /> : null}
      {law?.stop ? <line x1={at(law.x + law.width)} x2={at(law.x + law.width)} y1={middle - 6} y2={middle + 6} strokeWidth="1.5" className="stroke-rule" /> : null}
      <g {...(move ? handle(item, spanOf(item), move) : {})}>
        <rect data-mark={item.name} x={at(bar.x)} y={top} width={at(bar.width)} height="22" rx="2" fill={colour} />
        {over ? <rect x={at(over.x)} y={top + 3} width={at(over.width)} height="16" data-mark={`${item.name} over`} className="fill-paper" /> : null}
        {over ? <line x1={at(end)} x2={at(end)} y1={top} y2={top + 22} strokeWidth="2" stroke={colour} /> : null}
        {move ? <rect x={at(bar.x)} y={top - 3} width={at(bar.width)} height="28" rx="3" fill="none" strokeWidth="2" className="invisible stroke-focus group-focus-visible:visible" /> : null}
      </g>
      {bar.width > 9 ? (
        <text x={at(bar.x)} dx="8" y={middle + 4} className="pointer-events-none fill-on-pkg text-12">
          {dateOfDay(item.startDay)}
        </text>
      ) : null}
      {bar.width > 20 && item.endDay !== null && (!over || over.width > 9) ? (
        <text x={at(end)} dx="-8" y={middle + 4} textAnchor="end" className={`pointer-events-none text-12 ${over ? "fill-ink" : "fill-on-pkg"}`}>
          {dateOfDay(item.endDay - 1)}
        </text>
      ) : null}
    </g>
  );
}

/** A bar as a control: arrow keys move it a day, with Shift a week. */
function handle({ name, startDay }: StripItem, words: string, move: (days: number) => void): SVGAttributes<SVGGElement> {
  return {
    tabIndex: 0,
    role: "slider",
    "aria-label": name,
    "aria-valuemin": 0,
    "aria-valuenow": startDay,
    "aria-valuetext": words,
    className: "group outline-none",
    onKeyDown: (event) => {
      const step = STEP[event.key];
      if (step === undefined || event.altKey || event.ctrlKey || event.metaKey) return;
      event.preventDefault();
      move(event.shiftKey ? step * 7 : step);
    },
  };
}
