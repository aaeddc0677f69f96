/** Width of a text in Noto Sans, estimated by classes of letters: labels only need to keep out of each other's way. */
export const textWidth = (text: string, fontPx: number): number => [...text].reduce((sum, c) => sum + widthOf(c), 0) * fontPx;
const CLASSES: [RegExp, number][] = [
  [/[ijl.,:;'|!\s]/, 0.27],
  [/[frt()-]/, 0.37],
  [/[sczkvxy]/, 0.5],
  [/[mMW%]/, 0.92],
  [/[w]/, 0.79],
  [/[A-Z]/, 0.65],
];
const widthOf = (c: string): number => CLASSES.find(([letters]) => letters.test(c))?.[1] ?? 0.59;

/** Cuts a text to a width, with an ellipsis; the whole text stands in the chart's table. */
export function fitText(text: string, fontPx: number, widthPx: number): string {
  if (textWidth(text, fontPx) <= widthPx) return text;
  const chars = [...text];
  while (chars.length > 1 && textWidth(`${chars.join("").trimEnd()}…`, fontPx) > widthPx) chars.pop();
  return `${chars.join("").trimEnd()}…`;
}

/** A text in lines of a width, broken between words; the last line is cut where more is left. */
export function wrapText(text: string, fontPx: number, widthPx: number, linesMax: number): string[] {
  const lines: string[] = [];
  let rest = text.split(" ");
  while (rest.length > 0 && lines.length < linesMax - 1) {
    let taken = 1;
    while (taken < rest.length && textWidth(rest.slice(0, taken + 1).join(" "), fontPx) <= widthPx) taken++;
    lines.push(fitText(rest.slice(0, taken).join(" "), fontPx, widthPx));
    rest = rest.slice(taken);
  }
  return rest.length > 0 ? [...lines, fitText(rest.join(" "), fontPx, widthPx)] : lines;
}

/**
 * Moves positions apart until neighbours are `gapPx` away from each other, each as near to its wish as that allows
 * (isotonic regression), inside the bounds where they fit at all. Order is kept.
 * @param wishes ascending or descending, px
 */
export function spread(wishes: readonly number[], gapPx: number, bounds: readonly [number, number]): number[] {
  const order = wishes.map((wish, index) => ({ wish, index })).sort((a, b) => a.wish - b.wish || a.index - b.index);
  // Pool neighbours that would overlap; each pool sits at the mean of what its members want.
  const pools: { sum: number; size: number }[] = [];
  order.forEach(({ wish }, rank) => {
    pools.push({ sum: wish - rank * gapPx, size: 1 });
    for (let last = pools.length - 1; last > 0; last--) {
      const a = pools[last - 1]!;
      const b = pools[last]!;
      if (a.sum / a.size <= b.sum / b.size) break;
      pools.splice(last - 1, 2, { sum: a.sum + b.sum, size: a.size + b.size });
    }
  });
  const [low, high] = bounds;
  const placed = Array.from({ length: wishes.length }, () => 0);
  let rank = 0;
  for (const { sum, size } of pools) {
    for (let k = 0; k < size; k++, rank++) {
      const at = sum / size + rank * gapPx;
      placed[order[rank]!.index] = Math.min(Math.max(at, low + rank * gapPx), high - (wishes.length - 1 - rank) * gapPx);
    }
  }
  return placed;
}

export type Box = { x: number; y: number; width: number; height: number };
const overlap = (a: Box, b: Box) =>
  Math.max(0, Math.min(a.x + a.width, b.x + b.width) - Math.max(a.x, b.x)) *
  Math.max(0, Math.min(a.y + a.height, b.y + b.height) - Math.max(a.y, b.y));

export type Wanted = { x: number; y: number; width: number; height: number; /** Mark's half size, px. */ clear: number };
export type Placed = { box: Box; leader: boolean };

/**
 * A free place for each label near its mark: beside, above or below it, then further away with a leader. Earlier
 * labels go first. What must stay visible is an obstacle; a label never leaves the bounds.
 */
export function placeLabels(wanted: readonly Wanted[], obstacles: readonly Box[], bounds: Box): Placed[] {
  const placed: Placed[] = [];
  for (const each of wanted) {
    let best: (Placed & { cost: number }) | null = null;
    for (const distance of [0, 8, 20, 36, 56, 80]) {
      for (const [order, box] of candidates(each, distance).entries()) {
        const inside =
          box.x >= bounds.x && box.y >= bounds.y && box.x + box.width <= bounds.x + bounds.width && box.y + box.height <= bounds.y + bounds.height;
        if (!inside) continue;
        const hits = obstacles.reduce((sum, o) => sum + overlap(box, o), 0);
        const clashes = placed.reduce((sum, p) => sum + overlap(box, grown(p.box, 2)), 0);
        const cost = hits * 2 + clashes * 50 + distance * 3 + order;
        if (!best || cost < best.cost) best = { box, leader: distance >= 20, cost };
      }
    }
    placed.push(best ?? { box: { ...each, x: bounds.x, y: bounds.y }, leader: true });
  }
  return placed.map(({ box, leader }) => ({ box, leader }));
}

const grown = (box: Box, by: number): Box => ({ x: box.x - by, y: box.y - by, width: box.width + 2 * by, height: box.height + 2 * by });

function candidates({ x, y, width, height, clear }: Wanted, distance: number): Box[] {
  const d = clear + 4 + distance;
  const middle = y - height / 2;
  return [
    { x: x + d, y: middle, width, height },
    { x: x - d - width, y: middle, width, height },
    { x: x + d, y: y - d - height, width, height },
    { x: x - d - width, y: y - d - height, width, height },
    { x: x + d, y: y + d, width, height },
    { x: x - d - width, y: y + d, width, height },
    { x: x - width / 2, y: y - d - height, width, height },
    { x: x - width / 2, y: y + d, width, height },
  ];
}
