import { highest, logScale, logTicks, px, type Range, ratioDomain, type Tick, waterlines } from "./axes";
import { fitText, spread, wrapText } from "./labels";

export type LadderRung = {
  key: string;
  /** Two or three words. */
  name: string;
  startDay: number;
  /** Share of the package's shift on the log scale, −ln mᵢ / Σ(−ln m); negative where the measure raises β. */
  logShare: number;
};
export type LadderPackage = { letter: string; name: string; ratio: Range; chanceEnough: number | null; rungs: LadderRung[] };
export type LadderInput = { none: Range; packages: LadderPackage[] };
export type LadderSize = { widthPx: number; heightPx: number; /** Columns per panel. */ perPanel: number; /** Room of the first column, for the ratio without measures. */ noneWidthPx: number };

export type Whisker = { x: number; low: number; high: number; mid: number } | null;
export type LadderColumn = {
  letter: string;
  /** In one or two lines. */
  name: string[];
  value: Range;
  chanceEnough: number | null;
  rails: { x1: number; x2: number; from: number; to: number };
  rungs: { key: string; name: string; y: number; labelX: number; labelY: number; leader: boolean }[];
  whisker: Whisker;
  /** Where the two lines of the value stand. */
  label: { x: number; y: number };
  footX: number;
};
export type LadderPanel = {
  width: number;
  height: number;
  left: number;
  right: number;
  top: number;
  bottom: number;
  /** y of the line at 1. */
  line: number;
  ticks: Tick[];
  /** Reproduction number at the far side. */
  mirrored: Tick[];
  water: { y: number; opacity: number }[];
  none: { x: number; y: number; value: Range; whisker: Whisker; /** null where there is no room beside the axis. */ label: { x: number; y: number } | null };
  columns: LadderColumn[];
};

export const LADDER_WIDE: LadderSize = { widthPx: 516, heightPx: 576, perPanel: 3, noneWidthPx: 84 };
export const LADDER_NARROW: LadderSize = { widthPx: 320, heightPx: 486, perPanel: 2, noneWidthPx: 36 };

const LEFT = 34;
const RIGHT = 34;
const TOP = 58;
const FOOT = 66;
const NAME_GAP = 14;

/**
 * Each package as a ladder from the ratio without measures to its own; rungs split the way between the two by each
 * measure's share on the log scale, in the order of start day, then size. Panels share one scale.
 */
export function thresholdLadder({ none, packages }: LadderInput, size: LadderSize): LadderPanel[] {
  const domain = ratioDomain([none, ...packages.map(({ ratio }) => ratio)]);
  const bottom = size.heightPx - FOOT;
  const scale = logScale(domain, [bottom, TOP]);
  const right = size.widthPx - RIGHT;
  const mirror = logTicks([1 / domain[1], 1 / domain[0]], (r) => scale(1 / r), 22);
  const groups = packages.length === 0 ? [[]] : chunks(packages, size.perPanel);
  return groups.map((group) => {
    // On a phone the last package may have the width to itself; beside each other all columns are alike.
    const alone = size.perPanel <= 2 && group.length < size.perPanel;
    const noneWidthPx = alone ? size.noneWidthPx * 2 : size.noneWidthPx;
    const columnPx = (right - LEFT - noneWidthPx) / (alone ? Math.max(1, group.length) : size.perPanel);
    const line = px(scale(1));
    const noneX = LEFT + Math.min(30, size.noneWidthPx / 2);
    const roomy = size.noneWidthPx >= 72;
    return {
      width: size.widthPx,
      height: size.heightPx,
      left: LEFT,
      right,
      top: TOP - 18,
      bottom,
      line,
      ticks: logTicks(domain, scale, 20).map(rounded),
      mirrored: mirror.map(rounded),
      water: waterlines(bottom - line).map(({ offset, opacity }) => ({ y: px(line + offset), opacity })),
      none: {
        x: noneX,
        y: px(scale(none.mid)),
        value: none,
        whisker: whiskerAt(none, noneX, scale),
        label: roomy ? { x: LEFT + 8, y: px(scale(highest(none)) - 22) } : null,
      },
      columns: group.map((each, index) => column(each, LEFT + noneWidthPx + index * columnPx, columnPx, none.mid, scale, bottom)),
    };
  });
}

const rounded = ({ value, at }: Tick): Tick => ({ value, at: px(at) });
const chunks = <T>(items: T[], size: number): T[][] =>
  Array.from({ length: Math.ceil(items.length / size) }, (_, i) => items.slice(i * size, (i + 1) * size));

function whiskerAt({ mid, low, high }: Range, x: number, scale: (value: number) => number): Whisker {
  return low === null || high === null ? null : { x: px(x), low: px(scale(low)), high: px(scale(high)), mid: px(scale(mid)) };
}

function column(each: LadderPackage, start: number, width: number, from: number, scale: (value: number) => number, bottom: number): LadderColumn {
  const tight = width < 112;
  const x1 = start + (tight ? 15 : 18);
  const x2 = x1 + (tight ? 17 : 22);
  const nameX = x2 + (tight ? 6 : 8);
  const shift = Math.log(each.ratio.mid) - Math.log(from);
  const sorted = [...each.rungs].sort((a, b) => a.startDay - b.startDay || b.logShare - a.logShare);
  let share = 0;
  const steps = sorted.map((rung) => {
    const below = share;
    share += rung.logShare;
    const y = scale(Math.exp(Math.log(from) + share * shift));
    return { rung, y, middle: (scale(Math.exp(Math.log(from) + below * shift)) + y) / 2 };
  });
  const labels = spread(steps.map(({ middle }) => middle), NAME_GAP, [24, bottom - 6]);
  return {
    letter: each.letter,
    name: wrapText(each.name, 13.5, width - 28, 2),
    value: each.ratio,
    chanceEnough: each.chanceEnough,
    rails: { x1: px(x1), x2: px(x2), from: px(scale(from)), to: px(scale(each.ratio.mid)) },
    rungs: steps.map(({ rung, y, middle }, index) => ({
      key: rung.key,
      name: fitText(rung.name, 12, start + width - nameX),
      y: px(y),
      labelX: px(nameX),
      labelY: px(labels[index] ?? middle),
      leader: Math.abs((labels[index] ?? middle) - middle) > 5,
    })),
    whisker: whiskerAt(each.ratio, x1 - (tight ? 10 : 12), scale),
    label: { x: px(x1 - 17), y: px(scale(highest(each.ratio)) - 22) },
    footX: px(x1 - 7),
  };
}
