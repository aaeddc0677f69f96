"use client";
import { getFormProps, useForm } from "@conform-to/react";
import { useTranslations } from "next-intl";
import { useActionState } from "react";
import { ErrorSummary } from "@/components/forms/error-summary";
import { TextAreaField } from "@/components/forms/field";
import { SubmitButton } from "@/components/forms/submit-button";
import { NotYet } from "@/components/ui/button";
import type { ReasonAgainstFreezing } from "@/lib/assessments/freeze-rules";
import type { FreezeAssessmentInput } from "@/lib/assessments/schema";
import { freezeAssessmentAction } from "./_actions";

export type FreezeProps = { id: string; version: number; reasons: ReasonAgainstFreezing[]; undeliverable: string[] };

export function FreezeForm({ id, version, reasons, undeliverable, edited }: FreezeProps & { edited: boolean }) {
  const t = useTranslations("Assessments.freeze");
  const [lastResult, action] = useActionState(freezeAssessmentAction, undefined);
  const [form, fields] = useForm<FreezeAssessmentInput>({ id: "freeze", lastResult: lastResult ?? null });
  const standing = [...(edited ? [t("saveFirst")] : []), ...reasons.map((reason) => t(`against.${reason}`))];
  return (
    <form {...getFormProps(form)} action={action} className="grid max-w-[44rem] gap-4">
      <p>{t("text")}</p>
      {undeliverable.length > 0 ? <p className="note">{t("undeliverable", { count: undeliverable.length, letters: undeliverable.join(", ") })}</p> : null}
      <ErrorSummary form={form as never} title={t("title")} names={{ reason: t("reason") }} />
      <input type="hidden" name="id" value={id} />
      <input type="hidden" name="version" value={version} />
      <TextAreaField meta={fields.reason} label={t("reason")} hint={t("reasonHint")} />
      {standing.length > 0 ? (
        <NotYet id="freeze-not-yet" label={t("submit")} reasons={standing} />
      ) : (
        <div>
          <SubmitButton busy={t("busy")}>{t("submit")}</SubmitButton>
        </div>
      )}
    </form>
  );
}
