/** A measure's structured law, as the catalogue holds it. */
export type MeasureLaw = { code: string; maxDays: number | null; maxDaysWithin: number | null; daysUsed: number | null };
export type ScheduledItem = { measureCode: string; startDay: number; endDay: number | null };

/** Where a schedule goes against structured law. */
export type LegalFinding = {
  measureCode: string;
  /** tooLong: more days than allowed (days already used counted); noEnd: never lifted although its duration is limited. */
  kind: "tooLong" | "noEnd";
  /** Days in force that count, null where there is no end. */
  days: number | null;
  allowedDays: number;
  /** The rolling window in which `allowedDays` counts; null: the whole schedule. */
  withinDays: number | null;
};

type Span = { from: number; to: number };

/**
 * Checks a schedule against the longest lawful duration of each of its measures. Days already used count as the days
 * just before day 0.
 */
export function legalFindings(items: readonly ScheduledItem[], laws: readonly MeasureLaw[]): LegalFinding[] {
  return laws.flatMap((law): LegalFinding[] => {
    const own = items.filter(({ measureCode }) => measureCode === law.code);
    if (law.maxDays === null || own.length === 0) return [];
    const common = { measureCode: law.code, allowedDays: law.maxDays, withinDays: law.maxDaysWithin };
    if (own.some(({ endDay }) => endDay === null)) return [{ ...common, kind: "noEnd", days: null }];
    const days = daysThatCount(own, law);
    return days > law.maxDays ? [{ ...common, kind: "tooLong", days }] : [];
  });
}

/**
 * Days of one measure that count against its longest lawful duration: the most in any of its windows, or all of them.
 * @param own the measure's items, each with an end
 */
export function daysThatCount(own: readonly ScheduledItem[], { daysUsed, maxDaysWithin }: Pick<MeasureLaw, "daysUsed" | "maxDaysWithin">): number {
  const spans: Span[] = own.map(({ startDay, endDay }) => ({ from: startDay, to: endDay ?? Number.POSITIVE_INFINITY }));
  if (daysUsed) spans.unshift({ from: -daysUsed, to: 0 });
  return mostDays(spans, maxDaysWithin);
}

/** What is left of a longest lawful duration after earlier orders; null: no limit. */
export const daysLeft = (maxDays: number | null, daysUsed: number | null): number | null => (maxDays === null ? null : Math.max(0, maxDays - (daysUsed ?? 0)));

/** Most days in force in any window of the given length; a window that holds most starts or ends with a span. */
function mostDays(spans: readonly Span[], within: number | null): number {
  const inside = (from: number, to: number) => spans.reduce((sum, span) => sum + Math.max(0, Math.min(span.to, to) - Math.max(span.from, from)), 0);
  if (within === null) return inside(Number.NEGATIVE_INFINITY, Number.POSITIVE_INFINITY);
  return Math.max(...spans.flatMap(({ from, to }) => [inside(from, from + within), inside(to - within, to)]));
}
