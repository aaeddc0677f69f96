import { LOCALE_CODES, LOCALES } from "@/lib/i18n/locales";

/** Every language under its own name. */
export function LanguageChoice({ legend, chosen, error }: { legend: string; chosen: string; error?: string | undefined }) {
  return (
    <fieldset className="langpick" aria-describedby={error ? "locale-error" : undefined}>
      <legend>{legend}</legend>
      <div>
        {LOCALE_CODES.map((code) => (
          <label key={code} lang={code} className="names">
            <input type="radio" id={`locale-${code}`} name="locale" value={code} defaultChecked={code === chosen} />
            <bdi>{LOCALES[code].name}</bdi>
          </label>
        ))}
      </div>
      {error ? (
        <p id="locale-error" className="ferr">
          {error}
        </p>
      ) : null}
    </fieldset>
  );
}
