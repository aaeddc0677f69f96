import type { AssessmentResult } from "../engine/types";
import { readFigure } from "../figures/catalogue";
import { isFew, isMeasurable } from "../figures/round";
import type { Locale } from "../i18n/locales";
import { translatorOf } from "../i18n/translator";
import type { FigureRef, Paragraph, PartKey } from "./constants";
import { sourceHash } from "./hash";

/** The figures that a new briefing starts with. */
export function startingFigures(letter: string): FigureRef[] {
  return [
    { ref: "F1", figure: "finalDeaths", package: "none", form: "value" },
    { ref: "F2", figure: "finalDeaths", package: "none", form: "interval" },
    { ref: "F3", figure: "finalDeaths", package: letter, form: "value" },
    { ref: "F4", figure: "finalDeaths", package: letter, form: "interval" },
    { ref: "F5", figure: "deathsAverted", package: letter, form: "value" },
    { ref: "F6", figure: "deathsAverted", package: letter, form: "interval" },
    { ref: "F7", figure: "chanceShrinks", package: letter, form: "value" },
  ];
}

export type Direction = "averts" | "noDifference" | "worse";

/** Which wording the frozen result calls for; never typed, never assumed. */
export function directionOf(result: AssessmentResult, letter: string): Direction {
  const averted = readFigure(result, "deathsAverted", letter);
  if (averted === null) return "noDifference";
  const ends = averted.low === null || averted.high === null ? null : { low: averted.low, high: averted.high };
  if (!isMeasurable(averted.value, ends)) return "noDifference";
  return averted.value > 0 ? "averts" : "worse";
}

export type TemplateFacts = {
  direction: Direction;
  illness: string;
  /** A measure of the package has no end. */
  open: boolean;
  /** Fewer than ten would die: "about" doesn't fit, and chance decides. */
  few: { without: boolean; with: boolean };
  contact: string;
};

/** Where the deaths without and with the package are too few to be given as a number. */
export function fewOf(result: AssessmentResult, letter: string): TemplateFacts["few"] {
  const few = (which: string) => isFew(readFigure(result, "finalDeaths", which)?.value ?? 0);
  return { without: few("none"), with: few(letter) };
}

type Line = { part: PartKey; key: string };
export type TemplateText = { title: string; paragraphs: Paragraph[] };

/** A first text in one language, its wording chosen by the frozen result. Tokens stand for every figure and date. */
export async function templateText(locale: Locale, facts: TemplateFacts): Promise<TemplateText> {
  const t = await translatorOf(locale, "BriefingTemplates");
  const token = (name: string) => `{{${name}}}`;
  const values = {
    illness: facts.illness,
    contact: facts.contact,
    from: token("from"),
    to: token("to"),
    review: token("review"),
    without: token("F1"),
    withoutRange: token("F2"),
    with: token("F3"),
    withRange: token("F4"),
    averted: token("F5"),
    avertedRange: token("F6"),
    chance: token("F7"),
  };
  const { direction } = facts;
  const short = { averts: "shortAverts", noDifference: "shortNoDifference", worse: "shortWorse" } as const;
  const lines: Line[] = [
    { part: "inShort", key: facts.open ? "inForceOpen" : "inForce" },
    { part: "inShort", key: short[direction] },
    { part: "inShort", key: "shrinks" },
    { part: "whatWeExpect", key: facts.few.without ? "withoutFew" : "without" },
    { part: "whatWeExpect", key: facts.few.with ? "withFew" : "with" },
    { part: "whatWeExpect", key: direction },
    { part: "howSure", key: "howSure" },
    { part: "howSure", key: "look" },
    { part: "whatWeDontKnow", key: "unknown" },
    ...(facts.open ? [] : [{ part: "whatWeDontKnow" as const, key: "after" }]),
    { part: "howToObject", key: "object" },
  ];
  const say = (key: string) => t(key as never, values as never) as string;
  const title = say("title");
  return {
    title: title.charAt(0).toLocaleUpperCase(locale) + title.slice(1),
    paragraphs: lines.map(({ part, key }, index) => ({ id: `p${index + 1}`, part, text: say(key) })),
  };
}

/** The same in every language, the translations bound to the source that they were made from. */
export async function templateTexts(locales: readonly Locale[], source: Locale, factsOf: (locale: Locale) => Parameters<typeof templateText>[1]) {
  const own = await templateText(source, factsOf(source));
  const texts = await Promise.all(
    locales.map(async (locale) => {
      const text = locale === source ? own : await templateText(locale, factsOf(locale));
      if (locale === source) return { locale, ...text, titleSourceHash: null };
      const paragraphs = text.paragraphs.map((paragraph, index) => {
        const madeFrom = own.paragraphs[index]?.text ?? "";
        return { ...paragraph, sourceHash: sourceHash(madeFrom), madeFrom };
      });
      return { locale, title: text.title, paragraphs, titleSourceHash: sourceHash(own.title) };
    }),
  );
  return texts;
}
