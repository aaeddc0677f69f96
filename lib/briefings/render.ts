import type { FrozenAssessment } from "../assessments/queries";
import type { MeasureSnapshot } from "../assessments/snapshot";
import { type FigureKey, isFigureKey, readFigure } from "../figures/catalogue";
import { formatMoneyInText } from "../figures/format";
import { type FigureWords, showFigure } from "../figures/resolve";
import { wholePersons } from "../figures/round";
import { piecesOfText } from "../figures/tokens";
import { formatDay } from "../i18n/dates";
import { type Locale, numberLocale } from "../i18n/locales";
import { translatorOf } from "../i18n/translator";
import { dateOf } from "../packages/days";
import { type FigureRef, PART_KEYS, type Paragraph } from "./constants";
import type { Inline, PeopleShare, RenderedBriefing, RenderedMeasure } from "./rendered";

export type RenderFacts = {
  number: number;
  versionNumber: number;
  slug: string;
  packageLetter: string;
  reviewDate: string | null;
  figures: readonly FigureRef[];
  authority: { name: string; contact: string };
  demonstration: boolean;
};

export type RenderText = { locale: Locale; title: string; paragraphs: readonly Paragraph[] };

/** Between these chances of shrinking the 95 % interval of the effective ratio holds 1: nobody can say which way it goes. */
const UNDECIDED = { from: 0.025, to: 0.975 };

/** Numbers and dates in one language. */
async function wordsOf(locale: Locale, { dayZero, currency, priceYear }: FrozenAssessment["context"]["outbreak"]): Promise<{ words: FigureWords; label: (ref: FigureRef, chosen: string) => string }> {
  const t = await translatorOf(locale, "Figures");
  return {
    words: {
      numberLocale: numberLocale(locale),
      interval: (low, high) => t("interval", { low, high }),
      few: t("few"),
      under: (percent) => t("under", { percent }),
      over: (percent) => t("over", { percent }),
      day: (day) => formatDay(dateOf(dayZero, Math.round(day)), locale),
      money: (amount) => formatMoneyInText(amount, currency, numberLocale(locale)),
    },
    label: ({ figure, package: letter, form }, chosen) => {
      const which = letter === "none" ? t("without") : letter === chosen ? t("with") : t("other", { letter });
      const label = isFigureKey(figure) ? t(`labels.${figure}`, { which, year: String(priceYear) }) : figure;
      return form === "interval" ? `${label} (${t("range")})` : label;
    },
  };
}

/** The schedule of the decided package as residents read it, in one language. */
function scheduleOf(frozen: FrozenAssessment, letter: string, locale: Locale): RenderedMeasure[] {
  const { context } = frozen;
  const dayZero = context.outbreak.dayZero;
  const measure = new Map(context.measures.map((each) => [each.code, each]));
  const words = (found: MeasureSnapshot | undefined, code: string) => found?.publicTexts[locale] ?? found?.publicTexts.en ?? { title: found?.name ?? code, detail: found?.instruction ?? "" };
  const items = context.packages.find((each) => each.letter === letter)?.items ?? [];
  return items
    .map(({ measureCode, startDay, endDay }) => {
      const found = measure.get(measureCode);
      return {
        code: measureCode,
        ...words(found, measureCode),
        from: dateOf(dayZero, startDay),
        to: endDay === null ? null : dateOf(dayZero, endDay - 1),
        startDay,
        endDay,
        legalBasis: found?.legalBasis ?? "",
        legalLink: found?.legalLink ?? "",
      };
    })
    .toSorted((a, b) => a.startDay - b.startDay || (a.code < b.code ? -1 : 1));
}

/** Dates that a text may name, by token; ISO. */
export function datesOf(frozen: FrozenAssessment, letter: string, reviewDate: string | null): Map<string, string> {
  const dayZero = frozen.context.outbreak.dayZero;
  const found = frozen.context.packages.find((each) => each.letter === letter);
  const dates = new Map<string, string>();
  for (const { measureCode, startDay, endDay } of found?.items ?? []) {
    dates.set(`start:${measureCode}`, dateOf(dayZero, startDay));
    if (endDay !== null) dates.set(`end:${measureCode}`, dateOf(dayZero, endDay - 1));
  }
  if (found?.startDay != null) dates.set("from", dateOf(dayZero, found.startDay));
  if (found?.endDay != null) dates.set("to", dateOf(dayZero, found.endDay - 1));
  if (reviewDate) dates.set("review", reviewDate);
  return dates;
}

/** Tokens that this briefing's assessment, schedule and settings can fill. */
export function resolvableTokens(frozen: FrozenAssessment, facts: Pick<RenderFacts, "packageLetter" | "reviewDate" | "figures">): Set<string> {
  const figures = facts.figures.filter(({ figure, package: letter, form }) => {
    const value = isFigureKey(figure) ? readFigure(frozen.result, figure, letter) : null;
    return value !== null && (form === "value" || (value.low !== null && value.high !== null));
  });
  return new Set([...figures.map(({ ref }) => ref), ...datesOf(frozen, facts.packageLetter, facts.reviewDate).keys()]);
}

