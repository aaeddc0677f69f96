import { type StripItem, scheduleStrip } from "@/lib/charts/schedule-strip";
import { packageHue } from "@/components/ui/marks";

const FILL = { a: "var(--pkg-a)", b: "var(--pkg-b)", c: "var(--pkg-c)", n: "var(--pkg-n)" } as const;

type Props = { items: StripItem[]; dayZero: string; letter: string; title: string; description: string; monthOf: (iso: string) => string; dateOfDay: (day: number) => string };

/** A package's schedule: names in the margin, bars in the package's colour, dates on the bars. */
export function ScheduleStripChart({ items, dayZero, letter, title, description, monthOf, dateOfDay }: Props) {
  const model = scheduleStrip(items, dayZero, 820);
  const colour = FILL[packageHue(letter)];
  return (
    <div className="overflow-x-auto">
      <div className="grid min-w-[760px] grid-cols-[220px_minmax(0,1fr)] gap-x-4">
        <ul className="pt-[26px]">
          {model.rows.map((row) => (
            <li key={row.key} className="flex h-9 items-center overflow-hidden border-b border-hair text-13 leading-tight">
              {row.name}
            </li>
          ))}
        </ul>
        <svg viewBox={`0 0 ${model.width} ${model.height}`} className="h-auto w-full" role="img" aria-label={title}>
          <title>{title}</title>
          <desc>{description}</desc>
          {model.months.map(({ x, iso }) => (
            <g key={iso}>
              <path d={`M${x},18V${model.height}`} stroke="var(--hair)" />
              <text className="ax" x={x + 4} y={14}>
                {monthOf(iso)}
              </text>
            </g>
          ))}
          {model.rows.map((row, index) => {
            const item = items[index];
            const middle = row.y + 18;
            return (
              <g key={row.key}>
                <path d={`M0,${row.y + 36}H${model.width}`} stroke="var(--hair)" />
                {row.lead ? <rect x={row.lead.x} y={row.y + 7} width={row.lead.width} height="22" fill="none" stroke="var(--rule)" strokeDasharray="3 3" /> : null}
                <rect data-mark={row.key} x={row.bar.x} y={row.y + 7} width={row.bar.width} height="22" rx="2" fill={colour} />
                {row.bar.width > 48 ? (
                  <text x={row.bar.x + 8} y={middle + 4} fontSize="12" fill="var(--on-pkg)">
                    {dateOfDay(item?.startDay ?? 0)}
                  </text>
                ) : null}
                {row.bar.width > 110 && item?.endDay != null ? (
                  <text x={row.bar.x + row.bar.width - 8} y={middle + 4} fontSize="12" fill="var(--on-pkg)" textAnchor="end">
                    {dateOfDay(item.endDay - 1)}
                  </text>
                ) : null}
                {row.law ? <path d={`M${row.law.x},${middle}h${row.law.width}`} stroke="var(--rule)" strokeWidth="2" strokeDasharray="4 4" /> : null}
                {row.law?.stop ? <path d={`M${row.law.x + row.law.width},${middle - 6}v12`} stroke="var(--rule)" strokeWidth="2" /> : null}
              </g>
            );
          })}
        </svg>
      </div>
    </div>
  );
}
