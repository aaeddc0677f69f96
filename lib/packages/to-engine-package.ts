import type { PackageInput, Quantity } from "@/lib/engine/types";

type Row = {
  letter: string;
  name: string;
  items: { measureId: string; uptake: Quantity; startDay: number; endDay: number | null }[];
};

/**
 * A package's row as the assessment file's package; its letter is the id there.
 * @param codeOf measure id → code
 */
export function toEnginePackage({ letter, name, items }: Row, codeOf: ReadonlyMap<string, string>): PackageInput {
  return {
    id: letter,
    name,
    items: items.map(({ measureId, uptake, startDay, endDay }) => {
      const measure = codeOf.get(measureId);
      if (measure === undefined) throw new Error(`package ${letter} names an unknown measure ${measureId}`);
      return { measure, uptake, startDay, endDay };
    }),
  };
}
