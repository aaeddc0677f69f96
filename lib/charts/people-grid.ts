/** One square stands for one of a thousand residents: 40 columns of 25, filled by column from the reading edge. */
export const GRID = { columns: 40, rows: 25, pitch: 13, square: 11, width: 518, height: 323 } as const;

/** Squares of one column, from `row` down. */
export type Run = { column: number; row: number; length: number };
export type PeopleGrid = { died: Run[]; recovered: Run[]; rest: Run[] };

const TOTAL = GRID.columns * GRID.rows;

/**
 * Deaths first, then those infected who recover, then the rest.
 * @param share of 1,000 residents: infected (deaths among them) and died, whole numbers
 */
export function peopleGrid(share: { infected: number; died: number }): PeopleGrid {
  const { infected, died } = share;
  const whole = Number.isInteger(infected) && Number.isInteger(died);
  if (!whole || died < 0 || infected < died || infected > TOTAL) {
    throw new RangeError(`a people grid needs whole numbers with 0 ≤ died ≤ infected ≤ ${TOTAL}`);
  }
  return { died: runs(0, died), recovered: runs(died, infected), rest: runs(infected, TOTAL) };
}

/** Columns' parts of the squares from `start` (counted from 0) up to, not including, `end`. */
function runs(start: number, end: number): Run[] {
  const found: Run[] = [];
  for (let at = start; at < end; ) {
    const column = Math.floor(at / GRID.rows);
    const row = at % GRID.rows;
    const length = Math.min(GRID.rows - row, end - at);
    found.push({ column, row, length });
    at += length;
  }
  return found;
}

/** Dash pattern under which a run drawn as one line shows as its single squares. */
export const GRID_DASHES = `${GRID.square} ${GRID.pitch - GRID.square}`;

/**
 * One vertical line per run, through the middle of its squares; drawn `square` wide under GRID_DASHES.
 * @param rtl fills from the right
 */
export function gridPath(parts: Run[], rtl: boolean): string {
  return parts
    .map(({ column, row, length }) => {
      const place = rtl ? GRID.columns - 1 - column : column;
      return `M${place * GRID.pitch + GRID.square / 2} ${row * GRID.pitch}v${length * GRID.pitch - (GRID.pitch - GRID.square)}`;
    })
    .join("");
}
