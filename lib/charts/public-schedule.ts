/** A measure in force: ISO dates, `to` is the last day in force, null where no end is set. */
export type Span = { from: string; to: string | null };
/** Share of the axis, 0 at its start. */
export type Placed = { start: number; size: number };
export type Axis = {
  /** ISO date of the first day, and of the first day no longer on the axis: both first of a month. */
  from: string;
  until: string;
  months: { iso: string; at: number }[];
};

const DAY_MS = 86_400_000;
const day = (iso: string): number => Math.round(Date.parse(`${iso.slice(0, 10)}T00:00:00Z`) / DAY_MS);
const isoOf = (dayNumber: number): string => new Date(dayNumber * DAY_MS).toISOString().slice(0, 10);
/** First of the month, `months` after the month that holds `iso`. */
function firstOfMonth(iso: string, months = 0): string {
  const date = new Date(`${iso.slice(0, 10)}T00:00:00Z`);
  return isoOf(Math.round(Date.UTC(date.getUTCFullYear(), date.getUTCMonth() + months, 1) / DAY_MS));
}

/** Months drawn beyond the last known day where a measure has no end. */
const OPEN_MONTHS = 3;

/** Whole months that hold every span. @throws RangeError without spans */
export function scheduleAxis(spans: readonly Span[]): Axis {
  if (spans.length === 0) throw new RangeError("a schedule needs a measure");
  const first = spans.map((span) => span.from).sort()[0] ?? "";
  const last = spans.map((span) => span.to ?? span.from).sort().at(-1) ?? "";
  const from = firstOfMonth(first);
  const until = firstOfMonth(last, spans.some((span) => span.to === null) ? 1 + OPEN_MONTHS : 1);
  const months: Axis["months"] = [];
  for (let at = from; at < until; at = firstOfMonth(at, 1)) months.push({ iso: at, at: shareOf(at, from, until) });
  return { from, until, months };
}

const shareOf = (iso: string, from: string, until: string): number => (day(iso) - day(from)) / (day(until) - day(from));

/** Where a span lies; its last day is wholly inside. */
export function placeSpan(axis: Axis, { from, to }: Span): Placed {
  const start = shareOf(from, axis.from, axis.until);
  const end = to === null ? 1 : (day(to) + 1 - day(axis.from)) / (day(axis.until) - day(axis.from));
  return { start, size: end - start };
}

/** Where a day lies, or null if the axis doesn't hold it. */
export function placeDay(axis: Axis, iso: string): number | null {
  const at = shareOf(iso, axis.from, axis.until);
  return at >= 0 && at < 1 ? at : null;
}

/** Stretches of days with the same number of measures in force; those with none are left out. */
export function loads(axis: Axis, spans: readonly Span[]): (Placed & { inForce: number })[] {
  const edges = new Set<number>();
  for (const { from, to } of spans) {
    edges.add(day(from));
    edges.add(to === null ? day(axis.until) : day(to) + 1);
  }
  const days = [...edges].sort((a, b) => a - b);
  const whole = day(axis.until) - day(axis.from);
  return days.slice(0, -1).flatMap((start, index) => {
    const end = days[index + 1] ?? start;
    const inForce = spans.filter((span) => day(span.from) <= start && (span.to === null || day(span.to) >= start)).length;
    return inForce === 0 ? [] : [{ start: (start - day(axis.from)) / whole, size: (end - start) / whole, inForce }];
  });
}

/**
 * Share of the axis as a per cent for SVG, measured from the left.
 * @param rtl time runs from the right
 */
export function fromLeft({ start, size }: Placed, rtl: boolean): string {
  return percent(rtl ? 1 - start - size : start);
}
export const percent = (share: number): string => `${Number((share * 100).toFixed(2))}%`;

/** Every how many months a name stands on the axis, so that at most twelve do. */
export const labelEvery = (axis: Axis): number => Math.ceil(axis.months.length / 12);
