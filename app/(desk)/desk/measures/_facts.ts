import type { Payer, Quantity } from "@/lib/engine/types";
import type { Measure } from "@/lib/measures/queries";
import type { MeasureFacts } from "./_measure-form";

const COST_KINDS = ["setUp", "perDay", "perResidentDay"] as const;
const figure = (value: number) => String(Number(value.toPrecision(15)));
/** What is taken as certain stands in the middle, its ends left empty. */
const spread = (value: Quantity) =>
  typeof value === "number" ? { low: "", central: figure(value), high: "" } : { low: figure(value.low), central: figure(value.central), high: figure(value.high) };
const days = (value: number | null) => (value === null ? "" : String(value));

export const EMPTY_MEASURE: MeasureFacts = {
  code: "", name: "", shortName: "", instruction: "", cutPercent: { low: "", central: "", high: "", source: "" }, evidence: "", legalBasis: "", legalLink: "", ladder: "",
  maxDays: "", maxDaysWithin: "", daysUsed: "", reviewEveryDays: "", leadTimeDays: "0", costs: { public: {}, business: {}, household: {} }, transfers: { public: {}, business: {}, household: {} }, publicTexts: {},
};

/** A row as the form shows it: text, and shares in per cent. */
export function measureFacts(row: Measure): MeasureFacts {
  const lines = (transfer: boolean) => {
    const line = (payer: Payer) => {
      const found = row.costs.find((each) => each.payer === payer && (each.transfer ?? false) === transfer);
      return Object.fromEntries(COST_KINDS.flatMap((kind) => (found?.[kind] === undefined ? [] : [[kind, spread(found[kind])]])));
    };
    return { public: line("public"), business: line("business"), household: line("household") };
  };
  return {
    id: row.id, version: row.version, code: row.code, name: row.name, shortName: row.shortName, instruction: row.instruction,
    cutPercent: { low: figure(row.cut.low * 100), central: figure(row.cut.central * 100), high: figure(row.cut.high * 100), source: row.cut.source ?? "" },
    evidence: row.evidence, legalBasis: row.legalBasis, legalLink: row.legalLink, ladder: row.ladder ?? "",
    maxDays: days(row.maxDays), maxDaysWithin: days(row.maxDaysWithin), daysUsed: days(row.daysUsed), reviewEveryDays: days(row.reviewEveryDays), leadTimeDays: String(row.leadTimeDays),
    costs: lines(false), transfers: lines(true),
    publicTexts: row.publicTexts,
  };
}
