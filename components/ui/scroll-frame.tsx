import type { ReactNode } from "react";

/** A frame of its own for what is wider than the page; reachable by keyboard, named for those who don't see it. */
export function ScrollFrame({ label, labelledBy, className = "", children }: { label?: string; labelledBy?: string; className?: string; children: ReactNode }) {
  return (
    // biome-ignore lint/a11y/useSemanticElements: no element is a plain group; a fieldset would be one of fields
    // biome-ignore lint/a11y/noNoninteractiveTabindex: what scrolls must be reachable by keyboard
    <div role="group" aria-label={label} aria-labelledby={labelledBy} tabIndex={0} className={`overflow-x-auto ${className}`}>
      {children}
    </div>
  );
}
