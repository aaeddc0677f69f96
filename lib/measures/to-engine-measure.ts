import type { MeasureCostInput, MeasureInput } from "@/lib/engine/types";

type Row = {
  code: string;
  name: string;
  cut: { low: number; central: number; high: number; source?: string };
  evidence: string;
  legalBasis: string;
  ladder: string | null;
  maxDays: number | null;
  maxDaysWithin: number | null;
  daysUsed: number | null;
  reviewEveryDays: number | null;
  costs: MeasureCostInput[];
};

/** A catalogue row as the assessment file's measure; its code is the id there. */
export function toEngineMeasure(row: Row): MeasureInput {
  return {
    id: row.code,
    name: row.name,
    cut: row.cut,
    ladder: row.ladder,
    maxDays: row.maxDays,
    ...(row.maxDaysWithin === null ? {} : { maxDaysWithin: row.maxDaysWithin }),
    ...(row.daysUsed === null ? {} : { daysUsed: row.daysUsed }),
    ...(row.reviewEveryDays === null ? {} : { reviewEveryDays: row.reviewEveryDays }),
    costs: row.costs,
    ...(row.legalBasis ? { legalBasis: row.legalBasis } : {}),
    ...(row.evidence ? { evidence: row.evidence } : {}),
  };
}
