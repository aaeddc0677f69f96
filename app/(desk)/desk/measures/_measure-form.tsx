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

type CostLines = Record<(typeof PAYERS)[number], Partial<Record<(typeof COST_KINDS)[number], Quantity>>>;

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
  costs: CostLines;
  /** Paid on by one payer to another. */
  transfers: CostLines;
  publicTexts: Partial<Record<Locale, { title: string; detail: string }>>;
};

/** One measure of the catalogue: one form to add and to change it. */
export function MeasureForm({ facts, readOnly = false }: { facts: MeasureFacts; readOnly?: boolean }) {
  const t = useTranslations("Measures");
  const forms = useTranslations("Forms");
  const [lastResult, action] = useActionState(facts.id ? updateMeasureAction : createMeasureAction, undefined);
  const [form, fields] = useForm<MeasureFacts, string[]>({ id: "measure", lastResult: lastResult ?? null, defaultValue: facts });
  const costs = fields.costs.getFieldset();
  const transfers = fields.transfers.getFieldset();
  const texts = fields.publicTexts.getFieldset() as unknown as Record<Locale, FieldMetadata<{ title: string; detail: string }>>;
  return (
    <form {...getFormProps(form)} action={action}>
      <fieldset disabled={readOnly} className="min-w-0">
        <ErrorSummary form={form} title={forms("summary")} names={{}} />
        {facts.id ? <input type="hidden" name="id" value={facts.id} /> : null}
        {facts.version ? <input type="hidden" name="version" value={facts.version} /> : null}
        <Section title={t("what")} note={t("whatNote")}>
          <div className="grid max-w-[720px] gap-5 md:grid-cols-2">
            <TextField meta={fields.name} label={t("name")} hint={t("nameHint")} />
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
          </div>
          <div className="mt-5 grid max-w-[720px] grid-cols-2 gap-5 md:grid-cols-3">
            {LAW_DAYS.map((key) => (
              <TextField key={key} meta={fields[key]} label={t(key)} inputMode="numeric" suffix={t("daysUnit")} className="max-w-[200px]" />
            ))}
          </div>
        </Section>
        <Section title={t("price")} note={t("priceNote")}>
          {PAYERS.map((payer) => (
            <PayerCosts key={payer} name={t(`payers.${payer}`)} costs={costs[payer]} transfers={transfers[payer]} filled={isFilled(facts.costs[payer])} passedOn={isFilled(facts.transfers[payer])} />
          ))}
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

const isFilled = (line: Partial<Record<(typeof COST_KINDS)[number], Quantity>>) => COST_KINDS.some((kind) => line[kind]);

type LineMeta = FieldMetadata<Partial<Record<(typeof COST_KINDS)[number], Quantity>>>;
type PayerProps = { name: string; costs: LineMeta; transfers: LineMeta; filled: boolean; passedOn: boolean };

/** What one payer bears, and beneath it what that payer only passes on. Open where something stands in it or is wrong. */
function PayerCosts({ name, costs, transfers, filled, passedOn }: PayerProps) {
  const t = useTranslations("Measures");
  const wrong = (line: LineMeta) => Object.keys(line.allErrors).length > 0;
  const passed = passedOn || wrong(transfers);
  return (
    <details open={filled || passed || wrong(costs)} className="border-b border-hair">
      <summary className="min-h-11 cursor-pointer py-2.5 font-semibold first-letter:uppercase">{name}</summary>
      <CostFields meta={costs} />
      <details open={passed} className="ps-4">
        <summary className="min-h-11 cursor-pointer py-3 text-13">{t("passedOn")}</summary>
        <CostFields meta={transfers} />
      </details>
    </details>
  );
}

function CostFields({ meta }: { meta: LineMeta }) {
  const t = useTranslations("Measures");
  const lines = meta.getFieldset();
  return COST_KINDS.map((kind) => <QuantityFields key={kind} meta={lines[kind] as unknown as FieldMetadata<unknown>} label={t(`costs.${kind}`)} unit={t(`costUnit.${kind}`)} source={false} wide />);
}

/** Takes a measure out of the catalogue, or puts it back in. */
export function ArchiveForm({ id, archived }: { id: string; archived: boolean }) {
  const t = useTranslations("Measures");
  const [lastResult, action] = useActionState(archiveMeasureAction, undefined);
  return (
    <form action={action} className="grid justify-items-start gap-1">
      <input type="hidden" name="id" value={id} />
      <input type="hidden" name="archived" value={archived ? "no" : "yes"} />
      <SubmitButton look="secondary" busy={archived ? t("restoring") : t("archiving")}>
        {archived ? t("restore") : t("archive")}
      </SubmitButton>
      <p className="hint">{t("archiveNote")}</p>
      {lastResult?.status === "error" ? (
        <p role="alert" className="ferr">
          {lastResult.error?.[""]?.join(" ")}
        </p>
      ) : null}
    </form>
  );
}
