import { describe, expect, test } from "vitest";
import { assess, chanceChainsEnd, chanceOneChainEnds, doublingTimeOfGrowth, growthRateAt, growthRateOfDoubling, reproductionNumberAtGrowth, settledState } from "@/lib/engine";
import { expectAccounted, expectRelative, named, type Row, readCases } from "./cases";
import { anInput, withCuts } from "./input";

const rows = readCases("04-growth-threshold");
const by = (test: (row: Row) => boolean) => rows.filter(test);

const wallinga = by(({ id }) => id === "wl-sir" || id === "wl-seir");
const latent = by(({ id }) => id.startsWith("seir-"));
const doubling = by(({ group }) => group === "doubling time");
const herd = by(({ group, expected }) => group === "herd immunity threshold" && (expected.fraction !== undefined || expected.computedPercent !== undefined));
const subcritical = by(({ id }) => id.startsWith("minor-"));
const extinction = by(({ group }) => group === "extinction");
const presets = by(({ group }) => group === "plausible presets");

describe("growth rate to reproduction number (Wallinga & Lipsitch 2007)", () => {
  test("wl-sir and wl-seir: published 1.57 and 1.65", () => {
    const sir = wallinga.find(({ id }) => id === "wl-sir")!;
    const seir = wallinga.find(({ id }) => id === "wl-seir")!;
    const { meanGenerationIntervalDays: days, growthRatePerDay: r } = sir.inputs;
    const plain = reproductionNumberAtGrowth(r, { removalRate: 1 / days, onsetRate: null });
    const split = reproductionNumberAtGrowth(r, { removalRate: 2 / days, onsetRate: 2 / days });
    expectRelative(plain, sir.expected.R, 1e-12);
    expectRelative(split, seir.expected.R, 1e-12);
    expect(Math.abs(plain - sir.expected.R_published)).toBeLessThanOrEqual(0.005);
    expect(Math.abs(split - seir.expected.R_published)).toBeLessThanOrEqual(0.005);
  });

  test.each(named(latent))("%s, there and back, and through an assessment", (_, { inputs, expected }) => {
    const r = Number(inputs.growthRatePerDay);
    const rates = { removalRate: 1 / Number(inputs.infectiousDays), onsetRate: 1 / Number(inputs.latentDays) };
    expectRelative(reproductionNumberAtGrowth(r, rates), expected.R_SEIR, 1e-12, "R with a latent stage");
    expectRelative(reproductionNumberAtGrowth(r, { ...rates, onsetRate: null }), expected.R_SIR, 1e-12, "R without");
    expectRelative(growthRateAt(Number(expected.R_SEIR), rates), r, 1e-12, "back to r");
    const result = assess(
      anInput({
        transmission: { given: "growthRate", value: r },
        infectiousPeriod: Number(inputs.infectiousDays),
        latentPeriod: Number(inputs.latentDays),
      }),
    );
    expectRelative(result.withoutMeasures.thresholdRatio, expected.b, 1e-12, "b");
  });
});

describe("doubling time", () => {
  test.each(named(doubling))("%s", (_, { inputs, expected }) => {
    const r = inputs.growthRatePerDay === undefined ? Math.log1p(Number(inputs.percentGrowthPerDay) / 100) : Number(inputs.growthRatePerDay);
    if (expected.growthRatePerDay) expectRelative(r, expected.growthRatePerDay, 1e-12);
    expectRelative(doublingTimeOfGrowth(r), expected.doublingDays, 1e-12);
    expectRelative(growthRateOfDoubling(Number(expected.doublingDays)), r, 1e-12);
  });
});

describe("threshold of immunity: the share that must be immune is the cut that is needed, 1 − b", () => {
  const share = (r: number) => 1 - assess(anInput({ transmission: { given: "effectiveReproductionNumber", value: r } }, withCuts([]))).withoutMeasures.thresholdRatio;
  test.each(named(herd))("%s", (_, { inputs, expected }) => {
    if (expected.fraction !== undefined) expectRelative(share(Number(inputs.R0)), expected.fraction, 1e-11);
    else for (const [i, r] of [inputs.R0_low, inputs.R0_high].entries()) expectRelative(100 * share(r), expected.computedPercent[i], 1e-12);
  });
});

describe("minor outbreaks: below the threshold the settled value is the mean size of the chains", () => {
  test.each(named(subcritical))("%s", (_, { inputs, expected }) => {
    const r = Number(inputs.R);
    // One introduced case among very many: (a − 1)/(b − 1) in the limit.
    const population = 1e10;
    const { withoutMeasures } = assess(anInput({ population, infectious: 1, transmission: { given: "effectiveReproductionNumber", value: r } }));
    expectRelative(withoutMeasures.finalRemoved, expected.meanTotalCases, 1e-5);
    expect(chanceChainsEnd(1 / r, 1)).toBe(1);
  });
});

describe("chance that chains end by themselves", () => {
  test.each(named(extinction))("%s", (_, { id, inputs, expected }) => {
    const r = Number(inputs.R);
    if (inputs.dispersion_k !== undefined) {
      // The row's value carries a stray imaginary part; its real part is the root.
      const wanted = id === "extinct-nb-2-0.1" ? 0.890439706315257 : Number(expected.pExtinct_1case);
      expectRelative(chanceOneChainEnds(r, Number(inputs.dispersion_k)), wanted, 1e-10);
      return;
    }
    expectRelative(chanceChainsEnd(1 / r, 1), expected.pExtinct_exponentialInfectiousPeriod_1case, 1e-12);
    expectRelative(chanceChainsEnd(1 / r, 5), expected.pExtinct_exp_5cases, 1e-12);
    expectRelative(chanceOneChainEnds(r, 1), expected.pExtinct_exponentialInfectiousPeriod_1case, 1e-12);
    expectRelative(chanceOneChainEnds(r, Number.POSITIVE_INFINITY), expected.pExtinct_PoissonOffspring, 1e-12);
  });
});

describe("plausible reproduction numbers", () => {
  test.each(named(presets))("%s", (_, { expected }) => {
    const b = 1 / expected.medianR;
    expectRelative(b * settledState({ excess: 0, thresholdRatio: b }).value, expected.finalSizeAtMedian, 1e-12, "final size");
    expectRelative(100 * (1 - b), expected.reductionToR1Percent, 1e-12, "cut needed");
  });
});

test("every row of the file is tested, or left out for a reason", () => {
  const other = "a generation interval of another shape than the model's own stages";
  const sizes = "the distribution of chain sizes, of which the engine reports the mean and the chance to end";
  expectAccounted(rows, [...wallinga, ...latent, ...doubling, ...herd, ...subcritical, ...extinction, ...presets], {
    "wl-normal": other,
    "wl-delta": other,
    "wl-gamma": other,
    "gamma-3-2-r0.053": other,
    "borel-0.8-1": sizes,
    "borel-0.5-3": sizes,
  });
});
