import { createElement } from "react";
import { describe, expect, test } from "vitest";
import { FindingLede } from "@/components/assessments/finding-lede";
import type { FindingSentence } from "@/lib/assessments/finding";
import { draw } from "../charts/draw";

const outbreak = { dayZero: "2027-03-01", currency: "EUR" };
const read = (...finding: FindingSentence[]) =>
  draw(createElement(FindingLede, { finding, outbreak }))
    .markup.replace(/<[^>]+>/g, " ")
    .replace(/\s+/g, " ")
    .replaceAll("&#x27;", "’")
    .replace(/ ([.,:;])/g, "$1")
    .trim();
const others = { reproductionNumber: { mid: 0.7169, low: 0.55, high: 0.96 }, ratio: { mid: 1.394, low: 1.04, high: 1.83 } };
const deaths = { mid: 449.6, low: 105.4, high: 862.2 };
const certain = { mid: 449.6, low: null, high: null };

describe("each sentence of the finding", () => {
  test.each<[FindingSentence, string]>([
    [{ key: "onlyEnough", letter: "C", held: true, ...others }, "Only C is enough, and only while it is held: each case then leads to 0.72 0.55 to 0.96 others (threshold ratio 1.39)."],
    [{ key: "onlyEnough", letter: "C", held: false, ...others }, "Only C is enough, and it is never lifted: each case then leads to 0.72 0.55 to 0.96 others (threshold ratio 1.39)."],
    [{ key: "enough", letter: "C", held: true, reproductionNumber: { mid: 0.7169, low: null, high: null }, ratio: { mid: 1.394, low: null, high: null } }, "C is enough while it is held: each case then leads to 0.72 others (threshold ratio 1.39)."],
    [{ key: "severalEnough", letters: ["B", "C", "D"], held: true }, "B, C, and D are enough while they are held: each case then leads to fewer than one other."],
    [{ key: "uncertainEnough", letter: "B", chance: 0.148, ...others }, "Whether B, the strongest, is enough is uncertain: it is in 15 % of draws. Each case then leads to 0.72 0.55 to 0.96 others (threshold ratio 1.39)."],
    [{ key: "noneEnough", letter: "B", single: false, furtherCut: 0.106, reproductionNumber: { mid: 1.119, low: 1.01, high: 1.4 }, ratio: { mid: 0.894, low: 0.71, high: 0.99 } }, "No package is enough. With B, the strongest, each case still leads to 1.12 1.01 to 1.40 others (threshold ratio 0.89), so a further cut of 11 % of what remains is needed."],
    [{ key: "noneEnough", letter: "B", single: true, furtherCut: 0.106, reproductionNumber: { mid: 1.119, low: 1.01, high: 1.4 }, ratio: { mid: 0.894, low: 0.71, high: 0.99 } }, "B is not enough: each case still leads to 1.12 1.01 to 1.40 others (threshold ratio 0.89), so a further cut of 11 % of what remains is needed."],
    [{ key: "diesOutAnyway", ...others }, "Without further measures the outbreak already dies out: each case leads to 0.72 0.55 to 0.96 others (threshold ratio 1.39)."],
    [{ key: "afterLift", letter: "C", endDay: 77, susceptibleShare: 0.9987, outcome: "noDifference", deaths }, "Lifted after 16 May with 99.9 % still susceptible, C makes no measurable difference to deaths in the end."],
    [{ key: "afterLift", letter: "C", endDay: 77, susceptibleShare: 0.6, outcome: "averts", deaths }, "Lifted after 16 May with 60 % still susceptible, C averts about 450 105 to 862 deaths."],
    [{ key: "afterLift", letter: "C", endDay: 400, susceptibleShare: 0.6, outcome: "worse", deaths: certain }, "Lifted after 3 Apr 2028 with 60 % still susceptible, C ends with about 450 more deaths than no further measures."],
    [{ key: "avertsMost", letter: "B", averted: deaths, over: { letter: "A", chance: 0.79 } }, "As scheduled, B averts most: about 450 105 to 862 deaths, and more than A in 79 % of draws."],
    [{ key: "avertsMost", letter: "B", averted: certain, over: null }, "As scheduled, B averts most: about 450 deaths."],
    [{ key: "avertAlike", letter: "B", other: "A", averted: deaths, otherAverted: { mid: 376, low: 39, high: 745 }, chance: 0.58, same: false }, "As scheduled, B and A avert about the same: 450 105 to 862 and 376 deaths; B averts more in 58 % of draws."],
    [{ key: "avertAlike", letter: "B", other: "A", averted: deaths, otherAverted: deaths, chance: 0, same: true }, "As scheduled, B and A avert the same: about 450 105 to 862 deaths."],
    [{ key: "avertsOnly", letter: "A", averted: deaths, single: false }, "As scheduled, only A averts a measurable number of deaths: about 450 105 to 862."],
    [{ key: "avertsOnly", letter: "A", averted: deaths, single: true }, "As scheduled, it averts about 450 105 to 862 deaths."],
    [{ key: "noneAverts", single: false }, "As scheduled, no package makes a measurable difference to deaths in the end."],
    [{ key: "noneAverts", single: true }, "As scheduled, it makes no measurable difference to deaths in the end."],
    [{ key: "worse", letter: "D", more: { mid: 120, low: 20, high: 300 } }, "D ends with about 120 20 to 300 more deaths than no further measures."],
    [{ key: "costs", costs: [{ letter: "B", total: { mid: 30_537_040, low: null, high: null } }], more: null }, "B costs about €30.5 million."],
    [{ key: "costs", costs: [{ letter: "B", total: { mid: 30_537_040, low: null, high: null } }, { letter: "A", total: { mid: 15_800_800, low: null, high: null } }], more: 14_736_240 }, "B costs about €30.5 million, about €14.7 million more than A."],
    [{ key: "costs", costs: [{ letter: "B", total: { mid: 30_537_040, low: null, high: null } }, { letter: "A", total: { mid: 15_800_800, low: null, high: null } }], more: null }, "B costs about €30.5 million, A about €15.8 million."],
  ])("%o", (sentence, words) => expect(read(sentence).replaceAll("\u00a0", " ")).toBe(words));
});
