"use client";
import type { FormMetadata } from "@conform-to/react";
import { useEffect, useRef } from "react";

/**
 * What stands in the way, in one list at the top of the form: form errors as sentences, field errors as links to the
 * field. Takes focus when it appears after a submission. Every form has one, and it also keeps what was typed.
 */
export function ErrorSummary<S extends Record<string, unknown>>({
  form,
  title,
  names,
}: {
  form: FormMetadata<S, string[]>;
  title: string;
  /** Field name → how the person knows it. Dotted names for nested fields. */
  names: Record<string, string>;
}) {
  const box = useRef<HTMLDivElement>(null);
  const entries = Object.entries(form.allErrors);
  const shown = form.status === "error" && entries.length > 0;
  useEffect(() => {
    if (shown) box.current?.focus();
  }, [shown]);
  useEffect(() => {
    // React empties a form after its action, before the answer is known: a refused form would lose what was typed.
    const keep = (event: Event) => event.preventDefault();
    const element = document.getElementById(form.id);
    element?.addEventListener("reset", keep);
    return () => element?.removeEventListener("reset", keep);
  }, [form.id]);
  if (!shown) return null;
  return (
    <div ref={box} tabIndex={-1} role="alert" className="note bad my-4">
      <b>{title}</b>
      <ul className="mt-1 grid gap-1">
        {entries.flatMap(([name, errors]) =>
          errors.map((error) => (
            <li key={`${name}${error}`}>
              {name ? <a href={`#${form.id}-${name}`}>{names[name] ? `${names[name]}: ${error}` : error}</a> : error}
            </li>
          )),
        )}
      </ul>
    </div>
  );
}
