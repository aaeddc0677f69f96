import { scaleLinear } from "d3-scale";

export type StripItem = { key: string; name: string; startDay: number; endDay: number | null; leadTimeDays: number; maxDays: number | null };
/** Positions and widths in per cent of the strip; `over` is what of the bar lies past the longest lawful duration. */
export type StripRow = { key: string; name: string; y: number; bar: { x: number; width: number; open: boolean }; over: { x: number; width: number } | null; lead: { x: number; width: number } | null; law: { x: number; width: number; stop: boolean } | null };
export type StripModel = { height: number; rows: StripRow[]; months: { x: number; iso: string }[]; x: (day: number) => number };

/** So that a single day can be seen. */
const WIDTH_MIN = 0.3;
const ROW = 36;
const HEAD = 26;
const DAY_MS = 86_400_000;

/** Last day that a strip of these items should show. */
export function stripLastDay(items: readonly StripItem[]): number {
  const ends = items.flatMap(({ startDay, endDay, maxDays }) => [endDay ?? startDay + 180, maxDays ? Math.min(startDay + maxDays, (endDay ?? startDay) + 60) : 0]);
  return Math.max(90, ...ends) * 1.04;
}

/**
 * Geometry of a schedule: days from day 0 along x in per cent of the width, one row per item along y in pixels.
 * @param last shared by strips that are looked at together
 */
export function scheduleStrip(items: readonly StripItem[], dayZero: string, last = stripLastDay(items)): StripModel {
  const scale = scaleLinear([0, last], [0, 100]);
  const x = (day: number) => Number(scale(day).toFixed(3));
  const rows = items.map(({ key, name, startDay, endDay, leadTimeDays, maxDays }, index): StripRow => {
    const to = endDay ?? last;
    const lawful = maxDays === null ? null : startDay + maxDays;
    return {
      key,
      name,
      y: HEAD + index * ROW,
      bar: { x: x(startDay), width: Math.max(WIDTH_MIN, x(to) - x(startDay)), open: endDay === null },
      lead: leadTimeDays > 0 ? { x: Math.max(0, x(startDay - leadTimeDays)), width: x(startDay) - Math.max(0, x(startDay - leadTimeDays)) } : null,
      over: lawful !== null && lawful < to ? { x: x(lawful), width: x(to) - x(lawful) } : null,
      law: lawful !== null && lawful > to ? { x: x(to), width: x(Math.min(lawful, last)) - x(to), stop: lawful <= last } : null,
    };
  });
  return { height: HEAD + items.length * ROW + 1, rows, months: monthsBetween(dayZero, last).map(({ day, iso }) => ({ x: x(day), iso })), x };
}

/** First days of months from day 0 on. */
function monthsBetween(dayZero: string, lastDay: number): { day: number; iso: string }[] {
  const start = Date.parse(`${dayZero}T00:00:00Z`);
  const first = new Date(start);
  const months: { day: number; iso: string }[] = [];
  for (let month = 0; months.length < 60; month++) {
    const at = Date.UTC(first.getUTCFullYear(), first.getUTCMonth() + month, 1);
    const day = (at - start) / DAY_MS;
    if (day > lastDay) break;
    if (day >= 0) months.push({ day, iso: new Date(at).toISOString().slice(0, 10) });
  }
  return months;
}
