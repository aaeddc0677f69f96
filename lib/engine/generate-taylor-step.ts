/**
 * Writes taylor-step.generated.ts: one step of the Taylor-series method with every coefficient in a local variable.
 * Loops over typed arrays cost three to five times as much, so the source is written out and kept; a test compares it
 * with what this program writes, and `npx vitest run --project unit tests/unit/engine/taylor-step -u` writes it anew.
 */
export const ORDER = 14;

const range = (from: number, to: number) => Array.from({ length: Math.max(0, to - from + 1) }, (_, i) => from + i);

/** Value at h of the series with coefficients `${name}0` to `${name}${ORDER}`. */
const horner = (name: string): string => range(0, ORDER - 1).reduceRight((inner, k) => `${name}${k} + h * (${inner})`, `${name}${ORDER}`);

function stepSource(latent: boolean): string {
  const lines: string[] = [];
  const infected = latent ? ["e", "i"] : ["i"];
  lines.push(
    "/**",
    ` * One step of order ${ORDER}, ${latent ? "with" : "without"} a latent stage; advances y in place. Shares of the population, days.`,
    ` * @param y [susceptible${latent ? ", latent" : ", 0"}, infectious, removed since day 0]`,
    " * @param c receives the Taylor coefficients of the infectious share about the step's start",
    " * @returns days stepped, at most hMax",
    " */",
    `export function ${latent ? "stepWithLatent" : "stepWithoutLatent"}(y: Float64Array, c: Float64Array, beta: number, sigma: number, gamma: number, hMax: number, tolerance: number): number {`,
    `  const s0 = y[0]!, ${latent ? "e0 = y[1]!, " : ""}i0 = y[2]!, z0 = y[3]!;`,
  );
  for (const k of range(0, ORDER - 1)) {
    const convolution = range(0, k).map((j) => `s${j} * i${k - j}`).join(" + ");
    const over = k === 0 ? "" : ` * ${1 / (k + 1)}`;
    lines.push(`  const n${k} = beta * (${convolution})${over};`, `  const s${k + 1} = -n${k};`, `  const z${k + 1} = gamma * i${k}${over};`);
    if (latent) lines.push(`  const o${k} = sigma * e${k}${over};`, `  const e${k + 1} = n${k} - o${k};`, `  const i${k + 1} = o${k} - z${k + 1};`);
    else lines.push(`  const i${k + 1} = n${k} - z${k + 1};`);
  }
  const size = (k: number) => `Math.max(s0 > 0 ? Math.abs(s${k}) / s0 : 0, (${infected.map((v) => `Math.abs(${v}${k})`).join(" + ")}) / (${infected.map((v) => `${v}0`).join(" + ")}))`;
  lines.push(
    `  const last = ${size(ORDER)};`,
    `  const before = ${size(ORDER - 1)};`,
    // Two logarithms and one exponential cost half of two powers.
    `  let h = Math.exp(Math.min(Math.log(tolerance / last) / ${ORDER}, Math.log(tolerance / before) / ${ORDER - 1}));`,
    "  if (!(h < hMax)) h = hMax;",
    `  y[0] = ${horner("s")};`,
    ...(latent ? [`  y[1] = ${horner("e")};`] : []),
    `  y[2] = ${horner("i")};`,
    // Removals have a series of their own: as the rest to 1 they would lose their digits while they are few.
    `  y[3] = ${horner("z")};`,
    ...range(0, ORDER).map((k) => `  c[${k}] = i${k};`),
    "  return h;",
    "}",
  );
  return lines.join("\n");
}

/** The whole generated file. */
export function taylorStepSource(): string {
  return [
    "// Written by generate-taylor-step.ts; don't edit.",
    `export const TAYLOR_ORDER = ${ORDER};`,
    "",
    stepSource(true),
    "",
    stepSource(false),
    "",
  ].join("\n");
}
