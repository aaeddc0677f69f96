import type { Quantity } from "@/lib/engine/types";
import type { Measure } from "@/lib/measures/queries";
import type { MeasureFacts } from "./_measure-form";

const figure = (value: number) => String(Number(value.toPrecision(15)));
const spread = (value: Quantity | undefined) =>
  value === undefined ? undefined : typeof value === "number" ? { low: figure(value), central: figure(value), high: figure(value) } : { low: figure(value.low), central: figure(value.central), high: figure(value.high) };
const days = (value: number | null) => (value === null ? "" : String(value));

export const EMPTY_MEASURE: MeasureFacts = {
  code: "", name: "", shortName: "", instruction: "", cutPercent: { low: "", central: "", high: "", source: "" }, evidence: "", legalBasis: "", legalLink: "", ladder: "",
  maxDays: "", maxDaysWithin: "", daysUsed: "", reviewEveryDays: "", leadTimeDays: "0", costs: { public: {}, business: {}, household: {} }, publicTexts: {},
};

/** A row as the form shows it: text, and shares in per cent. */
export function measureFacts(row: Measure): MeasureFacts {
  const line = (payer: "public" | "business" | "household") => {
    const found = row.costs.find((each) => each.payer === payer);
    return Object.fromEntries((["setUp", "perDay", "perResidentDay"] as const).flatMap((kind) => (found?.[kind] === undefined ? [] : [[kind, spread(found[kind])]])));
  };
  return {
    id: row.id, version: row.version, code: row.code, name: row.name, shortName: row.shortName, instruction: row.instruction,
    cutPercent: { low: figure(row.cut.low * 100), central: figure(row.cut.central * 100), high: figure(row.cut.high * 100), source: row.cut.source ?? "" },
    evidence: row.evidence, legalBasis: row.legalBasis, legalLink: row.legalLink, ladder: row.ladder ?? "",
    maxDays: days(row.maxDays), maxDaysWithin: days(row.maxDaysWithin), daysUsed: days(row.daysUsed), reviewEveryDays: days(row.reviewEveryDays), leadTimeDays: String(row.leadTimeDays),
    costs: { public: line("public"), business: line("business"), household: line("household") },
    publicTexts: row.publicTexts,
  };
}
