import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { fromLeft, labelEvery, loads, percent, placeDay, placeSpan, scheduleAxis, type Span } from "@/lib/charts/public-schedule";

const DAY_MS = 86_400_000;
const iso = (day: number) => new Date(Date.UTC(2027, 0, 1) + day * DAY_MS).toISOString().slice(0, 10);
const span = fc
  .record({ start: fc.integer({ min: 0, max: 700 }), length: fc.integer({ min: 1, max: 400 }), open: fc.boolean() })
  .map(({ start, length, open }): Span => ({ from: iso(start), to: open ? null : iso(start + length - 1) }));
const spans = fc.array(span, { minLength: 1, maxLength: 8 });
const daysBetween = (from: string, until: string) => (Date.parse(until) - Date.parse(from)) / DAY_MS;

describe("axis of a schedule", () => {
  test("begins and ends at the first of a month and holds every span", () => {
    fc.assert(
      fc.property(spans, (all) => {
        const axis = scheduleAxis(all);
        expect(axis.from.endsWith("-01") && axis.until.endsWith("-01")).toBe(true);
        for (const each of all) {
          const { start, size } = placeSpan(axis, each);
          expect(start).toBeGreaterThanOrEqual(0);
          expect(size).toBeGreaterThan(0);
          expect(start + size).toBeLessThanOrEqual(1 + 1e-12);
          if (each.to === null) expect(start + size).toBeCloseTo(1, 12);
        }
      }),
    );
  });

  test("places a span so that its days can be read back, the last one included", () => {
    fc.assert(
      fc.property(spans, (all) => {
        const axis = scheduleAxis(all);
        const days = daysBetween(axis.from, axis.until);
        for (const each of all) {
          const { start, size } = placeSpan(axis, each);
          expect(iso(Math.round(start * days) + daysBetween(iso(0), axis.from))).toBe(each.from);
          if (each.to !== null) expect(Math.round(size * days)).toBe(daysBetween(each.from, each.to) + 1);
        }
      }),
    );
  });

  test("names months in order, one mark each, at most twelve names", () => {
    const axis = scheduleAxis([{ from: "2027-03-08", to: "2027-10-10" }]);
    expect(axis.months.map(({ iso }) => iso.slice(0, 7))).toEqual(["2027-03", "2027-04", "2027-05", "2027-06", "2027-07", "2027-08", "2027-09", "2027-10"]);
    expect(axis.until).toBe("2027-11-01");
    expect(labelEvery(axis)).toBe(1);
    expect(Math.ceil(30 / labelEvery(scheduleAxis([{ from: "2027-01-01", to: "2029-06-30" }])))).toBeLessThanOrEqual(12);
  });

  test("the demonstration's evening closure lies where its dates say", () => {
    const axis = scheduleAxis([{ from: "2027-03-08", to: "2027-10-10" }, { from: "2027-06-07", to: "2027-09-12" }]);
    expect(placeSpan(axis, { from: "2027-06-07", to: "2027-09-12" })).toEqual({ start: 98 / 245, size: 98 / 245 });
  });

  test("without a measure there is no axis", () => expect(() => scheduleAxis([])).toThrow(RangeError));
});

describe("right to left", () => {
  test("mirrors a bar about the middle", () => {
    expect(fromLeft({ start: 0.1, size: 0.3 }, false)).toBe("10%");
    expect(fromLeft({ start: 0.1, size: 0.3 }, true)).toBe("60%");
    expect(percent(1 / 3)).toBe("33.33%");
  });
});

describe("days and loads", () => {
  test("a day is placed only where the axis holds it", () => {
    const axis = scheduleAxis([{ from: "2027-03-08", to: "2027-03-20" }]);
    expect(placeDay(axis, "2027-03-01")).toBe(0);
    expect(placeDay(axis, "2027-02-28")).toBeNull();
    expect(placeDay(axis, "2027-04-01")).toBeNull();
  });

  test("count the measures in force on every day", () => {
    fc.assert(
      fc.property(spans, (all) => {
        const axis = scheduleAxis(all);
        const days = daysBetween(axis.from, axis.until);
        const first = daysBetween(iso(0), axis.from);
        const stretches = loads(axis, all);
        for (let day = 0; day < days; day += 7) {
          const date = iso(first + day);
          const inForce = all.filter(({ from, to }) => from <= date && (to === null || to >= date)).length;
          const at = (day + 0.5) / days;
          expect(stretches.find(({ start, size }) => start <= at && at < start + size)?.inForce ?? 0).toBe(inForce);
        }
      }),
    );
  });
});
