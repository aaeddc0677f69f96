import { type FigureKey, type FigureValue, FIGURES } from "./catalogue";
import { formatPercent, formatPersons } from "./format";
import { isFew, percentShown } from "./round";

/** What a language adds to numbers; given by the caller, since this folder knows no catalogue. */
export type FigureWords = {
  /** BCP 47, with Latin digits. */
  numberLocale: string;
  interval: (low: string, high: string) => string;
  few: string;
  under: (percent: string) => string;
  over: (percent: string) => string;
  day: (day: number) => string;
  money: (amount: number) => string;
};

const one = (key: FigureKey, value: number, words: FigureWords): string => {
  switch (FIGURES[key].kind) {
    case "deaths":
    case "persons":
      return formatPersons(value, words.numberLocale);
    case "share": {
      const { bound, percent } = percentShown(value);
      const text = formatPercent(percent / 100, words.numberLocale);
      return bound === "plain" ? text : words[bound](text);
    }
    case "day":
      return words.day(value);
    case "money":
      return words.money(value);
  }
};

/**
 * A figure as it is shown: the central value, or its interval.
 * @returns null where there is no interval to show
 */
export function showFigure(key: FigureKey, figure: FigureValue, form: "value" | "interval", words: FigureWords): string | null {
  if (form === "interval") return figure.low === null || figure.high === null ? null : words.interval(one(key, figure.low, words), one(key, figure.high, words));
  // A bare count under ten says more than is known: chance decides there.
  if (FIGURES[key].kind === "deaths" && isFew(figure.value)) return words.few;
  return one(key, figure.value, words);
}
