"use client";
import { getFormProps, useForm } from "@conform-to/react";
import { useTranslations } from "next-intl";
import { useActionState } from "react";
import { ErrorSummary } from "@/components/forms/error-summary";
import { TextField } from "@/components/forms/field";
import { SubmitButton } from "@/components/forms/submit-button";
import type { CreateAssessmentInput } from "@/lib/assessments/schema";
import { createAssessmentAction } from "./_actions";
import { PackageChoice } from "./_package-choice";

type Defaults = { outbreakId: string; title: string; seed: number; draws: number; horizonDays: number };

export function CreateAssessmentForm({ packages, defaults }: { packages: { letter: string; name: string; empty: boolean }[]; defaults: Defaults }) {
  const t = useTranslations("Assessments");
  const [lastResult, action] = useActionState(createAssessmentAction, undefined);
  const [form, fields] = useForm<CreateAssessmentInput>({
    id: "assessment",
    lastResult: lastResult ?? null,
    defaultValue: { ...defaults, packageLetters: packages.filter(({ empty }) => !empty).map(({ letter }) => letter) } as never,
  });
  const chosen = [fields.packageLetters.initialValue ?? []].flat().filter((letter): letter is string => typeof letter === "string");
  return (
    <form {...getFormProps(form)} action={action} className="mt-6 grid max-w-[44rem] gap-6">
      <ErrorSummary
        form={form as never}
        title={t("fields.summary")}
        names={{ title: t("fields.title"), packageLetters: t("fields.packages"), draws: t("fields.draws"), seed: t("fields.seed"), horizonDays: t("fields.horizon") }}
      />
      <input type="hidden" name={fields.outbreakId.name} value={defaults.outbreakId} />
      <TextField meta={fields.title} label={t("fields.title")} hint={t("fields.titleHint")} />
      <PackageChoice meta={fields.packageLetters} packages={packages} chosen={chosen} />
      <div className="grid items-end gap-6 md:grid-cols-3">
        <TextField meta={fields.draws} label={t("fields.draws")} hint={t("fields.drawsHint")} inputMode="numeric" />
        <TextField meta={fields.seed} label={t("fields.seed")} hint={t("fields.seedHint")} inputMode="numeric" />
        <TextField meta={fields.horizonDays} label={t("fields.horizon")} hint={t("fields.horizonHint")} inputMode="numeric" />
      </div>
      <div>
        <SubmitButton busy={t("create.busy")}>{t("create.submit")}</SubmitButton>
      </div>
    </form>
  );
}
