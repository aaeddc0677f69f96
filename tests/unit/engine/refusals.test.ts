import { spawnSync } from "node:child_process";
import { readFileSync } from "node:fs";
import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { assess, EngineError, parseAssessmentInput } from "@/lib/engine";

const demo = JSON.parse(readFileSync(new URL("../../../db/demo/kelmaren.json", import.meta.url), "utf8"));
const changed = (path: string, value: unknown) => {
  const copy = structuredClone(demo);
  const keys = path.split(/[.[\]]+/).filter(Boolean);
  const last = keys.pop()!;
  const at = keys.reduce((o, key) => o[key], copy);
  if (value === undefined) delete at[last];
  else at[last] = value;
  return copy;
};
const faultsOf = (input: unknown): string[] => {
  try {
    parseAssessmentInput(input);
    return [];
  } catch (error) {
    if (!(error instanceof EngineError)) throw error;
    return error.faults.map(({ path, message }) => `${path}: ${message}`);
  }
};

describe("outside the domain the engine names the field and what is allowed", () => {
  test.each([
    ["format", "x", 'format: must be "ebbmark.assessment-input/1"'],
    ["outbreak.population", 0, "outbreak.population: must be above 0 and at most 10,000,000,000"],
    ["outbreak.population", Number.NaN, "outbreak.population: must be a number; must be above 0 and at most 10,000,000,000"],
    ["outbreak.population", 50, "outbreak.population: must be above infectious + exposed + removed, so that somebody is susceptible"],
    ["outbreak.infectious", 0, "outbreak.infectious: must be above 0 where nobody is latent: without anybody infected there is no outbreak"],
    ["outbreak.infectious", undefined, "outbreak.infectious: must be a number or"],
    ["outbreak.infectious.low", 70, "outbreak.infectious: must be in order: low at most central, central at most high"],
    ["outbreak.infectiousPeriod", 0.001, "outbreak.infectiousPeriod: must be at least 0.01 and at most 3,650"],
    ["outbreak.infectionFatality.high", 1.2, "outbreak.infectionFatality.high: must be at least 0 and at most 1"],
    ["outbreak.transmission.value", 101, "outbreak.transmission.value: must be at least 0.000001 and at most 100"],
    ["outbreak.transmission.given", "guess", "outbreak.transmission.given: must be one of rate, reproductionNumber"],
    ["outbreak.dayZero", "2027-02-30", "outbreak.dayZero: must be a calendar date, yyyy-mm-dd"],
    ["outbreak.susceptible", 400_000, "outbreak.exposed: must be given where susceptible is given: the four must add up to the population"],
    ["measures[0].cut", 1, "measures[0].cut: must be at least -1 and below 1"],
    ["measures[1].id", "sick", 'measures[1].id: must be unique; "sick" is used before'],
    ["measures[0].costs[0].perDay", -1, "measures[0].costs[0].perDay: must be at least 0 and at most 1,000,000,000,000,000"],
    ["packages[0].items[0].uptake", 1.1, "packages[0].items[0].uptake: must be at least 0 and at most 1"],
    ["packages[0].items[0].endDay", 3, "packages[0].items[0].endDay: must be after startDay, or null where the measure is never lifted"],
    ["packages[0].items[0].startDay", -1, "packages[0].items[0].startDay: must be at least 0 and at most 36,500"],
    ["packages[0].items[0].measure", "nothing", 'packages[0].items[0].measure: must be the id of a measure in measures; "nothing" is not'],
    ["packages[0].items[0].measure", "mask", "packages[0].items[1]: must not overlap items[0] of the same measure"],
    ["packages[0].items[0].measure", "g30", 'packages[0].items[3]: must not be in force together with items[0]: both are rungs of the ladder "gatherings"'],
    ["packages[0].id", "none", "packages[0].id: must not be none, which is reserved for no further measures"],
    ["uncertainty.draws", 99, "uncertainty.draws: must be at least 100 and at most 1,000,000"],
    ["outbreak.colour", "red", "outbreak.colour: is unknown; remove it or check its spelling"],
  ])("%s = %s", (path, value, sentence) => {
    const faults = faultsOf(changed(path, value));
    expect(faults.some((fault) => fault.startsWith(sentence)), faults.join("\n") || "accepted").toBe(true);
  });

  test("the four must add up", () => {
    const copy = structuredClone(demo);
    Object.assign(copy.outbreak, { susceptible: 400_000, exposed: 10, infectious: 60, removed: 0 });
    expect(faultsOf(copy)[0]).toMatch(/^outbreak\.susceptible: must make susceptible \+ exposed \+ infectious \+ removed equal the population/);
    copy.outbreak.susceptible = 412_000 - 70;
    expect(faultsOf(copy)).toEqual([]);
  });

  test("a growth rate that would end faster than people recover", () => {
    const copy = changed("outbreak.transmission", { given: "growthRate", value: -0.5 });
    expect(() => assess({ ...copy, uncertainty: null })).toThrow(/outbreak\.transmission\.value: must be above -0\.1666666667 per day/);
  });
});

