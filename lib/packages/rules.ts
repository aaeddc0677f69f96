import { daysThatCount, legalFindings, type MeasureLaw, type ScheduledItem } from "./legal-findings";

export type RuleMeasure = MeasureLaw & { id: string; name: string; legalBasis: string; ladder: string | null; leadTimeDays: number; reviewEveryDays: number | null };
export type RuleItem = { measureId: string; startDay: number; endDay: number | null };

/** What a schedule's checks say: stops refuses to compute, looks wants a person's eye, passes is said so that it is seen. */
export type PackageFinding =
  | { level: "stops"; code: "overlap" | "ladder"; measure: string; other: string }
  | { level: "looks"; code: "leadTime"; measure: string; days: number }
  | { level: "looks"; code: "tooLong" | "noEnd"; measure: string; days: number; allowed: number; within: number | null }
  | { level: "looks"; code: "nearLimit"; measure: string; days: number; allowed: number; within: number | null; lastDay: number; legalBasis: string }
  | { level: "looks"; code: "review"; measure: string; every: number; dueDays: number[] }
  | { level: "looks"; code: "empty" }
  | { level: "passes"; code: "ladders" | "leadTimes" | "lawful" };

const together = (a: RuleItem, b: RuleItem) => a.startDay < (b.endDay ?? Number.POSITIVE_INFINITY) && b.startDay < (a.endDay ?? Number.POSITIVE_INFINITY);

/** Checks a package's schedule: one rung of a ladder on any day, lead time kept, structured law kept. Days from day 0. */
export function checkPackage(items: readonly RuleItem[], measures: readonly RuleMeasure[]): PackageFinding[] {
  const byId = new Map(measures.map((measure) => [measure.id, measure]));
  const found: PackageFinding[] = [];
  if (items.length === 0) found.push({ level: "looks", code: "empty" });
  for (const [i, item] of items.entries()) {
    const measure = byId.get(item.measureId);
    if (!measure) continue;
    for (const other of items.slice(0, i)) {
      const second = byId.get(other.measureId);
      if (!second || !together(item, other)) continue;
      if (item.measureId === other.measureId) found.push({ level: "stops", code: "overlap", measure: measure.name, other: second.name });
      else if (measure.ladder !== null && measure.ladder === second.ladder) found.push({ level: "stops", code: "ladder", measure: measure.name, other: second.name });
    }
    if (item.startDay < measure.leadTimeDays) found.push({ level: "looks", code: "leadTime", measure: measure.name, days: measure.leadTimeDays });
  }
  const scheduled = items.flatMap(({ measureId, startDay, endDay }): ScheduledItem[] => {
    const code = byId.get(measureId)?.code;
    return code === undefined ? [] : [{ measureCode: code, startDay, endDay }];
  });
  for (const { kind, measureCode, days, allowedDays, withinDays } of legalFindings(scheduled, measures)) {
    const measure = measures.find(({ code }) => code === measureCode);
    found.push({ level: "looks", code: kind, measure: measure?.name ?? measureCode, days: days ?? 0, allowed: allowedDays, within: withinDays });
  }
  for (const measure of measures) {
    const own = scheduled.filter(({ measureCode }) => measureCode === measure.code);
    found.push(...nearLimit(measure, own), ...reviews(measure, own));
  }
  if (items.length > 0) {
    const has = (...codes: string[]) => found.some(({ code }) => codes.includes(code));
    if (!has("overlap", "ladder")) found.push({ level: "passes", code: "ladders" });
    if (!has("leadTime")) found.push({ level: "passes", code: "leadTimes" });
    if (!has("tooLong", "noEnd")) found.push({ level: "passes", code: "lawful" });
  }
  return found;
}

/** From this share of a lawful duration on, a person should know how much is left. */
const NEAR_LIMIT = 0.75;

function nearLimit({ name: measure, maxDays: allowed, legalBasis, ...law }: RuleMeasure, own: readonly ScheduledItem[]): PackageFinding[] {
  const last = own.reduce<ScheduledItem | null>((latest, item) => (latest === null || (item.endDay ?? 0) > (latest.endDay ?? 0) ? item : latest), null);
  if (allowed === null || last?.endDay == null || own.some(({ endDay }) => endDay === null)) return [];
  const days = daysThatCount(own, law);
  if (days > allowed || days < NEAR_LIMIT * allowed) return [];
  // What is left in the fullest window is a lower bound; a window that has moved on may leave more.
  const longer = (more: number) => own.map((item) => (item === last && item.endDay !== null ? { ...item, endDay: item.endDay + more } : item));
  let more = Math.floor(allowed - days);
  while (more < allowed && daysThatCount(longer(more + 1), law) <= allowed) more++;
  return [{ level: "looks", code: "nearLimit", measure, days, allowed, within: law.maxDaysWithin, lastDay: Math.ceil(last.endDay) + more - 1, legalBasis }];
}

/** At most this many dates are listed. */
const REVIEWS_MAX = 6;

/** Days on which the law wants a measure looked at again, while it is in force. */
function reviews({ name: measure, reviewEveryDays: every }: RuleMeasure, own: readonly ScheduledItem[]): PackageFinding[] {
  if (every === null) return [];
  const dueDays = own.flatMap(({ startDay, endDay }) => {
    const due: number[] = [];
    for (let day = startDay + every; day < (endDay ?? Number.POSITIVE_INFINITY) && due.length < REVIEWS_MAX; day += every) due.push(day);
    return due;
  });
  return dueDays.length === 0 ? [] : [{ level: "looks", code: "review", measure, every, dueDays: dueDays.toSorted((a, b) => a - b).slice(0, REVIEWS_MAX) }];
}
