import type { AssessmentInput, MeasureCostInput, Quantity } from "@/lib/engine/types";
import type { Locale } from "@/lib/i18n/locales";
import { toEngineMeasure } from "@/lib/measures/to-engine-measure";
import type { OutbreakProfile } from "@/lib/outbreaks/profile";
import { toEngineOutbreak } from "@/lib/outbreaks/to-engine-outbreak";
import { toEnginePackage } from "@/lib/packages/to-engine-package";

export type SourceOutbreak = {
  id: string;
  name: string;
  place: string;
  populationPersons: number;
  currency: string;
  priceYear: number;
  dayZero: string;
  languages: Locale[];
  publicNames: Partial<Record<Locale, { name: string; place: string }>>;
  profile: OutbreakProfile;
};
export type SourcePackage = {
  id: string;
  letter: string;
  name: string;
  version: number;
  items: { measureId: string; uptake: Quantity; startDay: number; endDay: number | null }[];
};
export type SourceMeasure = {
  id: string;
  code: string;
  name: string;
  shortName: string;
  instruction: string;
  cut: { low: number; central: number; high: number; source?: string };
  evidence: string;
  legalBasis: string;
  legalLink: string;
  ladder: string | null;
  leadTimeDays: number;
  maxDays: number | null;
  maxDaysWithin: number | null;
  daysUsed: number | null;
  reviewEveryDays: number | null;
  costs: MeasureCostInput[];
  publicTexts: Partial<Record<Locale, { title: string; detail: string }>>;
};

/** The rows that an assessment is made from, as they stand at one moment. */
export type Sources = {
  outbreak: SourceOutbreak;
  /** The chosen ones, in the order of their letters. */
  packages: SourcePackage[];
  /** Everything that may be named by a package. */
  measures: SourceMeasure[];
  settings: { draws: number; seed: number; horizonDays: number };
};

/** The measures that these packages name, in the order of their codes. */
export function usedMeasures({ packages, measures }: Pick<Sources, "packages" | "measures">): SourceMeasure[] {
  const named = new Set(packages.flatMap(({ items }) => items.map(({ measureId }) => measureId)));
  return measures.filter(({ id }) => named.has(id)).sort((a, b) => (a.code < b.code ? -1 : 1));
}

/** Rows → assessment file. Same rows, same file to the byte. */
export function toInput(sources: Sources): AssessmentInput {
  const { outbreak, packages, settings } = sources;
  const measures = usedMeasures(sources);
  const codeOf = new Map(measures.map(({ id, code }) => [id, code]));
  return {
    format: "ebbmark.assessment-input/1",
    outbreak: toEngineOutbreak(outbreak),
    measures: measures.map(toEngineMeasure),
    packages: packages.map((each) => toEnginePackage(each, codeOf)),
    horizonDays: settings.horizonDays,
    uncertainty: { draws: settings.draws, seed: settings.seed },
  };
}
