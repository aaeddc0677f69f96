"use client";
import { type FieldMetadata, getFormProps, useForm } from "@conform-to/react";
import { useTranslations } from "next-intl";
import { useActionState } from "react";
import { ErrorSummary } from "@/components/forms/error-summary";
import { CheckboxField, SelectField, TextAreaField } from "@/components/forms/field";
import { SubmitButton } from "@/components/forms/submit-button";
import { type Locale, LOCALES } from "@/lib/i18n/locales";
import { publishBriefingAction, reviseBriefingAction, withdrawBriefingAction } from "../../_actions";

type Locked = { briefingId: string; version: number };
const Lock = ({ briefingId, version }: Locked) => (
  <>
    <input type="hidden" name="briefingId" value={briefingId} />
    <input type="hidden" name="version" value={version} />
  </>
);

export function PublishForm({ versionNumber, ...lock }: Locked & { versionNumber: number }) {
  const t = useTranslations("Publication");
  const [lastResult, action] = useActionState(publishBriefingAction, undefined);
  const [form, fields] = useForm<{ urgency: string }, string[]>({ id: "publish", lastResult: lastResult ?? null });
  return (
    <form {...getFormProps(form)} action={action} className="grid gap-4">
      <ErrorSummary form={form} title={t("summary")} names={{ urgency: t("urgency") }} />
      <Lock {...lock} />
      <fieldset>
        <legend className="text-13 font-semibold">{t("urgency")}</legend>
        {(["routine", "urgent"] as const).map((urgency) => (
          <label key={urgency} className="mb-0 flex min-h-11 items-center gap-2 font-normal">
            <input type="radio" name="urgency" value={urgency} defaultChecked={(fields.urgency.initialValue ?? "routine") === urgency} />
            {t(urgency)}
          </label>
        ))}
      </fieldset>
      <div>
        <SubmitButton busy={t("publishing")}>{t("button", { version: String(versionNumber) })}</SubmitButton>
      </div>
    </form>
  );
}

type Notes = Partial<Record<Locale, { cause: string; effect: string }>>;

export function ReviseForm({ locales, assessments, ...lock }: Locked & { locales: Locale[]; assessments: { value: string; label: string }[] }) {
  const t = useTranslations("Publication");
  const [lastResult, action] = useActionState(reviseBriefingAction, undefined);
  const [form, fields] = useForm<{ kind: string; assessmentId: string; notes: Notes }, string[]>({ id: "revise", lastResult: lastResult ?? null });
  const notes = fields.notes.getFieldset() as unknown as Record<Locale, FieldMetadata<{ cause: string; effect: string }>>;
  return (
    <form {...getFormProps(form)} action={action} className="grid max-w-[720px] gap-4">
      <ErrorSummary form={form} title={t("summary")} names={{ "notes.en.cause": t("cause", { language: LOCALES.en.name }), assessmentId: t("assessment") }} />
      <Lock {...lock} />
      <SelectField meta={fields.assessmentId} label={t("assessment")} options={assessments} />
      <div>
        <button type="submit" name="kind" value="update" className="btn">
          {t("update")}
        </button>
      </div>
      <details open={form.status === "error"}>
        <summary className="cursor-pointer text-13 font-semibold">{t("correct")}</summary>
        <div className="mt-3 grid gap-4">
          {locales.map((code) => {
            const set = notes[code].getFieldset();
            const { name: language, dir } = LOCALES[code];
            return (
              <div key={code} className="grid gap-3 md:grid-cols-2">
                <TextAreaField meta={set.cause} label={t("cause", { language })} lang={code} dir={dir} rows={2} />
                <TextAreaField meta={set.effect} label={t("effect", { language })} lang={code} dir={dir} rows={2} />
              </div>
            );
          })}
          <div>
            <button type="submit" name="kind" value="correction" className="btn">
              {t("correct")}
            </button>
          </div>
        </div>
      </details>
    </form>
  );
}

export function WithdrawForm({ notices, ...lock }: Locked & { notices: Partial<Record<Locale, string>> }) {
  const t = useTranslations("Publication");
  const [lastResult, action] = useActionState(withdrawBriefingAction, undefined);
  const [form, fields] = useForm<{ reason: string; confirmed: string; notice: Partial<Record<Locale, string>> }, string[]>({ id: "withdraw", lastResult: lastResult ?? null, defaultValue: { notice: notices } });
  const notice = fields.notice.getFieldset() as unknown as Record<Locale, FieldMetadata<string>>;
  return (
    <details open={form.status === "error"}>
      <summary className="cursor-pointer font-semibold">{t("withdraw")}</summary>
      <form {...getFormProps(form)} action={action} className="mt-3 grid max-w-[720px] gap-4">
        <ErrorSummary form={form} title={t("summary")} names={{ reason: t("reason"), confirmed: t("withdraw") }} />
        <Lock {...lock} />
        <TextAreaField meta={fields.reason} label={t("reason")} rows={2} />
        {(Object.keys(notices) as Locale[]).map((code) => (
          <TextAreaField key={code} meta={notice[code]} label={t("notice", { language: LOCALES[code].name })} lang={code} dir={LOCALES[code].dir} rows={2} />
        ))}
        <CheckboxField meta={fields.confirmed} value="yes" label={t("confirm")} />
        <div>
          <SubmitButton look="secondary" busy={t("withdrawing")}>
            {t("withdrawButton")}
          </SubmitButton>
        </div>
      </form>
    </details>
  );
}