/**
 * The paragraphs of one language in the order and parts of its source: what the source dropped goes, what isn't
 * translated yet is left out.
 */
export const pairedParagraphs = (source: readonly Paragraph[], own: readonly Paragraph[]): Paragraph[] =>
  source.flatMap(({ id, part }) => {
    const found = own.find((each) => each.id === id);
    return found ? [{ ...found, part }] : [];
  });

/** Exactly what one language shows: every token filled from the frozen assessment, the schedule or the settings. */
export async function renderBriefing(frozen: FrozenAssessment, facts: RenderFacts, text: RenderText): Promise<RenderedBriefing> {
  const { locale } = text;
  const { outbreak } = frozen.context;
  const { words, label } = await wordsOf(locale, outbreak);
  const dates = datesOf(frozen, facts.packageLetter, facts.reviewDate);
  const shown = new Map(
    facts.figures.map((ref) => {
      const value = isFigureKey(ref.figure) ? readFigure(frozen.result, ref.figure, ref.package) : null;
      return [ref.ref, { ref, text: (value && showFigure(ref.figure as FigureKey, value, ref.form, words)) ?? "–" }] as const;
    }),
  );
  const inlinesOf = (raw: string): Inline[] =>
    piecesOfText(raw).map((piece): Inline => {
      if (piece.kind === "text") return { kind: "text", text: piece.text };
      const figure = shown.get(piece.token);
      if (figure) return { kind: "figure", ref: piece.token, text: figure.text, interval: figure.ref.form === "interval" };
      const iso = dates.get(piece.token);
      return iso ? { kind: "date", token: piece.token, text: formatDay(iso, locale), iso } : { kind: "text", text: `{{${piece.token}}}` };
    });
  const paragraphs = text.paragraphs.filter(({ text: raw }) => raw.trim() !== "").map(({ id, part, text: raw }) => ({ id, part, inlines: inlinesOf(raw) }));
  const title = inlinesOf(text.title);
  const used = new Set([title, ...paragraphs.map(({ inlines }) => inlines)].flatMap((inlines) => inlines.flatMap((inline) => (inline.kind === "figure" ? [inline.ref] : []))));
  const measures = scheduleOf(frozen, facts.packageLetter, locale);
  const chance = readFigure(frozen.result, "chanceShrinks", facts.packageLetter)?.value ?? null;
  const publicName = outbreak.publicNames[locale] ?? { name: outbreak.name, place: outbreak.place };
  const from = dates.get("from") ?? outbreak.dayZero;
  return {
    locale,
    briefingNumber: facts.number,
    versionNumber: facts.versionNumber,
    slug: facts.slug,
    title: title.map((inline) => inline.text).join(""),
    outbreakName: publicName.name,
    place: publicName.place,
    authorityName: facts.authority.name,
    authorityContact: facts.authority.contact,
    parts: PART_KEYS.flatMap((part) => {
      const own = paragraphs.filter((paragraph) => paragraph.part === part).map(({ id, inlines }) => ({ id, inlines }));
      return own.length ? [{ part, paragraphs: own }] : [];
    }),
    schedule: { dayZero: outbreak.dayZero, endDay: Math.max(90, ...measures.map(({ endDay, startDay }) => endDay ?? startDay + 180)), measures },
    inForce: { from, to: dates.get("to") ?? null },
    reviewDate: facts.reviewDate,
    people: peopleOf(frozen, facts.packageLetter),
    figures: [...shown.values()].filter(({ ref }) => used.has(ref.ref)).map(({ ref, text: value }) => ({ ref: ref.ref, text: value, label: label(ref, facts.packageLetter), figure: ref.figure, package: ref.package, form: ref.form })),
    roundingNote: partsDisagree(frozen, facts.packageLetter),
    nearThreshold: chance === null ? false : chance > UNDECIDED.from && chance < UNDECIDED.to,
    demonstration: facts.demonstration,
  };
}

function peopleOf(frozen: FrozenAssessment, letter: string): RenderedBriefing["people"] {
  const of = (which: string): PeopleShare | null => {
    const infected = readFigure(frozen.result, "infected", which);
    const died = readFigure(frozen.result, "finalDeaths", which);
    const perThousand = (value: number) => Math.round((1000 * value) / frozen.context.outbreak.populationPersons);
    return infected && died ? { infected: perThousand(infected.value), died: perThousand(died.value) } : null;
  };
  const [without, withThem] = [of("none"), of(letter)];
  return without && withThem ? { without, with: withThem } : null;
}

/** Whether the rounded figures don't subtract to the rounded difference. */
function partsDisagree(frozen: FrozenAssessment, letter: string): boolean {
  const [without, withThem, averted] = [readFigure(frozen.result, "finalDeaths", "none"), readFigure(frozen.result, "finalDeaths", letter), readFigure(frozen.result, "deathsAverted", letter)];
  return Boolean(without && withThem && averted && wholePersons(without.value) - wholePersons(withThem.value) !== wholePersons(averted.value));
}

