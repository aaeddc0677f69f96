"use client";
import { type FieldMetadata, getFormProps, useForm } from "@conform-to/react";
import { useTranslations } from "next-intl";
import { useActionState } from "react";
import { Section } from "@/components/desk/page-parts";
import { ErrorSummary } from "@/components/forms/error-summary";
import { TextAreaField, TextField } from "@/components/forms/field";
import { QuantityFields } from "@/components/forms/quantity-fields";
import { SubmitButton } from "@/components/forms/submit-button";
import { LOCALE_CODES, LOCALES, type Locale } from "@/lib/i18n/locales";
import { archiveMeasureAction, createMeasureAction, updateMeasureAction } from "./_actions";

type Quantity = { low: string; central: string; high: string; source?: string };
const PAYERS = ["public", "business", "household"] as const;
const COST_KINDS = ["setUp", "perDay", "perResidentDay"] as const;
const LAW_DAYS = ["maxDays", "maxDaysWithin", "daysUsed", "reviewEveryDays", "leadTimeDays"] as const;

export type MeasureFacts = {
  id?: string;
  version?: number;
  code: string;
  name: string;
  shortName: string;
  instruction: string;
  cutPercent: Quantity;
  evidence: string;
  legalBasis: string;
  legalLink: string;
  ladder: string;
  maxDays: string;
  maxDaysWithin: string;
  daysUsed: string;
  reviewEveryDays: string;
  leadTimeDays: string;
  costs: Record<(typeof PAYERS)[number], Partial<Record<(typeof COST_KINDS)[number], Quantity>>>;
  publicTexts: Partial<Record<Locale, { title: string; detail: string }>>;
};

/** One measure of the catalogue: one form to add and to change it. */
export function MeasureForm({ facts, readOnly = false }: { facts: MeasureFacts; readOnly?: boolean }) {
  const t = useTranslations("Measures");
  const forms = useTranslations("Forms");
  const [lastResult, action] = useActionState(facts.id ? updateMeasureAction : createMeasureAction, undefined);
  const [form, fields] = useForm<MeasureFacts, string[]>({ id: "measure", lastResult: lastResult ?? null, defaultValue: facts });
  const costs = fields.costs.getFieldset();
  const texts = fields.publicTexts.getFieldset() as unknown as Record<Locale, FieldMetadata<{ title: string; detail: string }>>;
  const names = { code: t("code"), name: t("name"), shortName: t("shortName"), instruction: t("instruction"), cutPercent: t("cutPercent") };
  return (
    <form {...getFormProps(form)} action={action}>
      <fieldset disabled={readOnly} className="min-w-0">
        <ErrorSummary form={form} title={forms("summary")} names={names} />
        {facts.id ? <input type="hidden" name="id" value={facts.id} /> : null}
        {facts.version ? <input type="hidden" name="version" value={facts.version} /> : null}
        <Section title={t("what")} note={t("whatNote")}>
          <div className="grid max-w-[720px] gap-5 md:grid-cols-2">
            <TextField meta={fields.name} label={t("name")} />
            <TextField meta={fields.shortName} label={t("shortName")} hint={t("shortNameHint")} />
            <TextField meta={fields.code} label={t("code")} hint={t("codeHint")} />
            <TextField meta={fields.ladder} label={t("ladderName")} hint={t("ladderHint")} />
            <TextAreaField meta={fields.instruction} label={t("instruction")} rows={2} className="md:col-span-2" />
          </div>
        </Section>
        <Section title={t("effect")} note={t("effectNote")}>
          <QuantityFields meta={fields.cutPercent} label={t("cutPercent")} unit={t("percent")} />
          <TextAreaField meta={fields.evidence} label={t("evidence")} rows={3} className="mt-4 max-w-[720px]" />
        </Section>
        <Section title={t("law")} note={t("lawNote")}>
          <div className="grid max-w-[720px] gap-5 md:grid-cols-2">
            <TextField meta={fields.legalBasis} label={t("legalBasis")} />
            <TextField meta={fields.legalLink} label={t("legalLink")} inputMode="url" />
            {LAW_DAYS.map((key) => (
              <TextField key={key} meta={fields[key]} label={t(key)} inputMode="numeric" suffix={t("daysUnit")} className="max-w-[220px]" />
            ))}
          </div>
        </Section>
        <Section title={t("price")} note={t("priceNote")}>
          {PAYERS.map((payer) => {
            const lines = costs[payer].getFieldset();
            return (
              <details key={payer} open={COST_KINDS.some((kind) => facts.costs[payer]?.[kind])} className="border-b border-hair">
                <summary className="flex min-h-11 cursor-pointer items-center font-semibold">{t(`payers.${payer}`)}</summary>
                {COST_KINDS.map((kind) => (
                  <QuantityFields key={kind} meta={lines[kind] as unknown as FieldMetadata<unknown>} label={t(`costs.${kind}`)} unit={t(`costUnit.${kind}`)} source={false} />
                ))}
              </details>
            );
          })}
        </Section>
        <Section title={t("residents")} note={t("residentsNote")}>
          <div className="grid gap-x-6 gap-y-4 md:grid-cols-2">
            {LOCALE_CODES.flatMap((code) => {
              const set = texts[code].getFieldset();
              const { dir, name: language } = LOCALES[code];
              return [
                <TextField key={`${code}t`} meta={set.title} label={t("residentTitle", { language })} lang={code} dir={dir} />,
                <TextField key={`${code}d`} meta={set.detail} label={t("residentDetail", { language })} lang={code} dir={dir} />,
              ];
            })}
          </div>
          {readOnly ? null : (
            <div className="mt-6">
              <SubmitButton busy={facts.id ? t("saving") : t("creating")}>{facts.id ? t("save") : t("create")}</SubmitButton>
            </div>
          )}
        </Section>
      </fieldset>
    </form>
  );
}

export function ArchiveForm({ id }: { id: string }) {
  const t = useTranslations("Measures");
  const [, action] = useActionState(archiveMeasureAction, undefined);
  return (
    <form action={action} className="mt-6 grid justify-items-start gap-1">
      <input type="hidden" name="id" value={id} />
      <input type="hidden" name="archived" value="yes" />
      <SubmitButton look="quiet" busy={t("archiving")}>
        {t("archive")}
      </SubmitButton>
      <p className="hint">{t("archiveNote")}</p>
    </form>
  );
}
