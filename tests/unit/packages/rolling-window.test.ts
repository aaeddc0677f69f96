import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { daysThatCount, legalFindings, type ScheduledItem } from "@/lib/packages/legal-findings";

/** Runs of whole days that don't overlap, in order. */
const schedule = fc
  .array(fc.tuple(fc.integer({ min: 0, max: 120 }), fc.integer({ min: 1, max: 120 })), { minLength: 1, maxLength: 6 })
  .map((pieces) => {
    let day = 0;
    return pieces.map(([gap, length]): ScheduledItem => {
      const startDay = day + gap;
      day = startDay + length;
      return { measureCode: "eve", startDay, endDay: day };
    });
  });
const within = fc.option(fc.integer({ min: 1, max: 400 }));
const used = fc.integer({ min: 0, max: 90 });

/** Day by day: is it in force, and how many such days has the fullest window? */
function counted(items: readonly ScheduledItem[], maxDaysWithin: number | null, daysUsed: number): number {
  const last = Math.max(...items.map(({ endDay }) => endDay ?? 0));
  const inForce = (day: number) => (day < 0 ? day >= -daysUsed : items.some(({ startDay, endDay }) => startDay <= day && day < (endDay ?? 0)));
  const days = Array.from({ length: last + daysUsed }, (_, index) => (inForce(index - daysUsed) ? 1 : 0));
  if (maxDaysWithin === null) return days.reduce<number>((sum, each) => sum + each, 0);
  let most = 0;
  for (let first = -maxDaysWithin; first < days.length; first++) most = Math.max(most, days.slice(Math.max(0, first), Math.max(0, first + maxDaysWithin)).reduce<number>((sum, each) => sum + each, 0));
  return most;
}

describe("days that count in a rolling window", () => {
  test("equal a count day by day", () => {
    fc.assert(
      fc.property(schedule, within, used, (items, maxDaysWithin, daysUsed) => {
        expect(daysThatCount(items, { maxDaysWithin, daysUsed })).toBe(counted(items, maxDaysWithin, daysUsed));
      }),
      { numRuns: 300 },
    );
  });

  test("never exceed the window nor the whole schedule", () => {
    fc.assert(
      fc.property(schedule, fc.integer({ min: 1, max: 400 }), (items, maxDaysWithin) => {
        const days = daysThatCount(items, { maxDaysWithin, daysUsed: null });
        expect(days).toBeLessThanOrEqual(maxDaysWithin);
        expect(days).toBeLessThanOrEqual(daysThatCount(items, { maxDaysWithin: null, daysUsed: null }));
      }),
    );
  });

  test("don't change when the whole schedule is moved, without earlier days", () => {
    fc.assert(
      fc.property(schedule, within, fc.integer({ min: 1, max: 500 }), (items, maxDaysWithin, by) => {
        const moved = items.map((each) => ({ ...each, startDay: each.startDay + by, endDay: (each.endDay ?? 0) + by }));
        expect(daysThatCount(moved, { maxDaysWithin, daysUsed: null })).toBe(daysThatCount(items, { maxDaysWithin, daysUsed: null }));
      }),
    );
  });

  test("only grow with a longer window or more days used", () => {
    fc.assert(
      fc.property(schedule, fc.integer({ min: 1, max: 300 }), used, fc.integer({ min: 0, max: 50 }), (items, maxDaysWithin, daysUsed, more) => {
        const days = daysThatCount(items, { maxDaysWithin, daysUsed });
        expect(daysThatCount(items, { maxDaysWithin: maxDaysWithin + more, daysUsed })).toBeGreaterThanOrEqual(days);
        expect(daysThatCount(items, { maxDaysWithin, daysUsed: daysUsed + more })).toBeGreaterThanOrEqual(days);
      }),
    );
  });
});

test("a schedule is unlawful exactly where more days count than are allowed", () => {
  fc.assert(
    fc.property(schedule, within, fc.integer({ min: 1, max: 200 }), used, (items, maxDaysWithin, maxDays, daysUsed) => {
      const found = legalFindings(items, [{ code: "eve", maxDays, maxDaysWithin, daysUsed }]);
      const days = counted(items, maxDaysWithin, daysUsed);
      expect(found).toEqual(days > maxDays ? [{ measureCode: "eve", kind: "tooLong", days, allowedDays: maxDays, withinDays: maxDaysWithin }] : []);
    }),
  );
});
