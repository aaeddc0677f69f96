import { legalFindings, type MeasureLaw } from "./legal-findings";

export type RuleMeasure = MeasureLaw & { id: string; name: string; ladder: string | null; leadTimeDays: number; reviewEveryDays: number | null };
export type RuleItem = { measureId: string; startDay: number; endDay: number | null };

/** What a schedule's checks say: stops refuses to compute, looks wants a person's eye, passes is said so that it is seen. */
export type PackageFinding =
  | { level: "stops"; code: "overlap" | "ladder"; measure: string; other: string }
  | { level: "looks"; code: "leadTime"; measure: string; days: number }
  | { level: "looks"; code: "tooLong" | "noEnd"; measure: string; days: number; allowed: number; within: number | null }
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
  const scheduled = items.flatMap(({ measureId, startDay, endDay }) => {
    const code = byId.get(measureId)?.code;
    return code === undefined ? [] : [{ measureCode: code, startDay, endDay }];
  });
  for (const { kind, measureCode, days, allowedDays, withinDays } of legalFindings(scheduled, measures)) {
    const measure = measures.find(({ code }) => code === measureCode);
    found.push({ level: "looks", code: kind, measure: measure?.name ?? measureCode, days: days ?? 0, allowed: allowedDays, within: withinDays });
  }
  if (items.length > 0) {
    const has = (...codes: string[]) => found.some(({ code }) => codes.includes(code));
    if (!has("overlap", "ladder")) found.push({ level: "passes", code: "ladders" });
    if (!has("leadTime")) found.push({ level: "passes", code: "leadTimes" });
    if (!has("tooLong", "noEnd")) found.push({ level: "passes", code: "lawful" });
  }
  return found;
}
