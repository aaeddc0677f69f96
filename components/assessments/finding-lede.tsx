import { useTranslations } from "next-intl";
import type { ReactNode } from "react";
import type { Range } from "@/lib/charts/axes";
import type { FindingSentence } from "@/lib/assessments/finding";
import { percentShown, wholePersons } from "@/lib/figures/round";
import { type Shown, useShown } from "./use-shown";

type Chunks = ReactNode;
const TAGS = {
  p: (chunks: Chunks) => <b className="nw">{chunks}</b>,
  fig: (chunks: Chunks) => <bdi className="fig">{chunks}</bdi>,
  b: (chunks: Chunks) => <b>{chunks}</b>,
  iv: (chunks: Chunks) => <span className="iv">{chunks}</span>,
  u: (chunks: Chunks) => <span className="u">{chunks}</span>,
};
type Values = Record<string, string | number>;

const ends = ({ low, high }: Range, write: (value: number) => number): Values =>
  low === null || high === null ? { drawn: "no", low: 0, high: 0 } : { drawn: "yes", low: write(low), high: write(high) };
const persons = (range: Range): Values => ({ deaths: wholePersons(range.mid), ...ends(range, wholePersons) });
const others = (reproductionNumber: Range, ratio: Range): Values => ({ others: reproductionNumber.mid, ratio: ratio.mid, ...ends(reproductionNumber, (value) => value) });

/** Rounded values of one sentence; the words are the catalogue's. */
function valuesOf(sentence: FindingSentence, shown: Shown, list: (letters: string[]) => string): Values {
  switch (sentence.key) {
    case "diesOutAnyway":
      return others(sentence.reproductionNumber, sentence.ratio);
    case "onlyEnough":
    case "enough":
      return { letter: sentence.letter, held: sentence.held ? "yes" : "no", ...others(sentence.reproductionNumber, sentence.ratio) };
    case "severalEnough":
      return { letters: list(sentence.letters), held: sentence.held ? "yes" : "no" };
    case "uncertainEnough":
      return { letter: sentence.letter, ...percentShown(sentence.chance), ...others(sentence.reproductionNumber, sentence.ratio) };
    case "noneEnough":
      return { letter: sentence.letter, single: sentence.single ? "yes" : "no", cut: Math.round(sentence.furtherCut * 100), ...others(sentence.reproductionNumber, sentence.ratio) };
    case "afterLift":
      return { letter: sentence.letter, outcome: sentence.outcome, lastDay: shown.lastDay(sentence.endDay), share: Math.round(sentence.susceptibleShare * 1000) / 10, ...persons(sentence.deaths) };
    case "avertsMost":
      return { letter: sentence.letter, other: sentence.over?.letter ?? "", ...percentShown(sentence.over?.chance ?? 0), compared: sentence.over ? "yes" : "no", ...persons(sentence.averted) };
    case "avertAlike":
      return { letter: sentence.letter, other: sentence.other, ...percentShown(sentence.chance), otherDeaths: wholePersons(sentence.otherAverted.mid), same: sentence.same ? "yes" : "no", ...persons(sentence.averted) };
    case "avertsOnly":
      return { letter: sentence.letter, single: sentence.single ? "yes" : "no", ...persons(sentence.averted) };
    case "noneAverts":
      return { single: sentence.single ? "yes" : "no" };
    case "worse":
      return { letter: sentence.letter, ...persons(sentence.more) };
    case "costs": {
      const [first, second] = sentence.costs;
      return { count: sentence.costs.length, letter: first?.letter ?? "", amount: shown.amount(first?.total.mid ?? 0), other: second?.letter ?? "", otherAmount: shown.amount(second?.total.mid ?? 0), known: sentence.more === null ? "no" : "yes", more: shown.amount(sentence.more ?? 0) };
    }
  }
}

/** What the assessment found, as sentences with their figures. */
export function FindingLede({ finding, outbreak }: { finding: FindingSentence[]; outbreak: { dayZero: string; currency: string } }) {
  const t = useTranslations("Assessments");
  const shown = useShown(outbreak);
  // Twelve sentences with their own values each are too many for the compiler to tell apart; valuesOf has the pairs.
  const rich = t.rich as unknown as (key: string, values: Record<string, unknown>) => ReactNode;
  const list = (letters: string[]) => new Intl.ListFormat(shown.tag, { type: "conjunction" }).format(letters);
  return (
    <p className="lede">
      {finding.map((sentence, index) => (
        <span key={index} data-finding={sentence.key}>
          {rich(`finding.${sentence.key}`, { ...valuesOf(sentence, shown, list), ...TAGS })}{" "}
        </span>
      ))}
    </p>
  );
}
