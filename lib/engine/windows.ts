import type { PackageInput } from "./types";

/** Days [fromDay, toDay) on which the same items are in force. */
export type Piece = { fromDay: number; toDay: number | null; items: number[] };

/**
 * A package cut at every start and end into pieces with constant measures, from day 0 on; the last one has no end.
 * Pieces with the same items in force are one piece.
 */
export function piecesOf(items: readonly Pick<PackageInput["items"][number], "startDay" | "endDay">[]): Piece[] {
  const days = new Set([0]);
  for (const { startDay, endDay } of items) {
    days.add(startDay);
    if (endDay !== null) days.add(endDay);
  }
  const edges = [...days].sort((a, b) => a - b);
  const pieces: Piece[] = [];
  for (const [index, fromDay] of edges.entries()) {
    const inForce = items.flatMap((item, i) => (item.startDay <= fromDay && (item.endDay === null || fromDay < item.endDay) ? [i] : []));
    const before = pieces.at(-1);
    const toDay = edges[index + 1] ?? null;
    if (before && before.items.length === inForce.length && before.items.every((i, k) => i === inForce[k])) before.toDay = toDay;
    else pieces.push({ fromDay, toDay, items: inForce });
  }
  return pieces;
}

/** Whether something in force in piece k is lifted at its end. */
export function isLift(pieces: readonly Piece[], k: number): boolean {
  const next = pieces[k + 1];
  return next !== undefined && pieces[k]!.items.some((item) => !next.items.includes(item));
}

/** Index of the piece with the smallest factor, the earliest on a tie. */
export function strongestOf(factors: ArrayLike<number>): number {
  let best = 0;
  for (let k = 1; k < factors.length; k++) if (factors[k]! < factors[best]!) best = k;
  return best;
}
