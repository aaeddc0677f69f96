import type { SubmissionResult } from "@conform-to/react";

type State = SubmissionResult<string[]> | undefined;
type Sentences = Record<string, string>;

/** The sentence for the first error of a field. `errors` says each key in the reader's language. */
export function firstError(state: State, field: string, errors: Sentences): string | undefined {
  const key = state?.error?.[field]?.[0];
  return key === undefined ? undefined : (errors[key] ?? key);
}

/** What stands in the way, at the top of the form: errors of the whole form, and one link to each field. */
export function ErrorList({ state, title, errors, targets }: { state: State; title: string; errors: Sentences; targets: Record<string, string> }) {
  const entries = Object.entries(state?.error ?? {}).filter(([, keys]) => keys && keys.length > 0);
  if (state?.status !== "error" || entries.length === 0) return null;
  return (
    // biome-ignore lint/a11y/noAutofocus: the reader has just sent the form; without scripts nothing else leads them here
    <div className="note bad" role="alert" tabIndex={-1} autoFocus>
      <b>{title}</b>
      <ul>
        {entries.map(([field, keys]) => {
          const sentence = errors[keys?.[0] ?? ""] ?? keys?.[0];
          const target = targets[field];
          return <li key={field}>{target ? <a href={`#${target}`}>{sentence}</a> : sentence}</li>;
        })}
      </ul>
    </div>
  );
}
