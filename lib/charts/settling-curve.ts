import { line } from "d3-shape";
import { settledState } from "@/lib/engine/settled-state";
import { highest, linearScale, logScale, logTicks, px, type Range, ratioDomain, type Tick, waterlines } from "./axes";
import { type Box, placeLabels, textWidth, type Wanted } from "./labels";

export type SettlingPoint = { letter: string; ratio: Range; held: Range; scheduled: Range; heldText: string[]; scheduledText: string[] };
export type SettlingInput = {
  /** Day 0 of the central run, persons, and the infection fatality ratio: what the curve is drawn from. */
  start: { infected: number; susceptible: number; fatality: number };
  none: { ratio: Range; deaths: Range; text: string[] };
  packages: SettlingPoint[];
};
export type SettlingSize = { widthPx: number; heightPx: number };
export const SETTLING_WIDE: SettlingSize = { widthPx: 784, heightPx: 430 };
export const SETTLING_NARROW: SettlingSize = { widthPx: 320, heightPx: 400 };

export type SettlingLabel = { x: number; y: number; anchor: "start" | "end"; lines: string[]; leader: { x1: number; y1: number; x2: number; y2: number } | null };
export type Cross = { x: number; y: number; horizontal: { low: number; high: number } | null; vertical: { low: number; high: number } | null };
export type SettlingModel = {
  width: number;
  height: number;
  left: number;
  right: number;
  top: number;
  bottom: number;
  /** x of the line at 1. */
  line: number;
  xTicks: Tick[];
  yTicks: Tick[];
  water: { x: number; opacity: number }[];
  /** SVG path of final deaths against the threshold ratio, central run. */
  curve: string;
  none: Cross;
  marks: { letter: string; held: Cross; scheduled: Cross }[];
  labels: SettlingLabel[];
};

const SAMPLES = 160;
const TILE = 16;

/**
 * Deaths where an outbreak settles that meets the threshold ratio b from day 0 on for ever: φ b S u*(b).
 * @param ratio threshold ratio with day-0 susceptibles, > 0
 * @returns persons
 */
export function settledDeaths(ratio: number, { infected, susceptible, fatality }: SettlingInput["start"]): number {
  return fatality * ratio * susceptible * settledState({ excess: infected / susceptible, thresholdRatio: ratio }).value;
}

/** The curve, with each package on it as held from day 0 (filled) and beside it as scheduled (open). */
export function settlingCurve(input: SettlingInput, size: SettlingSize): SettlingModel {
  const { none, packages, start } = input;
  const narrow = size.widthPx < 600;
  const box = { left: narrow ? 44 : 54, right: size.widthPx - (narrow ? 8 : 24), top: 32, bottom: size.heightPx - 48 };
  const domain = ratioDomain([none.ratio, ...packages.map(({ ratio }) => ratio)]);
  const x = logScale(domain, [box.left, box.right]);
  const most = Math.max(1, settledDeaths(domain[0], start), highest(none.deaths), ...packages.flatMap(({ held, scheduled }) => [highest(held), highest(scheduled)]));
  const y = linearScale([0, most], [box.bottom, box.top]).nice(6);
  const cross = (ratio: Range, deaths: Range, shift = 0): Cross => ({
    x: px(x(ratio.mid) + shift),
    y: px(y(deaths.mid)),
    horizontal: shift !== 0 || ratio.low === null || ratio.high === null ? null : { low: px(x(ratio.low)), high: px(x(ratio.high)) },
    vertical: deaths.low === null || deaths.high === null ? null : { low: px(y(deaths.low)), high: px(y(deaths.high)) },
  });
  const marks = packages.map(({ letter, ratio, held, scheduled }) => ({
    letter,
    held: cross(ratio, held),
    // Beside its own whisker; only its height means something. To the left where the frame ends.
    scheduled: cross(ratio, scheduled, x(ratio.mid) + 34 > box.right ? -22 : 22),
  }));
  const noneMark = cross(none.ratio, none.deaths);
  const samples = Array.from({ length: SAMPLES + 1 }, (_, i) => Math.exp(Math.log(domain[0]) + (i / SAMPLES) * Math.log(domain[1] / domain[0])));
  const points = samples.map((ratio): [number, number] => [px(x(ratio)), px(y(settledDeaths(ratio, start)))]);
  return {
    width: size.widthPx,
    height: size.heightPx,
    ...box,
    line: px(x(1)),
    xTicks: logTicks(domain, x, 34).map(({ value, at }) => ({ value, at: px(at) })),
    yTicks: y.ticks(6).map((value) => ({ value, at: px(y(value)) })),
    water: waterlines(x(1) - box.left).map(({ offset, opacity }) => ({ x: px(x(1) - offset), opacity })),
    curve: line()(points) ?? "",
    none: noneMark,
    marks,
    labels: labelsOf(input, noneMark, marks, points, { x: box.left + 2, y: 2, width: box.right - box.left, height: box.bottom - 4 }, px(x(1)), narrow ? 1 : 2),
  };
}

