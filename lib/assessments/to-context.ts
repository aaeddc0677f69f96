import { legalFindings } from "@/lib/packages/legal-findings";
import { SNAPSHOT_VERSION } from "./constants";
import type { ContextSnapshot, MeasureSnapshot, PackageSnapshot } from "./snapshot";
import { type SourceMeasure, type Sources, usedMeasures } from "./to-input";

/** Rows → what is kept beside the two files: names, law, evidence, residents' words. Same rows, same context. */
export function toContext(sources: Sources, assessment: { number: number; title: string }): ContextSnapshot {
  const { profile: _, ...outbreak } = sources.outbreak;
  const measures = usedMeasures(sources);
  const codeOf = new Map(measures.map(({ id, code }) => [id, code]));
  return {
    snapshotVersion: SNAPSHOT_VERSION,
    assessment,
    outbreak: {
      id: outbreak.id,
      name: outbreak.name,
      place: outbreak.place,
      publicNames: outbreak.publicNames,
      populationPersons: outbreak.populationPersons,
      dayZero: outbreak.dayZero,
      currency: outbreak.currency,
      priceYear: outbreak.priceYear,
      languages: outbreak.languages,
    },
    packages: sources.packages.map((each): PackageSnapshot => {
      const items = each.items.map(({ measureId, startDay, endDay }) => ({ measureCode: codeOf.get(measureId) ?? measureId, startDay, endDay }));
      const found = legalFindings(items, measures);
      const ends = items.map(({ endDay }) => endDay);
      return {
        letter: each.letter,
        name: each.name,
        startDay: items.length === 0 ? null : Math.min(...items.map(({ startDay }) => startDay)),
        endDay: ends.length === 0 || ends.includes(null) ? null : Math.max(...(ends as number[])),
        items,
        deliverable: found.length === 0,
        legalFindings: found,
      };
    }),
    measures: measures.map(snapshotOf),
  };
}

function snapshotOf(row: SourceMeasure): MeasureSnapshot {
  return {
    code: row.code,
    name: row.name,
    shortName: row.shortName,
    instruction: row.instruction,
    legalBasis: row.legalBasis,
    legalLink: row.legalLink,
    evidence: row.evidence,
    cutSource: row.cut.source ?? "",
    ladder: row.ladder,
    leadTimeDays: row.leadTimeDays,
    limits: { maxDays: row.maxDays, maxDaysWithin: row.maxDaysWithin, daysUsed: row.daysUsed, reviewEveryDays: row.reviewEveryDays },
    publicTexts: row.publicTexts,
  };
}
