import type { RenderedMeasure } from "@/lib/briefings/rendered";
import { fromLeft, loads, percent, placeDay, scheduleAxis } from "@/lib/charts/public-schedule";

/** All steps of a briefing on one line: thicker where more of them are in force, with a mark at today. */
export function ScheduleLine({ measures, today, rtl }: { measures: readonly RenderedMeasure[]; today: string; rtl: boolean }) {
  const axis = scheduleAxis(measures);
  const stretches = loads(axis, measures);
  const most = Math.max(...stretches.map(({ inForce }) => inForce));
  const at = placeDay(axis, today);
  const mark = at === null ? null : fromLeft({ start: at, size: 0 }, rtl);
  return (
    <svg className="ptrack line" width="100%" height="18" aria-hidden="true">
      <line x2="100%" y1="9" y2="9" />
      {stretches.map((stretch) => {
        const height = stretch.inForce === most ? 10 : 4;
        return <rect key={stretch.start} x={fromLeft(stretch, rtl)} width={percent(stretch.size)} y={9 - height / 2} height={height} rx="1.5" />;
      })}
      {mark === null ? null : <line className="today" x1={mark} x2={mark} y2="18" />}
    </svg>
  );
}
