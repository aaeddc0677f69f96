import type { Diagnostics } from "@/lib/engine/types";

export type ReasonAgainstFreezing = "notConverged" | "integratorsDiffer" | "noPackages" | "emptyPackage" | "packageGone";

/** Everything that stands against freezing a result; the command refuses with it and the page shows it. */
export function reasonsAgainstFreezing(diagnostics: Diagnostics, packages: readonly { items: readonly unknown[] }[]): ReasonAgainstFreezing[] {
  const reasons: ReasonAgainstFreezing[] = [];
  const { converged, integratorDifferencePersons: difference, integratorAllowedPersons: allowed } = diagnostics;
  // Written so that a difference that is no number refuses too.
  if (!(difference <= allowed)) reasons.push("integratorsDiffer");
  else if (!converged) reasons.push("notConverged");
  if (packages.length === 0) reasons.push("noPackages");
  if (packages.some(({ items }) => items.length === 0)) reasons.push("emptyPackage");
  return reasons;
}
