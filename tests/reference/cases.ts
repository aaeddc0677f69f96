import { readFileSync } from "node:fs";
import { expect } from "vitest";

/** A row of a check file: values from outside the project, with their source beside them. */
export type Row = {
  id: string;
  group: string;
  // biome-ignore lint/suspicious/noExplicitAny: every group has its own members; the test that reads them names them.
  inputs: any;
  // biome-ignore lint/suspicious/noExplicitAny: as above
  expected: any;
  tolerance: Record<string, number | string>;
  source: { citation: string; kind: string; verified: string };
  note?: string;
};

export function readCases(file: string): Row[] {
  return (JSON.parse(readFileSync(new URL(`./cases/${file}.json`, import.meta.url), "utf8")) as { rows: Row[] }).rows;
}

/** For test.each: "id (source, how it was verified)". */
export const named = (rows: readonly Row[]) =>
  rows.map((row) => [`${row.id} (${row.source.verified}: ${row.source.citation.slice(0, 90)})`, row] as const);

export const relativeError = (actual: number, expected: number): number =>
  expected === 0 ? Math.abs(actual) : Math.abs(actual - expected) / Math.abs(expected);

export function expectRelative(actual: number, expected: number | string, tolerance: number, what = "value"): void {
  const error = relativeError(actual, Number(expected));
  expect(error, `${what}: ${actual} against ${expected}, relative error ${error}`).toBeLessThanOrEqual(tolerance);
}

/** Every row is either tested or listed with a reason; a row in neither, or in both, fails. */
export function expectAccounted(rows: readonly Row[], tested: readonly Row[], leftOut: Record<string, string>): void {
  const ids = new Set(tested.map(({ id }) => id));
  expect(rows.filter(({ id }) => !ids.has(id) && !(id in leftOut)).map(({ id }) => id), "rows in neither list").toEqual([]);
  expect(Object.keys(leftOut).filter((id) => ids.has(id) || !rows.some((row) => row.id === id)), "left out by mistake").toEqual([]);
}
