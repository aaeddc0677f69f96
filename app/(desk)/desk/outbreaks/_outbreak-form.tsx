"use client";
import { type FieldMetadata, getFormProps, useForm } from "@conform-to/react";
import { useTranslations } from "next-intl";
import { useActionState } from "react";
import { ErrorSummary } from "@/components/forms/error-summary";
import { FieldError, SelectField, TextField } from "@/components/forms/field";
import { SubmitButton } from "@/components/forms/submit-button";
import { LOCALE_CODES, LOCALES, type Locale } from "@/lib/i18n/locales";
import { CURRENCIES } from "@/lib/outbreaks/constants";
import { createOutbreakAction, updateOutbreakAction } from "./_actions";

export type OutbreakFacts = {
  id?: string;
  version?: number;
  name: string;
  place: string;
  populationPersons: string;
  currency: string;
  priceYear: string;
  dayZero: string;
  languages: Locale[];
  publicNames: Partial<Record<Locale, { name: string; place: string }>>;
};

/** Facts of an outbreak: one form to create and to change it. */
export function OutbreakForm({ facts, readOnly = false }: { facts: OutbreakFacts; readOnly?: boolean }) {
  const t = useTranslations("Outbreaks.facts");
  const forms = useTranslations("Forms");
  const [lastResult, action] = useActionState(facts.id ? updateOutbreakAction : createOutbreakAction, undefined);
  const [form, fields] = useForm<OutbreakFacts, string[]>({ id: "outbreak", lastResult: lastResult ?? null, defaultValue: facts });
  const names = Object.fromEntries((["name", "place", "populationPersons", "currency", "priceYear", "dayZero", "languages"] as const).map((key) => [key, t(key)]));
  const publicNames = fields.publicNames.getFieldset() as unknown as Record<Locale, FieldMetadata<{ name: string; place: string }>>;
  return (
    <form {...getFormProps(form)} action={action}>
      <fieldset disabled={readOnly} className="grid gap-5">
        <ErrorSummary form={form} title={forms("summary")} names={names} />
        {facts.id ? <input type="hidden" name="id" value={facts.id} /> : null}
        {facts.version ? <input type="hidden" name="version" value={facts.version} /> : null}
        <div className="grid max-w-[720px] gap-5 md:grid-cols-2">
          <TextField meta={fields.name} label={t("name")} />
          <TextField meta={fields.place} label={t("place")} />
          <TextField meta={fields.populationPersons} label={t("populationPersons")} hint={t("populationHint")} inputMode="numeric" />
          <TextField meta={fields.dayZero} label={t("dayZero")} hint={t("dayZeroHint")} type="date" />
          <SelectField meta={fields.currency} label={t("currency")} options={CURRENCIES.map((code) => ({ value: code, label: code }))} />
          <TextField meta={fields.priceYear} label={t("priceYear")} inputMode="numeric" />
        </div>
        <fieldset>
          <legend className="text-13 font-semibold">{t("languages")}</legend>
          <p className="hint">{t("languagesHint")}</p>
          <div className="mt-2 flex flex-wrap gap-x-6 gap-y-1">
            {LOCALE_CODES.map((code) => (
              <label key={code} className="flex min-h-11 items-center gap-2 font-normal">
                <input type="checkbox" name="languages" value={code} defaultChecked={facts.languages.includes(code)} />
                <span lang={code}>{LOCALES[code].name}</span>
              </label>
            ))}
          </div>
          <FieldError meta={fields.languages} />
        </fieldset>
        <details open={!facts.id}>
          <summary className="cursor-pointer text-13 font-semibold">{t("publicNames")}</summary>
          <p className="hint">{t("publicNamesHint")}</p>
          <div className="mt-2 grid max-w-[720px] gap-x-5 gap-y-3 md:grid-cols-2">
            {LOCALE_CODES.flatMap((code) => {
              const set = publicNames[code].getFieldset();
              const { dir, name: language } = LOCALES[code];
              return [
                <TextField key={`${code}n`} meta={set.name} label={t("publicName", { language })} lang={code} dir={dir} />,
                <TextField key={`${code}p`} meta={set.place} label={t("publicPlace", { language })} lang={code} dir={dir} />,
              ];
            })}
          </div>
        </details>
        {readOnly ? null : (
          <div>
            <SubmitButton look={facts.id ? "secondary" : "primary"} busy={facts.id ? t("saving") : t("creating")}>
              {facts.id ? t("save") : t("create")}
            </SubmitButton>
          </div>
        )}
      </fieldset>
    </form>
  );
}
