import type { ReactNode } from "react";

/** Title, what can be done here, and the finding as a sentence. */
export function PageHead({ title, actions, lede }: { title: ReactNode; actions?: ReactNode; lede?: ReactNode }) {
  return (
    <>
      <div className="ph flex-wrap">
        <h1>{title}</h1>
        {actions ? <div className="act flex-wrap">{actions}</div> : null}
      </div>
      {lede ? <p className="lede">{lede}</p> : null}
    </>
  );
}

/** A block that hangs from a line, its head in the margin. */
export function Section({ title, note, children, id }: { title: ReactNode; note?: ReactNode; children: ReactNode; id?: string }) {
  return (
    <section className="sec" id={id}>
      <header>
        <h2>{title}</h2>
        {note ? <p>{note}</p> : null}
      </header>
      <div className="min-w-0">{children}</div>
    </section>
  );
}

export function Note({ tone = "plain", children }: { tone?: "plain" | "look" | "bad" | "ok"; children: ReactNode }) {
  return <div className={`note${tone === "look" ? "" : ` ${tone}`}`}>{children}</div>;
}

/** What to do first where there is nothing yet. */
export function EmptyState({ title, children, action }: { title: ReactNode; children?: ReactNode; action?: ReactNode }) {
  return (
    <div className="grid max-w-measure justify-items-start gap-3 py-4">
      <p className="font-semibold">{title}</p>
      {children ? <p className="mut">{children}</p> : null}
      {action}
    </div>
  );
}
