"use client";
import type { SubmissionResult } from "@conform-to/react";
import { type ReactNode, useActionState } from "react";
import type { Locale } from "@/lib/i18n/locales";
import { ErrorList } from "./error-list";

type State = SubmissionResult<string[]> | undefined;

/** One button that acts on the link of an e-mail. */
export function LinkForm({
  action,
  token,
  locale,
  words,
  look,
  children,
}: {
  action: (previous: State, data: FormData) => Promise<State>;
  token: string;
  locale: Locale;
  words: { button: string; summary: string; errors: Record<string, string> };
  look: "primary" | "secondary" | "link";
  /** Further fields of the form. */
  children?: ReactNode;
}) {
  const [state, send] = useActionState(action, undefined);
  return (
    <form action={send} className={look === "link" ? "pinline" : "pform"}>
      <ErrorList state={state} title={words.summary} errors={words.errors} targets={{}} />
      <input type="hidden" name="token" value={token} />
      <input type="hidden" name="page" value={locale} />
      {children}
      <button type="submit" className={look === "link" ? "as-link" : `btn big-btn${look === "primary" ? " pri" : ""}`}>
        {words.button}
      </button>
    </form>
  );
}
