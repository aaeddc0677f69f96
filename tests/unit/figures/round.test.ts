import { describe, expect, test } from "vitest";
import { formatMoney, formatPercent, formatPersons, formatRatio, moneyUnit } from "@/lib/figures/format";
import { isFew, isMeasurable, percentShown, threeFigures, wholePersons } from "@/lib/figures/round";

describe("rounding", () => {
  test.each([
    [2032.3289, 2030],
    [376.4, 376],
    [0.476316, 0.476],
    [-58.449, -58.4],
    [0, 0],
    [-0, 0],
    [99_949, 99_900],
    [99_951, 100_000],
  ])("threeFigures(%d) is %d", (value, shown) => expect(threeFigures(value)).toBe(shown));
  test("persons are whole", () => {
    expect(wholePersons(5.2683)).toBe(5);
    expect(wholePersons(-0.3)).toBe(0);
    expect(Object.is(wholePersons(-0.3), 0)).toBe(true);
  });
  test("below ten is few, on both sides of zero", () => {
    expect([9.999, -9.999, 10, -10].map(isFew)).toEqual([true, true, false, false]);
  });
  test("averted deaths are measurable from ten on where the interval leaves zero out", () => {
    expect(isMeasurable(450, { low: 105, high: 862 })).toBe(true);
    expect(isMeasurable(450, { low: -1, high: 862 })).toBe(false);
    expect(isMeasurable(9.9, { low: 5, high: 12 })).toBe(false);
    expect(isMeasurable(-58, { low: -189, high: -2 })).toBe(true);
    expect(isMeasurable(12, null)).toBe(true);
  });
  test("a chance is never rounded to never or always", () => {
    expect(percentShown(0)).toEqual({ bound: "under", percent: 1 });
    expect(percentShown(0.0099)).toEqual({ bound: "under", percent: 1 });
    expect(percentShown(0.148)).toEqual({ bound: "plain", percent: 15 });
    expect(percentShown(0.9951)).toEqual({ bound: "over", percent: 99 });
    expect(percentShown(1)).toEqual({ bound: "plain", percent: 100 });
  });
});

describe("formats", () => {
  test("persons are grouped and carry a true minus", () => {
    expect(formatPersons(2032.33, "en-u-nu-latn")).toBe("2,030");
    expect(formatPersons(-107.2, "en-u-nu-latn")).toBe("−107");
    expect(formatPersons(2032.33, "fr-u-nu-latn")).toMatch(/^2\s030$/);
  });
  test("ratios keep two decimals", () => {
    expect([0.476316, 0.999, 1.39485, 12.344].map((b) => formatRatio(b, "en"))).toEqual(["0.48", "1.00", "1.39", "12.3"]);
  });
  test("per cent is joined by a narrow no-break space", () => expect(formatPercent(0.148, "en")).toBe("15\u202f%"));
  test("a row of money has one unit and three figures", () => {
    const unit = moneyUnit([15_800_800, 30_537_040, 45_980_000]);
    expect(unit).toEqual({ power: 6 });
    expect([15_800_800, 45_980_000, 0, 112_400_000, 2_004_000].map((x) => formatMoney(x, unit, "en"))).toEqual(["15.8", "46.0", "0", "112", "2.00"]);
    expect(formatMoney(37_832, moneyUnit([37_832]), "en")).toBe("37.8");
    expect(moneyUnit([9_000])).toEqual({ power: 0 });
  });
});
