import { z } from "zod";

/** What may be typed for one figure, and how a person knows it. */
export type Range = { label: string; unit?: string; min?: number; max: number; above?: number; below?: number; whole?: boolean };

const format = (value: number) => value.toLocaleString("en-GB", { maximumFractionDigits: 8 });

/** "from 0.01 to 3,650 days", "above 0, at most 10,000,000,000 persons". */
export function rangeWords({ min, max, above, below, unit }: Range): string {
  const high = below === undefined ? (above === undefined ? `to ${format(max)}` : `at most ${format(max)}`) : `below ${format(below)}`;
  const words = above === undefined ? `from ${format(min ?? 0)} ${high}` : `above ${format(above)}, ${high}`;
  return unit ? `${words} ${unit}` : words;
}

/** One number in a field. Its message names the field and what is allowed. */
export function numberIn(range: Range, part = "") {
  const message = `${range.label}${part ? `, ${part}` : ""}: give ${range.whole ? "a whole number" : "a number"} ${rangeWords(range)}.`;
  return z.preprocess(
    (raw) => (typeof raw === "string" ? toNumber(raw) : raw),
    z
      .number(message)
      .refine((value) => Number.isFinite(value), message)
      .refine((value) => (range.above === undefined ? value >= (range.min ?? 0) : value > range.above) && (range.below === undefined ? value <= range.max : value < range.below), message)
      .refine((value) => !range.whole || Number.isInteger(value), message),
  );
}

/** Spaces between digits are dropped; a comma is taken as the decimal sign only where it can't be a thousands sign. */
export function toNumber(raw: string): number | string | undefined {
  const text = raw.trim().replace(/[\s\u00a0\u202f]/g, "");
  if (text === "") return undefined;
  if (/^[+-]?\d{1,3}(?:,\d{3})+(?:\.\d+)?$/.test(text)) return Number(text.replaceAll(",", ""));
  if (/^[+-]?\d+,\d{1,2}$/.test(text) || /^[+-]?0,\d+$/.test(text)) return Number(text.replace(",", "."));
  const value = Number(text);
  return Number.isNaN(value) ? raw : value;
}

/** Low, central and high with a source note: the 2.5 %, 50 % and 97.5 % quantiles. */
export function quantityIn(range: Range) {
  return z
    .object({ low: numberIn(range, "low"), central: numberIn(range, "central"), high: numberIn(range, "high"), source: z.string().trim().max(2000, `${range.label}: the source may have at most 2,000 characters.`).optional() })
    .superRefine(({ low, central, high }, context) => {
      const order = `${range.label}: low must be at most central, and central at most high.`;
      if (low > central) context.addIssue({ code: "custom", path: ["low"], message: order });
      else if (central > high) context.addIssue({ code: "custom", path: ["high"], message: order });
    })
    .transform(({ source, ...figures }) => ({ ...figures, ...(source ? { source } : {}) }));
}

/** A quantity that may be left out altogether; half of one is refused. */
export function optionalQuantityIn(range: Range) {
  const filled = (raw: unknown) => typeof raw === "object" && raw !== null && ["low", "central", "high"].some((part) => ![undefined, null, ""].includes((raw as Record<string, never>)[part]));
  return z.preprocess((raw) => (filled(raw) ? raw : undefined), quantityIn(range).optional());
}
