/**
 * How long the engine takes: `npm run bench`, on one core, nothing else running. Each line is the best of several runs,
 * since everything that disturbs a run makes it longer.
 */
import { readFileSync } from "node:fs";
import { type AssessmentInput, assess } from "@/lib/engine";
import { makePlan, pieceFactors } from "@/lib/engine/measure-effects";
import { outbreakReader } from "@/lib/engine/outbreak";
import { Draws } from "@/lib/engine/quantities";
import { latinHypercubeScores } from "@/lib/engine/random";
import { settledValue } from "@/lib/engine/settled-state";
import { followSchedule, newRun } from "@/lib/engine/taylor-kernel";

const demo = JSON.parse(readFileSync(new URL("../../db/demo/kelmaren.json", import.meta.url), "utf8")) as AssessmentInput;

function best(runs: number, work: () => void): number {
  let least = Number.POSITIVE_INFINITY;
  for (let run = 0; run < runs; run++) {
    const began = performance.now();
    work();
    least = Math.min(least, performance.now() - began);
  }
  return least;
}
const say = (what: string, ms: number, note = "") => console.log(`${what.padEnd(64)} ${ms.toFixed(1).padStart(9)} ms  ${note}`);

/** Uniform in [0, 1) without a package: the inputs need to look random, no more. */
let state = 1;
const random = () => {
  state = (Math.imul(state, 1_664_525) + 1_013_904_223) >>> 0;
  return state / 0x1_0000_0000;
};

function settledValues(): void {
  const count = 1_000_000;
  const excess = new Float64Array(count);
  const ratio = new Float64Array(count);
  for (let i = 0; i < count; i++) {
    // 30 % within a thousandth of the threshold, the rest over six orders of magnitude.
    ratio[i] = random() < 0.3 ? 1 + (random() - 0.5) * 2e-3 : 10 ** (6 * random() - 3);
    excess[i] = random() < 0.2 ? 0 : 10 ** (7 * random() - 6);
  }
  let sum = 0;
  const ms = best(5, () => {
    for (let i = 0; i < count; i++) sum += settledValue(excess[i]!, ratio[i]!, 1 - ratio[i]!);
  });
  if (!Number.isFinite(sum)) throw new Error("a settled value is not finite");
  say("settled value, 1,000,000 random inputs, 30 % near b = 1", ms, `${((1e6 * ms) / count).toFixed(0)} ns each`);
}

/** The demonstration with its three packages repeated to eight, each a few days apart. */
function eightPackages(draws: number): AssessmentInput {
  const packages = Array.from({ length: 8 }, (_, i) => {
    const model = demo.packages[i % demo.packages.length]!;
    const items = model.items.map((item) => ({ ...item, startDay: item.startDay + i, endDay: item.endDay === null ? null : item.endDay + i }));
    return { ...model, id: `P${i}`, items };
  });
  return { ...demo, packages, uncertainty: { draws, seed: 20270301 } };
}

function scheduledDraws(): void {
  const count = 10_000;
  const input = eightPackages(count);
  const draws = new Draws(input.uncertainty);
  const parametersAt = outbreakReader(input, draws);
  const plans = input.packages.map((each) => makePlan(each, input.measures, draws));
  const runs = plans.map((plan) => newRun(plan.pieces.length));
  const factors = plans.map((plan) => new Float64Array(plan.pieces.length));
  for (const peak of [false, true]) {
    let sum = 0;
    const ms = best(3, () => {
      for (let draw = 0; draw < count; draw++) {
        const p = parametersAt(draw);
        for (const [k, plan] of plans.entries()) sum += followSchedule(p, plan.starts, pieceFactors(plan, draw, factors[k]!), { peak, belowOne: false }, runs[k]!).removals;
      }
    });
    if (!(sum > 0)) throw new Error("nobody was removed");
    say(`10,000 draws × 8 scheduled packages, ${peak ? "settled value and peak" : "settled value"}`, ms, `${((1e3 * ms) / (8 * count)).toFixed(1)} µs each`);
  }
}

settledValues();
say("Latin hypercube, 10,000 × 6", best(10, () => {
  for (let k = 0; k < 6; k++) latinHypercubeScores(10_000, 1, `input ${k}`);
}));
scheduledDraws();
say("assessment: the demonstration's 3 packages, 2,000 draws", best(3, () => void assess(demo)));
const eight = eightPackages(2_000);
say("assessment: 8 packages, 2,000 draws", best(3, () => void assess(eight)));
const many = eightPackages(10_000);
say("assessment: 8 packages, 10,000 draws", best(2, () => void assess(many)));
