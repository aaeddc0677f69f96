"use client";
import { useActionState } from "react";
import { ErrorList, firstError } from "@/components/public/error-list";
import { LanguageChoice } from "@/components/public/language-choice";
import type { Locale } from "@/lib/i18n/locales";
import { subscribeAction } from "./_actions";

export type SubscribeWords = { email: string; language: string; button: string; summary: string; errors: Record<string, string> };

/** A plain form: residents' pages carry no script, so what stands here is what the server says. */
export function SubscribeForm({ locale, words }: { locale: Locale; words: SubscribeWords }) {
  const [state, action] = useActionState(subscribeAction, undefined);
  const typed = state?.initialValue ?? {};
  const email = firstError(state, "email", words.errors);
  return (
    <form action={action} noValidate className="pform">
      <ErrorList state={state} title={words.summary} errors={words.errors} targets={{ email: "email", locale: `locale-${locale}` }} />
      <input type="hidden" name="page" value={locale} />
      <div>
        <label htmlFor="email">{words.email}</label>
        <input
          id="email"
          name="email"
          type="email"
          inputMode="email"
          autoComplete="email"
          dir="ltr"
          defaultValue={typeof typed["email"] === "string" ? typed["email"] : ""}
          required
          aria-invalid={email ? true : undefined}
          aria-describedby={email ? "email-error" : undefined}
          className={email ? "inp err" : "inp"}
        />
        {email ? (
          <p id="email-error" className="ferr">
            {email}
          </p>
        ) : null}
      </div>
      <LanguageChoice legend={words.language} chosen={typeof typed["locale"] === "string" ? typed["locale"] : locale} error={firstError(state, "locale", words.errors)} />
      <div>
        <button type="submit" className="btn pri big-btn">
          {words.button}
        </button>
      </div>
    </form>
  );
}
