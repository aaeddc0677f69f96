import { digitKey, isKnownToken, strayBraces, tokensOf, typedDigits } from "./tokens";

export type TextParagraph = { id: string; text: string; sourceHash?: string };
/** What is wrong with a text, and where. `paragraph` is the paragraph's place, from 1; null for the title. */
export type TextFinding =
  | { level: "stops"; code: "titleMissing" | "textMissing" | "paragraphMissing" | "stale"; paragraph: number | null }
  | { level: "stops"; code: "tokenUnknown" | "tokenMissing" | "tokenExtra"; paragraph: number | null; token: string }
  | { level: "stops"; code: "braces"; paragraph: number | null; token: string }
  | { level: "stops"; code: "digitsDiffer"; paragraph: number | null; digits: string }
  | { level: "looks"; code: "untranslated"; paragraph: number | null }
  | { level: "looks"; code: "digitsTyped"; paragraph: number | null; digits: string }
  | { level: "looks"; code: "longSentence"; paragraph: number | null; words: number }
  | { level: "looks"; code: "noInterval"; paragraph: number | null; token: string };

const SENTENCE_WORDS = 20;

/** How often each is there. */
function tally(list: readonly string[]): Map<string, number> {
  const counts = new Map<string, number>();
  for (const each of list) counts.set(each, (counts.get(each) ?? 0) + 1);
  return counts;
}

/** Those of `a` that `b` has fewer of. */
const lacking = (a: readonly string[], b: readonly string[]): string[] => {
  const [inA, inB] = [tally(a), tally(b)];
  return [...inA].filter(([key, n]) => (inB.get(key) ?? 0) < n).map(([key]) => key);
};

/** What stops or wants a look in the source text. @param resolvable tokens that the assessment and schedule can fill */
export function checkSource(title: string, paragraphs: readonly TextParagraph[], resolvable: ReadonlySet<string>, intervalOf: (ref: string) => string | null, locale: string): TextFinding[] {
  const found: TextFinding[] = title.trim() === "" ? [{ level: "stops", code: "titleMissing", paragraph: null }] : [];
  if (!paragraphs.some(({ text }) => text.trim() !== "")) found.push({ level: "stops", code: "textMissing", paragraph: null });
  for (const [index, { text }] of [{ text: title }, ...paragraphs].entries()) {
    const paragraph = index === 0 ? null : index;
    const tokens = tokensOf(text);
    for (const token of new Set(tokens)) if (!isKnownToken(token) || !resolvable.has(token)) found.push({ level: "stops", code: "tokenUnknown", paragraph, token });
    for (const token of strayBraces(text)) found.push({ level: "stops", code: "braces", paragraph, token });
    for (const token of tokens) {
      const interval = intervalOf(token);
      if (interval !== null && !tokens.includes(interval)) found.push({ level: "looks", code: "noInterval", paragraph, token });
    }
    const digits = typedDigits(text);
    if (digits.length > 0) found.push({ level: "looks", code: "digitsTyped", paragraph, digits: digits.join(", ") });
    const longest = longestSentence(text, locale);
    if (longest > SENTENCE_WORDS) found.push({ level: "looks", code: "longSentence", paragraph, words: longest });
  }
  return found;
}

/** Whether a translation says the same: nothing missing or stale, the same tokens and the same digits, order free. */
export function checkTranslation(
  source: { title: string; paragraphs: readonly TextParagraph[]; hashOf: (text: string) => string },
  translation: { title: string; titleSourceHash: string | null; paragraphs: readonly TextParagraph[] },
): TextFinding[] {
  const found: TextFinding[] = [];
  const compare = (from: string, to: string, paragraph: number | null, madeFrom: string | null | undefined) => {
    if (to.trim() === "") {
      found.push({ level: "stops", code: paragraph === null ? "titleMissing" : "paragraphMissing", paragraph });
      return;
    }
    if (madeFrom !== source.hashOf(from)) found.push({ level: "stops", code: "stale", paragraph });
    const [wanted, given] = [tokensOf(from), tokensOf(to)];
    for (const token of lacking(wanted, given)) found.push({ level: "stops", code: "tokenMissing", paragraph, token });
    for (const token of lacking(given, wanted)) found.push({ level: "stops", code: isKnownToken(token) ? "tokenExtra" : "tokenUnknown", paragraph, token });
    for (const token of strayBraces(to)) found.push({ level: "stops", code: "braces", paragraph, token });
    if (/\p{L}{3}/u.test(to.replace(/\{\{[^{}]*\}\}/g, "")) && to.trim() === from.trim()) found.push({ level: "looks", code: "untranslated", paragraph });
    const [typedFrom, typedTo] = [typedDigits(from).map(digitKey), typedDigits(to).map(digitKey)];
    const differ = [...lacking(typedFrom, typedTo), ...lacking(typedTo, typedFrom)];
    if (differ.length > 0) found.push({ level: "stops", code: "digitsDiffer", paragraph, digits: [...new Set(differ)].join(", ") });
  };
  compare(source.title, translation.title, null, translation.titleSourceHash);
  for (const [index, paragraph] of source.paragraphs.entries()) {
    const own = translation.paragraphs.find(({ id }) => id === paragraph.id);
    compare(paragraph.text, own?.text ?? "", index + 1, own?.sourceHash);
  }
  return found;
}

/** Words of the longest sentence; a token counts as one word. */
function longestSentence(text: string, locale: string): number {
  const plain = text.replace(/\{\{[^{}]*\}\}/g, "0");
  const words = new Intl.Segmenter(locale, { granularity: "word" });
  return Math.max(0, ...[...new Intl.Segmenter(locale, { granularity: "sentence" }).segment(plain)].map(({ segment }) => [...words.segment(segment)].filter(({ isWordLike }) => isWordLike).length));
}
