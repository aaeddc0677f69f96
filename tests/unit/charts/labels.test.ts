import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { logTicks } from "@/lib/charts/axes";
import { fitText, placeLabels, spread, textWidth } from "@/lib/charts/labels";

const positions = fc.array(fc.double({ min: 0, max: 400, noNaN: true }), { minLength: 1, maxLength: 12 });

describe("spread", () => {
  test("neighbours are never closer than the gap, order is kept, and what had room stays put", () => {
    fc.assert(
      fc.property(positions, (wishes) => {
        const placed = spread(wishes, 14, [-1000, 1400]);
        const pairs = wishes.map((wish, i) => ({ wish, at: placed[i] ?? Number.NaN })).sort((a, b) => a.wish - b.wish || a.at - b.at);
        for (let i = 1; i < pairs.length; i++) expect(pairs[i]!.at - pairs[i - 1]!.at).toBeGreaterThanOrEqual(14 - 1e-6);
        if (pairs.some(({ wish }, i) => i > 0 && wish - pairs[i - 1]!.wish < 14)) return;
        for (const { wish, at } of pairs) expect(at).toBeCloseTo(wish, 9);
      }),
    );
  });
  test("stays inside the bounds where everything fits", () => {
    fc.assert(
      fc.property(positions, (wishes) => {
        const placed = spread(wishes, 14, [0, 400]);
        for (const at of placed) expect(at >= -1e-9 && at <= 400 + 1e-9).toBe(true);
      }),
    );
  });
});

describe("placeLabels", () => {
  test("labels of crowded marks don't lie on each other", () => {
    const wanted = Array.from({ length: 6 }, (_, i) => ({ x: 200 + i * 5, y: 150 + i * 3, width: 70, height: 30, clear: 8 }));
    const placed = placeLabels(wanted, [], { x: 0, y: 0, width: 600, height: 400 });
    for (const [i, { box: a }] of placed.entries()) {
      for (const { box: b } of placed.slice(i + 1)) {
        expect(a.x + a.width <= b.x || b.x + b.width <= a.x || a.y + a.height <= b.y || b.y + b.height <= a.y).toBe(true);
      }
    }
    expect(placed.some(({ leader }) => leader)).toBe(true);
  });
});

test("fitText cuts to the width and says so", () => {
  expect(fitText("masks", 12, 200)).toBe("masks");
  const cut = fitText("Gatherings of at most ten people", 12, 80);
  expect(cut.endsWith("…")).toBe(true);
  expect(textWidth(cut, 12)).toBeLessThanOrEqual(80);
});

test("log ticks keep their distance and always hold 1", () => {
  const scale = (value: number) => 512 - 300 * Math.log(value / 0.02);
  const ticks = logTicks([0.02, 3], scale, 18);
  expect(ticks.map(({ value }) => value)).toContain(1);
  for (let i = 1; i < ticks.length; i++) expect(Math.abs(ticks[i]!.at - ticks[i - 1]!.at)).toBeGreaterThanOrEqual(18);
});
