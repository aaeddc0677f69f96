import { highest, lowest, type Range } from "./axes";

/** Positions in per cent of the cell's width. */
export type WhiskerCell = { low: number; high: number; mid: number };
export type WhiskerRow = { cells: (WhiskerCell | null)[]; /** Where a reference value lies (the line at 1). */ line: number | null };

/**
 * One scale for a row of a table: every interval from its low to its high end, with a little room on both sides.
 * @param line a value that belongs on the scale, for example 1 for threshold ratios
 */
export function whiskerRow(ranges: readonly (Range | null)[], line: number | null = null, fromZero = false): WhiskerRow {
  const known = ranges.filter((range): range is Range => range !== null);
  const ends = [...known.flatMap((range) => [lowest(range), highest(range)]), ...(line === null ? [] : [line]), ...(fromZero ? [0] : [])];
  const low = Math.min(...ends);
  const high = Math.max(...ends);
  const span = high - low || 1;
  const at = (value: number) => Math.round((2 + ((value - low) / span) * 94) * 100) / 100;
  return {
    cells: ranges.map((range) => (range && range.low !== null && range.high !== null ? { low: at(range.low), high: at(range.high), mid: at(range.mid) } : null)),
    line: line === null ? null : at(line),
  };
}
