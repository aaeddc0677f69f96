import type { AssessmentView } from "./view";

/** Where a fault lies, in the reader's terms; both absent: the outbreak or the settings. */
export type FaultPlace = { letter?: string; measure?: string };
export type PlacedFault = FaultPlace & { message: string };

/** Lines of the answer to POST /api/desk/recalculate, one JSON document each: progress, then one that ends it. */
export type RecalculationLine =
  | { kind: "progress"; share: number }
  | { kind: "view"; view: AssessmentView; horizonDays: number }
  /** The engine refuses the input. */
  | { kind: "refused"; faults: PlacedFault[] }
  | { kind: "failed"; code: "busy" | "timeLimit" | "cancelled" };

/** A request that isn't calculated at all: status 4xx with this as its body. */
export type RecalculationRefusal =
  | { kind: "invalid"; error: Record<string, string[] | null> }
  | { kind: "stopped"; code: "signedOut" | "forbidden" | "conflict" | "frozen" | "notFound" | "notReady" };

type Named = { packages: { id: string; items: { measure: string }[] }[]; measures: { id: string; name: string }[] };

/** `packages[1].items[2].endDay` → package B and the measure's name. */
export function placeOf(path: string, { packages, measures }: Named): FaultPlace {
  const nameOf = (id: string | undefined) => measures.find((each) => each.id === id)?.name;
  const inPackage = /^packages\[(\d+)\](?:\.items\[(\d+)\])?/.exec(path);
  if (inPackage) {
    const found = packages[Number(inPackage[1])];
    const measure = inPackage[2] === undefined ? undefined : nameOf(found?.items[Number(inPackage[2])]?.measure);
    return { ...(found ? { letter: found.id } : {}), ...(measure ? { measure } : {}) };
  }
  const inMeasures = /^measures\[(\d+)\]/.exec(path);
  const measure = inMeasures ? measures[Number(inMeasures[1])]?.name : undefined;
  return measure ? { measure } : {};
}
