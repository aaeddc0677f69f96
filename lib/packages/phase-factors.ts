import { central, piecesOf } from "../engine";
import type { Quantity } from "../engine/types";


type Item = { measureId: string; uptake: Quantity; startDay: number; endDay: number | null };
type Cut = { id: string; shortName: string; cut: { central: number } };

/** The phases of a schedule with their central factor on β and what is in force. Days from day 0. */
export function phaseFactors(items: readonly Item[], measures: readonly Cut[]): { fromDay: number; factor: number; names: string[] }[] {
  const byId = new Map(measures.map((measure) => [measure.id, measure]));
  return piecesOf(items).map(({ fromDay, items: inForce }) => {
    const held = inForce.flatMap((index) => {
      const item = items[index];
      const measure = item && byId.get(item.measureId);
      return item && measure ? [{ name: measure.shortName, factor: 1 - central(item.uptake) * measure.cut.central }] : [];
    });
    return { fromDay, factor: held.reduce((product, { factor }) => product * factor, 1), names: held.map(({ name }) => name) };
  });
}
