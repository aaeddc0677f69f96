import { readFileSync } from "node:fs";
import { createElement } from "react";
import { describe, expect, test } from "vitest";
import { buildView } from "@/lib/assessments/view";
import type { ContextSnapshot } from "@/lib/assessments/snapshot";
import { Drawing } from "@/components/charts/settling-curve-chart";
import { Panel } from "@/components/charts/threshold-ladder-chart";
import { assess } from "@/lib/engine";
import { settledDeaths } from "@/lib/charts/settling-curve";
import { whiskerRow } from "@/lib/charts/whisker";
import type { AssessmentInput } from "@/lib/engine/types";
import { draw, halfPixel, onLinearAxis, onLogAxis } from "./draw";

const input = JSON.parse(readFileSync(new URL("../../../db/demo/kelmaren.json", import.meta.url), "utf8")) as AssessmentInput;
const result = assess(input);
const context: ContextSnapshot = {
  snapshotVersion: 1,
  assessment: { number: 4, title: "Three packages" },
  outbreak: { id: "", name: "Sedge fever", place: "Kelmaren", publicNames: {}, populationPersons: input.outbreak.population, dayZero: "2027-03-01", currency: "EUR", priceYear: 2027, languages: ["en"] },
  packages: input.packages.map((each) => ({
    letter: each.id, name: each.name, startDay: 7, endDay: 77, deliverable: true, legalFindings: [],
    items: each.items.map(({ measure, startDay, endDay }) => ({ measureCode: measure, startDay, endDay })),
  })),
  measures: input.measures.map(({ id, name }) => ({
    code: id, name, shortName: name, instruction: "", legalBasis: "", legalLink: "", evidence: "", cutSource: "", ladder: null, leadTimeDays: 0,
    limits: { maxDays: null, maxDaysWithin: null, daysUsed: null, reviewEveryDays: null }, publicTexts: {},
  })),
};
const words = { noMeasures: "no measures", asScheduled: "as scheduled", heldFromDayZero: "in principle", few: "fewer than 10", numberLocale: "en" };
const view = buildView(input, result, context, words);
const of = (letter: string) => {
  const found = result.packages.find(({ id }) => id === letter);
  if (!found?.uncertainty) throw new Error(`no package ${letter}`);
  return { ...found, uncertainty: found.uncertainty };
};
const number = (text: string | undefined) => Number(text);

describe.each(["wide", "narrow"] as const)("threshold ladder, %s: drawn positions are the result's values", (size) => {
  const panels = view.ladder[size].map((panel, index) => draw(createElement(Panel, { panel, id: `p${index}`, className: "", numberLocale: "en" })));

  test.each(panels.map((panel, index) => ({ index, ...panel })))("panel $index", ({ marks, markup }) => {
    const ticks = marks.filter((m) => m["data-tick"]).map((m) => ({ value: number(m["data-tick"]), at: number(m["data-at"]) }));
    const mirrored = marks.filter((m) => m["data-mirror"]).map((m) => ({ value: number(m["data-mirror"]), at: number(m["data-at"]) }));
    const b = onLogAxis(ticks);
    const within = (y: string | undefined, value: number) => expect(Math.abs(b(number(y)) - value)).toBeLessThan(halfPixel(b, number(y)));

    within(marks.find((m) => m["data-mark"] === "one")?.["y1"], 1);
    within(marks.find((m) => m["data-mark"] === "none")?.["data-y"], result.withoutMeasures.uncertainty?.thresholdRatio.median ?? Number.NaN);
    // The far axis is the same one, upside down.
    const r = onLogAxis(mirrored);
    for (const { at } of ticks) expect(Math.abs(b(at) * r(at) - 1)).toBeLessThan(0.005);

    const rails = marks.filter((m) => m["data-mark"] === "rail");
    expect(rails.length).toBeGreaterThan(0);
    for (const rail of rails) {
      const { uncertainty, contributions, phases, strongestPhase } = of(rail["data-letter"] ?? "");
      const { median, low, high } = uncertainty.thresholdRatio;
      within(rail["data-to"], median);
      const whisker = marks.find((m) => m["data-mark"] === `whisker-${rail["data-letter"]}`);
      within(whisker?.["data-low"], low);
      within(whisker?.["data-high"], high);

      // Rungs: by start day, then size; each at its cumulated share of the way on the log scale.
      const items = input.packages.find(({ id }) => id === rail["data-letter"])?.items ?? [];
      const from = phases[strongestPhase]?.fromDay ?? 0;
      const inForce = contributions
        .filter((c): c is { measure: string; logShare: number } => c.logShare !== null)
        .map((c) => ({ ...c, start: items.find((i) => i.measure === c.measure && i.startDay <= from)?.startDay ?? 0 }))
        .sort((x, y) => x.start - y.start || y.logShare - x.logShare);
      const none = result.withoutMeasures.uncertainty?.thresholdRatio.median ?? Number.NaN;
      let share = 0;
      const rungs = marks.filter((m) => m["data-mark"] === "rung" && m["data-letter"] === rail["data-letter"]);
      expect(rungs.map((m) => m["data-key"])).toEqual(inForce.map(({ measure }) => measure));
      for (const [index, rung] of rungs.entries()) {
        share += inForce[index]?.logShare ?? Number.NaN;
        within(rung["data-y"], none * (median / none) ** share);
      }
    }
    expect(markup).not.toContain("style=");
    expect(markup).toContain("<title");
    expect(markup).toContain("<desc");
  });

  test("names beside rungs are at least 14 px apart", () => {
    for (const panel of view.ladder[size]) {
      for (const { rungs } of panel.columns) {
        const at = rungs.map(({ labelY }) => labelY).sort((x, y) => x - y);
        for (let i = 1; i < at.length; i++) expect((at[i] ?? 0) - (at[i - 1] ?? 0)).toBeGreaterThanOrEqual(14 - 1e-6);
      }
    }
  });
});