test("fuzzed files: refused with a path, or a result without a non-finite number; never anything else", () => {
  const paths = ["outbreak.population", "outbreak.infectious", "outbreak.infectiousPeriod", "outbreak.latentPeriod", "outbreak.transmission.value", "outbreak.infectionFatality", "outbreak.removed", "measures[0].cut", "measures[1].costs[0].perDay", "packages[0].items[0].startDay", "packages[0].items[0].endDay", "packages[1].items[0].uptake", "horizonDays", "outbreak.exposed"];
  const value = fc.oneof(
    fc.double({ noNaN: true }),
    fc.double({ min: 0, max: 1, noNaN: true }),
    fc.integer({ min: 1, max: 1000 }),
    fc.constantFrom(0, -1, 1, 1e10, 1e-9, null, "x", [], {}, true),
    fc.double({ min: 0, max: 50, noNaN: true }).map((x) => ({ low: x / 2, central: x, high: x * 2 })),
  );
  let refused = 0;
  let computed = 0;
  fc.assert(
    fc.property(fc.array(fc.tuple(fc.constantFrom(...paths), value), { minLength: 1, maxLength: 3 }), (changes) => {
      let input = { ...demo, uncertainty: null, horizonDays: 30 };
      for (const [path, v] of changes) {
        try {
          const keys = path.split(/[.[\]]+/).filter(Boolean);
          const last = keys.pop()!;
          input = structuredClone(input);
          keys.reduce((o, key) => o[key], input)[last] = v;
        } catch {
          // The place is gone already: an earlier change replaced it.
        }
      }
      const began = performance.now();
      try {
        const text = JSON.stringify(assess(input), (_, x) => (typeof x === "number" && !Number.isFinite(x) ? "NOT FINITE" : x));
        expect(/.{0,80}NOT FINITE/.exec(text)?.[0] ?? "finite").toBe("finite");
        computed++;
      } catch (error) {
        if (!(error instanceof EngineError)) throw error;
        expect(error.faults.length + (error.code === "outsideDomain" ? 0 : 1)).toBeGreaterThan(0);
        for (const fault of error.faults) expect(fault.path).not.toBe("");
        refused++;
      }
      expect(performance.now() - began, "no hang").toBeLessThan(5_000);
    }),
    { numRuns: 400 },
  );
  expect(Math.min(refused, computed)).toBeGreaterThan(20);
});

describe("the command line", () => {
  const run = (input: string) => spawnSync("npm", ["run", "--silent", "assess"], { input, encoding: "utf8" });
  test("exit 0, the result on standard output, nothing else", () => {
    const { status, stdout, stderr } = run(JSON.stringify(demo));
    expect([status, stderr]).toEqual([0, ""]);
    expect(JSON.parse(stdout)).toEqual(JSON.parse(JSON.stringify(assess(demo))));
  });
  test("exit 2 and one line per fault where the input is unusable", () => {
    const { status, stdout, stderr } = run(JSON.stringify({ ...demo, horizonDays: 0, colour: 1 }));
    expect([status, stdout]).toEqual([2, ""]);
    expect(stderr.trim().split("\n").toSorted()).toEqual(["colour: is unknown; remove it or check its spelling", "horizonDays: must be at least 1 and at most 36,500"]);
  });
  test("exit 1 where the program fails: here, its output is taken away", () => {
    const script = "set -o pipefail; npm run --silent assess | head -c 1 > /dev/null";
    expect(spawnSync("bash", ["-c", script], { input: JSON.stringify(demo), encoding: "utf8" }).status).toBe(1);
  });
  test("exit 2 where it is no JSON", () => {
    const { status, stderr } = run("{");
    expect(status).toBe(2);
    expect(stderr).toMatch(/^\(file\): must be one JSON document/);
  });
});
