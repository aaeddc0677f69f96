import { describe, expect, test } from "vitest";
import { legalFindings } from "@/lib/packages/legal-findings";

const law = (over: Partial<Parameters<typeof legalFindings>[1][number]> = {}) => ({ code: "eve", maxDays: 112, maxDaysWithin: 365, daysUsed: null, ...over });
const item = (startDay: number, endDay: number | null) => ({ measureCode: "eve", startDay, endDay });

describe("structured law", () => {
  test("112 days in any 365 are lawful, 113 are not", () => {
    expect(legalFindings([item(0, 112)], [law()])).toEqual([]);
    expect(legalFindings([item(0, 113)], [law()])).toEqual([{ measureCode: "eve", kind: "tooLong", days: 113, allowedDays: 112, withinDays: 365 }]);
  });
  test("two runs in one window add up, in two windows they don't", () => {
    expect(legalFindings([item(0, 60), item(200, 260)], [law()])[0]?.days).toBe(120);
    expect(legalFindings([item(0, 100), item(365, 465)], [law()])).toEqual([]);
  });
  test("the worst window may start inside a run", () => {
    // Days 60 to 425 hold 40 + 85 days.
    expect(legalFindings([item(0, 100), item(340, 425)], [law()])[0]?.days).toBe(125);
  });
  test("without a window the whole schedule counts", () => {
    expect(legalFindings([item(0, 60), item(1000, 1060)], [law({ maxDaysWithin: null })])[0]).toMatchObject({ days: 120, withinDays: null });
  });
  test("days already used count as the days just before day 0", () => {
    expect(legalFindings([item(0, 100)], [law({ daysUsed: 12 })])).toEqual([]);
    expect(legalFindings([item(0, 100)], [law({ daysUsed: 13 })])[0]?.days).toBe(113);
    expect(legalFindings([item(364, 464)], [law({ daysUsed: 13 })])).toEqual([]);
  });
  test("a limited measure must end; an unlimited one needn't", () => {
    expect(legalFindings([item(0, null)], [law()])).toEqual([{ measureCode: "eve", kind: "noEnd", days: null, allowedDays: 112, withinDays: 365 }]);
    expect(legalFindings([item(0, null)], [law({ maxDays: null })])).toEqual([]);
  });
  test("other measures' lines don't count", () => expect(legalFindings([{ measureCode: "mask", startDay: 0, endDay: 500 }], [law()])).toEqual([]));
});
