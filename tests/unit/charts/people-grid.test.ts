import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { GRID, GRID_DASHES, gridPath, peopleGrid, type Run } from "@/lib/charts/people-grid";

const squares = (parts: Run[]) => parts.flatMap(({ column, row, length }) => Array.from({ length }, (_, at) => `${column},${row + at}`));
/** The squares that a path shows under the dash pattern, read back from the drawing. */
function drawn(path: string): { x: number; y: number }[] {
  return [...path.matchAll(/M([\d.]+) ([\d.]+)v([\d.]+)/g)].flatMap(([, x, y, length]) => {
    const count = (Number(length) + GRID.pitch - GRID.square) / GRID.pitch;
    expect(Number.isInteger(count)).toBe(true);
    return Array.from({ length: count }, (_, at) => ({ x: (Number(x) - GRID.square / 2) / GRID.pitch, y: Number(y) / GRID.pitch + at }));
  });
}
const share = fc.integer({ min: 0, max: 1000 }).chain((infected) => fc.record({ infected: fc.constant(infected), died: fc.integer({ min: 0, max: infected }) }));

describe("people grid", () => {
  test("holds a thousand squares, each once, as many of each kind as people", () => {
    fc.assert(
      fc.property(share, (people) => {
        const grid = peopleGrid(people);
        const died = squares(grid.died);
        const recovered = squares(grid.recovered);
        const rest = squares(grid.rest);
        expect([died.length, recovered.length, rest.length]).toEqual([people.died, people.infected - people.died, 1000 - people.infected]);
        expect(new Set([...died, ...recovered, ...rest]).size).toBe(1000);
      }),
    );
  });

  test("the drawing shows exactly those squares, mirrored where reading runs from the right", () => {
    fc.assert(
      fc.property(share, (people) => {
        const { recovered } = peopleGrid(people);
        const left = drawn(gridPath(recovered, false));
        const right = drawn(gridPath(recovered, true));
        expect(left.map(({ x, y }) => `${x},${y}`)).toEqual(squares(recovered));
        expect(right.map(({ x, y }) => `${GRID.columns - 1 - x},${y}`)).toEqual(squares(recovered));
      }),
    );
  });

  test("deaths come first, from the top of the column at the reading edge", () => {
    expect(squares(peopleGrid({ infected: 822, died: 5 }).died)).toEqual(["0,0", "0,1", "0,2", "0,3", "0,4"]);
    expect(drawn(gridPath(peopleGrid({ infected: 822, died: 5 }).died, true)).every(({ x }) => x === GRID.columns - 1)).toBe(true);
  });

  test("stays inside its frame, and the dashes repeat every square", () => {
    const all = drawn(gridPath(peopleGrid({ infected: 0, died: 0 }).rest, false));
    expect(Math.max(...all.map(({ x }) => x * GRID.pitch + GRID.square))).toBe(GRID.width);
    expect(Math.max(...all.map(({ y }) => y * GRID.pitch + GRID.square))).toBe(GRID.height);
    expect(GRID_DASHES.split(" ").map(Number).reduce((a, b) => a + b)).toBe(GRID.pitch);
  });

  test("two grids together take under four kilobytes", () => {
    const { died, recovered, rest } = peopleGrid({ infected: 822, died: 5 });
    expect(2 * [died, recovered, rest].map((parts) => gridPath(parts, false).length).reduce((a, b) => a + b)).toBeLessThan(4096);
  });

  test.each([
    { infected: 5, died: 6 },
    { infected: 1001, died: 0 },
    { infected: 1.5, died: 0 },
    { infected: 3, died: -1 },
    { infected: Number.NaN, died: 0 },
  ])("refuses $infected infected, $died died", (people) => {
    expect(() => peopleGrid(people)).toThrow(RangeError);
  });
});
