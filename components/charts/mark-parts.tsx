import { packageHue } from "@/components/ui/marks";

/** Stroke colour of a package; classes, since the policy allows no inline style. */
export const hueStroke = { a: "stroke-pkg-a", b: "stroke-pkg-b", c: "stroke-pkg-c", n: "stroke-pkg-n" } as const;
export const hueFill = { a: "fill-pkg-a", b: "fill-pkg-b", c: "fill-pkg-c", n: "fill-pkg-n" } as const;
/** A long dash, B solid, C short dash; D to H repeat with their own letter. */
export const hueDash = { a: "9 4", b: undefined, c: "4 3", n: "2 4" } as const;

/** Package tile inside a drawing: filled is held, open is as scheduled. */
export function Tile({ letter, x, y, open = false, mark }: { letter: string; x: number; y: number; open?: boolean; mark?: string }) {
  const hue = packageHue(letter);
  return (
    <g data-mark={mark} data-letter={letter} data-x={x} data-y={y}>
      <rect x={x - 8} y={y - 8} width={16} height={16} rx={2} strokeWidth={1.75} className={`${hueStroke[hue]} ${open ? "fill-paper" : hueFill[hue]}`} />
      <text x={x} y={y + 4.3} textAnchor="middle" fontSize={12} fontWeight={600} className={open ? hueFill[hue] : "fill-on-pkg"}>
        {letter}
      </text>
    </g>
  );
}

/** A 95 % interval: 1.5 px with 8 px caps, upright or lying. */
export function Interval({ across, low, high, upright, className, width = 1.5, cap = 4, mark }: { across: number; low: number; high: number; upright: boolean; className: string; width?: number; cap?: number; mark?: string }) {
  const line = (a: number, from: number, b: number, to: number) => (upright ? { x1: a, y1: from, x2: b, y2: to } : { x1: from, y1: a, x2: to, y2: b });
  return (
    <g className={className} strokeWidth={width} data-mark={mark} data-low={low} data-high={high}>
      <line {...line(across, low, across, high)} />
      <line {...line(across - cap, low, across + cap, low)} />
      <line {...line(across - cap, high, across + cap, high)} />
    </g>
  );
}