function labelsOf(input: SettlingInput, none: Cross, marks: SettlingModel["marks"], curve: [number, number][], bounds: Box, line: number, linesMax: number): SettlingLabel[] {
  const wish = (at: Cross, lines: string[], clear: number): Wanted & { lines: string[] } => ({
    x: at.x,
    y: at.y,
    width: Math.max(...lines.map((text, i) => textWidth(text, i === 0 ? 13.5 : 12))) + 2,
    height: lines.length * 14 + 3,
    clear,
    lines,
  });
  const wanted = [
    wish(none, input.none.text, 5),
    ...marks.flatMap(({ held, scheduled }, index) => {
      const point = input.packages[index]!;
      // Where there is little room the mark's letter and fill say which it is; the caption says what fill means.
      return [wish(scheduled, point.scheduledText.slice(0, linesMax), TILE / 2), wish(held, point.heldText.slice(0, linesMax), TILE / 2)];
    }),
  ];
  const tile = ({ x, y }: Cross): Box => ({ x: x - TILE / 2 - 1, y: y - TILE / 2 - 1, width: TILE + 2, height: TILE + 2 });
  const arms = ({ x, y, horizontal, vertical }: Cross): Box[] => [
    ...(horizontal ? [{ x: horizontal.low, y: y - 2, width: horizontal.high - horizontal.low, height: 4 }] : []),
    ...(vertical ? [{ x: x - 2, y: vertical.high, width: 4, height: vertical.low - vertical.high }] : []),
  ];
  const all = [none, ...marks.flatMap(({ held, scheduled }) => [held, scheduled])];
  const heavy = all.map(tile).flatMap((each) => [each, each, each, each]);
  const obstacles = [
    ...heavy,
    ...all.flatMap(arms),
    ...curve.map(([cx, cy]) => ({ x: cx - 3, y: cy - 3, width: 6, height: 6 })),
    // The way between the two marks of a package.
    ...marks.map(({ held, scheduled }) => ({ x: scheduled.x - 2, y: Math.min(held.y, scheduled.y), width: 4, height: Math.abs(held.y - scheduled.y) })),
    { x: line - 6, y: 0, width: 12, height: bounds.height + 4 },
    { x: line - 44, y: 4, width: 100, height: 20 },
  ];
  return placeLabels(wanted, obstacles, bounds).map(({ box, leader }, index) => {
    const { x, y, lines } = wanted[index]!;
    const leftOf = box.x + box.width <= x;
    const edge = leftOf ? box.x + box.width : Math.max(box.x, Math.min(x, box.x));
    return {
      x: px(leftOf ? box.x + box.width : box.x),
      y: px(box.y + 12),
      anchor: leftOf ? ("end" as const) : ("start" as const),
      lines,
      leader: leader ? { x1: px(x), y1: px(y), x2: px(edge), y2: px(box.y + box.height / 2) } : null,
    };
  });
}

