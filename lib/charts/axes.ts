import { scaleLinear, scaleLog } from "d3-scale";

export type Tick = { value: number; at: number };

/** A value with its 95 % interval; the ends are null where the value is taken as certain. */
export type Range = { mid: number; low: number | null; high: number | null };

export const lowest = ({ mid, low }: Range): number => Math.min(mid, low ?? mid);
export const highest = ({ mid, high }: Range): number => Math.max(mid, high ?? mid);

const STEPS = [1, 1.2, 1.4, 1.5, 1.6, 1.8, 2, 2.5, 3, 4, 5, 6, 7, 8, 9];
/** Plain steps first: where two lie too close, the plainer one stays. */
const RANK = [[1], [2, 5], [3, 4, 6, 8], [7, 9, 1.5, 2.5], [1.2, 1.4, 1.6, 1.8]];

/**
 * Ticks of a log axis that spans few decades: plain numbers, at least `gapPx` apart.
 * @param scale value → px
 */
export function logTicks(domain: readonly [number, number], scale: (value: number) => number, gapPx: number): Tick[] {
  const [low, high] = domain;
  const kept: Tick[] = [];
  const decades = Array.from({ length: 12 }, (_, i) => i - 6);
  for (const rank of [null, ...RANK]) {
    // 1 always has its tick: it is what the chart is about.
    const values = rank === null ? [1] : decades.flatMap((decade) => rank.map((step) => Number((step * 10 ** decade).toPrecision(6))));
    for (const value of values.sort((a, b) => a - b)) {
      const at = scale(value);
      if (value < low || value > high || kept.some((tick) => Math.abs(tick.at - at) < gapPx)) continue;
      kept.push({ value, at });
    }
  }
  return kept.sort((a, b) => a.value - b.value);
}

/** Domain of a threshold-ratio axis: every interval, the line at 1, and a little room. */
export function ratioDomain(ranges: readonly Range[]): [number, number] {
  const low = Math.min(0.92, ...ranges.map(lowest));
  const high = Math.max(1.1, ...ranges.map(highest));
  return [low * 0.975, high * 1.035];
}

export const logScale = (domain: readonly [number, number], range: readonly [number, number]) =>
  scaleLog().domain([...domain]).range([...range]);
export const linearScale = (domain: readonly [number, number], range: readonly [number, number]) =>
  scaleLinear().domain([...domain]).range([...range]);

/** Waterlining: parallels that start close to the line and draw apart. Offsets in px from the line. */
export function waterlines(lengthPx: number): { offset: number; opacity: number }[] {
  const lines: { offset: number; opacity: number }[] = [];
  let offset = 4;
  let step = 4.6;
  for (let opacity = 1; offset < lengthPx; opacity = Math.max(0.3, opacity * 0.925)) {
    lines.push({ offset, opacity: Math.round(opacity * 100) / 100 });
    offset += step;
    step *= 1.15;
  }
  return lines;
}

/** Positions are drawn to a hundredth of a pixel: far below the half pixel that a reader could see. */
export const px = (value: number): number => Math.round(value * 100) / 100;
