import Link from "next/link";
import type { ComponentProps, ReactNode } from "react";

type Look = "primary" | "secondary" | "quiet";
const classOf = (look: Look, small?: boolean) =>
  `btn${look === "primary" ? " pri" : look === "quiet" ? " quiet" : ""}${small ? " sm" : ""}`;

export function Button({ look = "secondary", small = false, ...props }: ComponentProps<"button"> & { look?: Look; small?: boolean }) {
  return <button {...props} className={`${classOf(look, small)} ${props.className ?? ""}`} />;
}

export function ButtonLink({ look = "secondary", small = false, ...props }: ComponentProps<typeof Link> & { look?: Look; small?: boolean }) {
  return <Link {...props} className={`${classOf(look, small)} ${props.className ?? ""}`} />;
}

/** A step that can't be taken yet: dashed edge, and the reasons beside it where a screen reader finds them. */
export function NotYet({ label, reasons, id }: { label: ReactNode; reasons: ReactNode[]; id: string }) {
  return (
    <div className="grid gap-2">
      <div>
        <button type="button" className="btn" disabled aria-describedby={id}>
          {label}
        </button>
      </div>
      <ul id={id} className="hint grid gap-1">
        {reasons.map((reason, index) => (
          <li key={index}>{reason}</li>
        ))}
      </ul>
    </div>
  );
}
