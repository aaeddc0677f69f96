/** The draws: every package on the same ones, so that differences are differences of packages. */
import { EngineError, outsideDomain } from "./errors";
import type { Plan } from "./measure-effects";
import type { Parameters } from "./model";
import { drawOutbreak, drawPackage, newOutbreakSample, newPackageSample, usableFactors } from "./one-draw";
import type { ParametersAt } from "./outbreak";
import type { Difference, Tariff } from "./prices";
import { shareError, shareOf, summarise } from "./statistics";
import { outbreakSummary, packageSummary } from "./summaries";
import type { Comparison, PackageUncertainty, WithoutMeasuresResult } from "./types";

const ASK_TO_STOP_EVERY = 64;

export type DrawsOutcome = {
  without: NonNullable<WithoutMeasuresResult["uncertainty"]>;
  packages: PackageUncertainty[];
  pairs: Comparison["pairs"];
  /** Medians of paired differences, `to` less `from`; "none" is no further measures. */
  difference: (from: string, to: string) => Difference;
  refusedDraws: number;
};

export type Progress = {
  /** Share of the draws done, 0..1. */
  onProgress?: ((share: number) => void) | undefined;
  /** True ends the calculation. */
  shouldStop?: (() => boolean) | undefined;
};

/**
 * @param draws how many, ≥ 100
 * @throws EngineError "cancelled" where asked to stop; "outsideDomain" where more than half of the draws are unusable
 */
export function runDraws(parametersAt: ParametersAt, plans: readonly Plan[], tariffs: readonly Tariff[], draws: number, progress: Progress): DrawsOutcome {
  const usable = usableDraws(parametersAt, plans, draws);
  const rounds = plans.length + 1;
  const each = (round: number, run: (draw: Drawn, row: number) => void) => {
    for (const [row, draw] of usable.entries()) {
      if (row % ASK_TO_STOP_EVERY === 0) {
        if (progress.shouldStop?.()) throw new EngineError("cancelled");
        progress.onProgress?.((round + row / usable.length) / rounds);
      }
      run(draw, row);
    }
  };

  const outbreak = newOutbreakSample(usable.length);
  each(0, ({ p }, row) => drawOutbreak(p, outbreak, row));
  // One package after the other: only one's sample is held at a time, but for what it costs and averts.
  const kept: Kept[] = [];
  const packages = plans.map((plan, index) => {
    const sample = newPackageSample(plan, usable.length);
    each(index + 1, ({ p, draw }, row) => drawPackage(p, plan, tariffs[index]!, draw, sample, outbreak, row));
    kept.push({ id: plan.id, cost: sample.figures.total, averted: sample.figures.avertedAsScheduled });
    return packageSummary(sample, plan);
  });
  progress.onProgress?.(1);
  return { without: outbreakSummary(outbreak), packages, pairs: pairsOf(kept), difference: differencesOf(kept, usable.length), refusedDraws: draws - usable.length };
}

type Drawn = { draw: number; p: Parameters };

/** A draw is used for all packages or for none: they stay comparable. */
function usableDraws(parametersAt: ParametersAt, plans: readonly Plan[], draws: number): Drawn[] {
  const usable: Drawn[] = [];
  for (let draw = 0; draw < draws; draw++) {
    const p = parametersOrNull(parametersAt, draw);
    if (p !== null && plans.every((plan) => usableFactors(plan, draw))) usable.push({ draw, p });
  }
  if (usable.length < draws / 2) {
    throw outsideDomain("outbreak", `must be usable in most draws; ${draws - usable.length} of ${draws} draws lie outside the domain. Narrow the ranges of transmission, periods and cuts`);
  }
  return usable;
}

function parametersOrNull(parametersAt: ParametersAt, draw: number): Parameters | null {
  try {
    return parametersAt(draw);
  } catch (error) {
    if (error instanceof EngineError && error.code === "outsideDomain") return null;
    throw error;
  }
}

type Kept = { id: string; cost: Float64Array; averted: Float64Array };

function pairsOf(kept: readonly Kept[]): Comparison["pairs"] {
  return kept.flatMap((a) =>
    kept.flatMap((b) => {
      if (a === b) return [];
      const chanceAvertsMore = shareOf(a.averted, (value, row) => value > b.averted[row]!);
      return [{ a: a.id, b: b.id, chanceAvertsMore, monteCarloError: shareError(chanceAvertsMore, a.averted.length) }];
    }),
  );
}

function differencesOf(kept: readonly Kept[], rows: number): DrawsOutcome["difference"] {
  const nothing: Kept = { id: "none", cost: new Float64Array(rows), averted: new Float64Array(rows) };
  const of = (id: string) => kept.find((each) => each.id === id) ?? nothing;
  const median = (from: Float64Array, to: Float64Array) => summarise(to.map((value, row) => value - from[row]!)).interval.median;
  return (from, to) => ({ cost: median(of(from).cost, of(to).cost), deathsAverted: median(of(from).averted, of(to).averted) });
}
