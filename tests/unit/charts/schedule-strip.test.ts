import { describe, expect, test } from "vitest";
import { type StripItem, scheduleStrip, stripLastDay } from "@/lib/charts/schedule-strip";

const item = (over: Partial<StripItem> = {}): StripItem => ({ key: "eve", name: "close 20:00", startDay: 98, endDay: 196, leadTimeDays: 4, maxDays: null, ...over });
const LAST = 250;
const row = (over: Partial<StripItem>) => scheduleStrip([item(over)], "2027-03-01", LAST).rows[0];
/** Drawn position → day, as a reader would. */
const dayAt = (percent: number | undefined) => ((percent ?? Number.NaN) / 100) * LAST;

describe("the schedule strip", () => {
  test("a bar begins on its first day and ends with its last", () => {
    const bar = row({})?.bar;
    expect(dayAt(bar?.x)).toBeCloseTo(98, 2);
    expect(dayAt((bar?.x ?? 0) + (bar?.width ?? 0))).toBeCloseTo(196, 2);
    expect(bar?.open).toBe(false);
  });
  test("a measure that is never lifted runs to the end of the strip", () => {
    const bar = row({ endDay: null })?.bar;
    expect(dayAt((bar?.x ?? 0) + (bar?.width ?? 0))).toBeCloseTo(LAST, 2);
    expect(bar?.open).toBe(true);
  });
  test("the lead time lies before the start and is cut at day 0", () => {
    const lead = row({})?.lead;
    expect([dayAt(lead?.x), dayAt((lead?.x ?? 0) + (lead?.width ?? 0))]).toEqual([expect.closeTo(94, 2), expect.closeTo(98, 2)]);
    expect(row({ startDay: 2, leadTimeDays: 7 })?.lead?.x).toBe(0);
    expect(row({ leadTimeDays: 0 })?.lead).toBeNull();
  });
  test("the longest lawful duration goes on from the end and stops where it is over", () => {
    const law = row({ maxDays: 112 })?.law;
    expect([dayAt(law?.x), dayAt((law?.x ?? 0) + (law?.width ?? 0)), law?.stop]).toEqual([expect.closeTo(196, 2), expect.closeTo(210, 2), true]);
    expect(row({ maxDays: 500 })?.law).toMatchObject({ stop: false });
    expect(row({ maxDays: 98 })?.law).toBeNull();
  });
  test("what lies past the longest lawful duration is told apart", () => {
    const over = row({ maxDays: 56 })?.over;
    expect([dayAt(over?.x), dayAt((over?.x ?? 0) + (over?.width ?? 0))]).toEqual([expect.closeTo(98 + 56, 2), expect.closeTo(196, 2)]);
    expect(row({ maxDays: 98 })?.over).toBeNull();
    expect(row({ endDay: null, maxDays: 56 })?.over).not.toBeNull();
  });
  test("a single day can be seen", () => expect(scheduleStrip([item({ startDay: 3, endDay: 4 })], "2027-03-01", 36_500).rows[0]?.bar.width).toBeGreaterThan(0.2));
  test("months stand on their first days", () => {
    const { months } = scheduleStrip([item()], "2027-02-27", LAST);
    expect(months.slice(0, 3).map(({ iso, x }) => [iso, Math.round(dayAt(x))])).toEqual([["2027-03-01", 2], ["2027-04-01", 33], ["2027-05-01", 63]]);
    expect(months.every(({ x }) => x >= 0 && x <= 100)).toBe(true);
  });
  test("strips that are looked at together can share a scale, and each shows all of its bars", () => {
    const [a, b] = [[item({ endDay: 120 })], [item({ endDay: 300 })]];
    const last = stripLastDay([...a, ...b]);
    expect(last).toBeGreaterThan(300);
    expect(scheduleStrip(a, "2027-03-01", last).rows[0]?.bar.x).toBe(scheduleStrip(b, "2027-03-01", last).rows[0]?.bar.x);
    for (const items of [a, b]) for (const { bar } of scheduleStrip(items, "2027-03-01").rows) expect(bar.x + bar.width).toBeLessThan(100);
  });
});
