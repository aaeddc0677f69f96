import type { Locale } from "../i18n/locales";

/** A release as anybody may know it; moments are ISO strings, so that it can be cached. */
export type PublishedRelease = {
  id: string;
  briefingId: string;
  outbreakId: string;
  slug: string;
  /** Counted per briefing. */
  number: number;
  kind: "first" | "update" | "correction";
  publishedAt: string;
  assessmentHash: string;
  contentHash: string;
  correction: Partial<Record<Locale, { cause: string; effect: string }>>;
  /** The languages that it was published in. */
  texts: { locale: Locale; title: string; briefingNumber: number }[];
  events: { kind: "superseded" | "corrected" | "withdrawn"; at: string; notice: Partial<Record<Locale, string>>; byReleaseId: string | null }[];
};

/** The newest release of each briefing, newest first. `releases` are newest first. */
export function newestOfEach(releases: readonly PublishedRelease[]): PublishedRelease[] {
  const newest = new Map<string, PublishedRelease>();
  for (const release of releases) {
    const held = newest.get(release.briefingId);
    if (!held || held.number < release.number) newest.set(release.briefingId, release);
  }
  return [...newest.values()];
}

/** Releases of one address, newest first. */
export const ofSlug = (releases: readonly PublishedRelease[], slug: string): PublishedRelease[] =>
  releases.filter((release) => release.slug === slug).sort((a, b) => b.number - a.number);

export const withdrawalOf = (release: PublishedRelease): PublishedRelease["events"][number] | undefined =>
  release.events.find((event) => event.kind === "withdrawn");

/** The reader's language where the release has it, else English, else whichever it has. */
export function chooseText(release: PublishedRelease, locale: Locale): PublishedRelease["texts"][number] | undefined {
  return release.texts.find((text) => text.locale === locale) ?? release.texts.find((text) => text.locale === "en") ?? release.texts[0];
}

/** What was written for residents in several languages: theirs, else English, else the first. */
export function chooseSaid<T>(said: Partial<Record<Locale, T>>, locale: Locale): { value: T; lang: Locale } | null {
  const lang = ([locale, "en", ...Object.keys(said)] as Locale[]).find((each) => said[each] !== undefined);
  const value = lang === undefined ? undefined : said[lang];
  return lang === undefined || value === undefined ? null : { value, lang };
}

export type Change = { at: string; kind: "released" | "updated" | "corrected" | "withdrawn"; release: PublishedRelease };

/** Everything that happened, newest first: releases, corrections, withdrawals. */
export function changesOf(releases: readonly PublishedRelease[]): Change[] {
  const happened = releases.flatMap((release): Change[] => {
    const kind = ({ first: "released", update: "updated", correction: "corrected" } as const)[release.kind];
    const withdrawn = withdrawalOf(release);
    return [{ at: release.publishedAt, kind, release }, ...(withdrawn ? [{ at: withdrawn.at, kind: "withdrawn" as const, release }] : [])];
  });
  return happened.sort((a, b) => (a.at < b.at ? 1 : a.at > b.at ? -1 : 0));
}
