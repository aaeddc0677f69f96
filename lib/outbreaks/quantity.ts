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

const BLANK: readonly unknown[] = [undefined, null, ""];
type Typed = { low?: unknown; central?: unknown; high?: unknown };

/** Central alone, taken as certain (a number), or all three figures; one end without the other is refused. */
export function plainOrQuantityIn(range: Range) {
  const [plain, three] = [numberIn(range, "central"), quantityIn(range)];
  return z.unknown().transform((raw, context): number | { low: number; central: number; high: number } => {
    const typed = (typeof raw === "object" && raw !== null ? raw : {}) as Typed;
    const alone = BLANK.includes(typed.low) && BLANK.includes(typed.high);
    const parsed = alone ? plain.safeParse(typed.central) : three.safeParse(typed);
    if (!parsed.success) {
      for (const issue of parsed.error.issues) context.addIssue({ code: "custom", path: alone ? ["central"] : issue.path, message: issue.message });
      return z.NEVER;
    }
    if (typeof parsed.data === "number") return parsed.data;
    const { low, central, high } = parsed.data;
    return low === central && central === high ? central : { low, central, high };
  });
}

/** Like `plainOrQuantityIn`, for what may be left out altogether. */
export function optionalQuantityIn(range: Range) {
  const filled = (raw: unknown) => typeof raw === "object" && raw !== null && [(raw as Typed).low, (raw as Typed).central, (raw as Typed).high].some((part) => !BLANK.includes(part));
  const figures = plainOrQuantityIn(range);
  return z.preprocess((raw) => (filled(raw) ? raw : undefined), figures.optional());
}
