import type { RenderedBriefing } from "../briefings/rendered";

/** Figures that both versions show and show differently, in the order of the newer one. */
export function changedFigures(before: RenderedBriefing, now: RenderedBriefing): { label: string; before: string; now: string }[] {
  const key = (figure: RenderedBriefing["figures"][number]) => `${figure.figure} ${figure.package} ${figure.form}`;
  const earlier = new Map(before.figures.map((figure) => [key(figure), figure.text]));
  const seen = new Set<string>();
  return now.figures.flatMap((figure) => {
    const old = earlier.get(key(figure));
    if (old === undefined || old === figure.text || seen.has(key(figure))) return [];
    seen.add(key(figure));
    return [{ label: figure.label, before: old, now: figure.text }];
  });
}