describe.each(["wide", "narrow"] as const)("settling curve, %s: drawn positions are the result's values", (size) => {
  const { marks, markup } = draw(createElement(Drawing, { model: view.curve[size], id: "c", className: "", numberLocale: "en", desc: "" }));
  const ticks = (name: string) => marks.filter((m) => m[name]).map((m) => ({ value: number(m[name]), at: number(m["data-at"]) }));
  const b = onLogAxis(ticks("data-x-tick"));
  const deaths = onLinearAxis(ticks("data-y-tick"));
  const withinX = (x: string | undefined, value: number) => expect(Math.abs(b(number(x)) - value)).toBeLessThan(halfPixel(b, number(x)));
  const withinY = (y: string | undefined, value: number) => expect(Math.abs(deaths(number(y)) - value)).toBeLessThan(halfPixel(deaths, number(y)));

  test("without measures", () => {
    const none = marks.find((m) => m["data-mark"] === "none");
    withinX(none?.["data-x"], result.withoutMeasures.uncertainty?.thresholdRatio.median ?? Number.NaN);
    withinY(none?.["data-y"], result.withoutMeasures.uncertainty?.finalDeaths.median ?? Number.NaN);
  });
  test.each(["A", "B", "C"])("package %s: held from day 0 and as scheduled, with their intervals", (letter) => {
    const { uncertainty } = of(letter);
    const { heldFromDayZero, asScheduled } = uncertainty.finalDeaths;
    const mark = (name: string) => marks.find((m) => m["data-mark"] === name && m["data-letter"] === letter);
    const arm = (name: string) => marks.find((m) => m["data-mark"] === `${name}-${letter}`);
    withinX(mark("held")?.["data-x"], uncertainty.thresholdRatio.median);
    withinY(mark("held")?.["data-y"], heldFromDayZero.median);
    withinY(arm("held")?.["data-low"], heldFromDayZero.low);
    withinY(arm("held")?.["data-high"], heldFromDayZero.high);
    withinY(mark("scheduled")?.["data-y"], asScheduled.median);
    withinY(arm("scheduled")?.["data-low"], asScheduled.low);
    withinY(arm("scheduled")?.["data-high"], asScheduled.high);
  });
  test("the curve is the settled value of the central run", () => {
    const points = [...(marks.find((m) => m["data-mark"] === "curve")?.["d"] ?? "").matchAll(/[ML]([\d.]+),([\d.]+)/g)];
    expect(points.length).toBeGreaterThan(100);
    const day = result.withoutMeasures.course[0];
    const start = { infected: (day?.latent ?? 0) + (day?.infectious ?? 0), susceptible: day?.susceptible ?? 0, fatality: 0.006 };
    for (const [, x, y] of points) {
      // Half a pixel across as well, since the curve is steep near 1.
      const around = [-0.5, 0.5].map((shift) => settledDeaths(b(number(x) + shift), start));
      expect(deaths(number(y) + 0.5)).toBeLessThanOrEqual(Math.max(...around) + 1e-6);
      expect(deaths(number(y) - 0.5)).toBeGreaterThanOrEqual(Math.min(...around) - 1e-6);
    }
    // And it ends where the engine's own central run ends.
    expect(settledDeaths(result.withoutMeasures.thresholdRatio, start)).toBeCloseTo(result.withoutMeasures.finalDeaths, 6);
    for (const each of result.packages) expect(settledDeaths(each.thresholdRatio, start)).toBeCloseTo(each.finalDeaths.heldFromDayZero, 6);
  });
  test("labels stay inside and don't lie on each other", () => {
    const { width, height, labels } = view.curve[size];
    expect(markup).not.toContain("style=");
    for (const { x, y } of labels) {
      expect(x).toBeGreaterThanOrEqual(0);
      expect(x).toBeLessThanOrEqual(width);
      expect(y).toBeGreaterThanOrEqual(0);
      expect(y).toBeLessThanOrEqual(height);
    }
  });
});

describe("whiskers of a table's row", () => {
  test("invert to the values on the row's one scale", () => {
    const ranges = [{ mid: 0.48, low: 0.4, high: 0.56 }, null, { mid: 1.39, low: 1.04, high: 1.83 }];
    const { cells, line } = whiskerRow(ranges, 1);
    const [a, , c] = cells;
    if (!a || !c || line === null) throw new Error("cells are missing");
    const value = (at: number) => 0.4 + ((at - a.low) / (c.high - a.low)) * (1.83 - 0.4);
    // A cell is about 150 px wide: half a pixel is a third of a per cent.
    for (const [at, expected] of [[a.mid, 0.48], [a.high, 0.56], [c.low, 1.04], [c.mid, 1.39], [line, 1]] as const) {
      expect(Math.abs(value(at) - expected)).toBeLessThan(((1.83 - 0.4) / 94) * 0.33);
    }
    expect(cells[1]).toBeNull();
  });
  test("a value without a spread has no whisker, and one value alone doesn't divide by zero", () => {
    expect(whiskerRow([{ mid: 5, low: null, high: null }])).toEqual({ cells: [null], line: null });
    expect(whiskerRow([{ mid: 5, low: 5, high: 5 }]).cells[0]).toEqual({ low: 2, mid: 2, high: 2 });
  });
});
