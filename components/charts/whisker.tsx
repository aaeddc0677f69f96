import { packageHue } from "@/components/ui/marks";
import type { WhiskerCell } from "@/lib/charts/whisker";
import { hueStroke } from "./mark-parts";

/** The interval of a table's cell on its row's scale. Decoration: the numbers stand above it. */
export function Whisker({ cell, line, letter }: { cell: WhiskerCell | null; line: number | null; letter: string }) {
  if (!cell) return null;
  const at = (percent: number) => `${percent}%`;
  return (
    <svg width="100%" height="11" aria-hidden="true" className="mt-1">
      {line === null ? null : <line x1={at(line)} x2={at(line)} y1="0" y2="11" className="stroke-ink" />}
      <g className={hueStroke[packageHue(letter)]}>
        <line x1={at(cell.low)} x2={at(cell.high)} y1="5.5" y2="5.5" />
        <line x1={at(cell.low)} x2={at(cell.low)} y1="3" y2="8" />
        <line x1={at(cell.high)} x2={at(cell.high)} y1="3" y2="8" />
        <line x1={at(cell.mid)} x2={at(cell.mid)} y1="2" y2="9" strokeWidth="3" />
      </g>
    </svg>
  );
}
