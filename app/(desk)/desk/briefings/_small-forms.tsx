"use client";
import { getFormProps, useForm } from "@conform-to/react";
import { useTranslations } from "next-intl";
import { useActionState } from "react";
import { ErrorSummary } from "@/components/forms/error-summary";
import { SelectField, TextField } from "@/components/forms/field";
import { SubmitButton } from "@/components/forms/submit-button";
import { FIGURE_KEYS } from "@/lib/figures/catalogue";
import { addFigureAction, createBriefingAction, saveSettingsAction, submitBriefingAction } from "./_actions";

export function CreateForm({ assessmentId, heading, packages }: { assessmentId: string; heading: string; packages: { letter: string; name: string }[] }) {
  const t = useTranslations("Briefings");
  const forms = useTranslations("Forms");
  const [lastResult, action] = useActionState(createBriefingAction, undefined);
  const [form, fields] = useForm<{ assessmentId: string; packageLetter: string }, string[]>({ id: `new-${assessmentId}`, lastResult: lastResult ?? null });
  return (
    <form {...getFormProps(form)} action={action} className="grid gap-4 border-t-2 border-ink pt-4">
      <h2 className="text-17">{heading}</h2>
      <ErrorSummary form={form} title={forms("summary")} names={{ packageLetter: t("package") }} />
      <input type="hidden" name="assessmentId" value={assessmentId} />
      <SelectField meta={fields.packageLetter} label={t("package")} options={packages.map(({ letter, name }) => ({ value: letter, label: `${letter}: ${name}` }))} />
      <div>
        <SubmitButton busy={t("creating")}>{t("create")}</SubmitButton>
      </div>
    </form>
  );
}

type Locked = { briefingId: string; version: number };
const Lock = ({ briefingId, version }: Locked) => (
  <>
    <input type="hidden" name="briefingId" value={briefingId} />
    <input type="hidden" name="version" value={version} />
  </>
);

export function SettingsForm({ reviewDate, ...lock }: Locked & { reviewDate: string | null }) {
  const t = useTranslations("Briefings");
  const forms = useTranslations("Forms");
  const [lastResult, action] = useActionState(saveSettingsAction, undefined);
  const [form, fields] = useForm<{ reviewDate: string }, string[]>({ id: "settings", lastResult: lastResult ?? null, defaultValue: { reviewDate: reviewDate ?? "" } });
  return (
    <form {...getFormProps(form)} action={action} className="grid gap-3">
      <ErrorSummary form={form} title={forms("summary")} names={{ reviewDate: t("settings") }} />
      <Lock {...lock} />
      <TextField meta={fields.reviewDate} type="date" label={t("settings")} hint={t("settingsHint")} className="max-w-[220px]" />
      <div>
        <SubmitButton look="secondary" busy={t("saving")}>
          {t("saveSettings")}
        </SubmitButton>
      </div>
    </form>
  );
}

export function AddFigureForm({ packages, ...lock }: Locked & { packages: string[] }) {
  const t = useTranslations("Briefings");
  const forms = useTranslations("Forms");
  const [lastResult, action] = useActionState(addFigureAction, undefined);
  const [form, fields] = useForm<{ figure: string; package: string; form: string }, string[]>({ id: "add-figure", lastResult: lastResult ?? null });
  return (
    <details className="mt-3">
      <summary className="cursor-pointer text-13 font-semibold">{t("addFigure")}</summary>
      <form {...getFormProps(form)} action={action} className="mt-3 grid gap-3">
        <ErrorSummary form={form} title={forms("summary")} names={{ figure: t("figure"), package: t("which"), form: t("form") }} />
        <Lock {...lock} />
        <SelectField meta={fields.figure} label={t("figure")} options={FIGURE_KEYS.map((key) => ({ value: key, label: t(`kinds.${key}`) }))} />
        <SelectField meta={fields.package} label={t("which")} options={[{ value: "none", label: t("none") }, ...packages.map((letter) => ({ value: letter, label: letter }))]} />
        <SelectField meta={fields.form} label={t("form")} options={(["value", "interval"] as const).map((key) => ({ value: key, label: t(`forms.${key}`) }))} />
        <div>
          <SubmitButton look="secondary" busy={t("adding")}>
            {t("add")}
          </SubmitButton>
        </div>
      </form>
    </details>
  );
}

export function SubmitForm(lock: Locked) {
  const t = useTranslations("Briefings");
  const [lastResult, action] = useActionState(submitBriefingAction, undefined);
  return (
    <form action={action}>
      <Lock {...lock} />
      <SubmitButton busy={t("submitting")}>{t("submit")}</SubmitButton>
      {lastResult?.status === "error" ? (
        <p role="alert" className="ferr">
          {lastResult.error?.[""]?.join(" ")}
        </p>
      ) : null}
    </form>
  );
}
