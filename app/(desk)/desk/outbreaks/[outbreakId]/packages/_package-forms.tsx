"use client";
import { getFormProps, useForm } from "@conform-to/react";
import { useTranslations } from "next-intl";
import { useActionState } from "react";
import { ErrorSummary } from "@/components/forms/error-summary";
import { CheckboxField, TextField } from "@/components/forms/field";
import { SubmitButton } from "@/components/forms/submit-button";
import { createPackageAction, deletePackageAction } from "./_actions";

export function NewPackageForm({ outbreakId }: { outbreakId: string }) {
  const t = useTranslations("Packages");
  const forms = useTranslations("Forms");
  const [lastResult, action] = useActionState(createPackageAction, undefined);
  const [form, fields] = useForm<{ outbreakId: string; name: string }, string[]>({ id: "new-package", lastResult: lastResult ?? null });
  return (
    <form {...getFormProps(form)} action={action} className="grid max-w-[420px] gap-4">
      <ErrorSummary form={form} title={forms("summary")} names={{ name: t("name") }} />
      <input type="hidden" name="outbreakId" value={outbreakId} />
      <TextField meta={fields.name} label={t("name")} />
      <div>
        <SubmitButton busy={t("creating")}>{t("create")}</SubmitButton>
      </div>
    </form>
  );
}

export function CopyPackageForm({ outbreakId, id, letter, name }: { outbreakId: string; id: string; letter: string; name: string }) {
  const t = useTranslations("Packages");
  const [lastResult, action] = useActionState(createPackageAction, undefined);
  return (
    <form action={action}>
      <input type="hidden" name="outbreakId" value={outbreakId} />
      <input type="hidden" name="copyOf" value={id} />
      <input type="hidden" name="name" value={t("copyName", { name }).slice(0, 60)} />
      <SubmitButton look="secondary" busy={t("copying")}>
        {t("copy", { letter })}
      </SubmitButton>
      {lastResult?.status === "error" ? (
        <p role="alert" className="ferr">
          {lastResult.error?.[""]?.join(" ")}
        </p>
      ) : null}
    </form>
  );
}

export function DeletePackageForm({ id, letter }: { id: string; letter: string }) {
  const t = useTranslations("Packages");
  const forms = useTranslations("Forms");
  const [lastResult, action] = useActionState(deletePackageAction, undefined);
  const [form, fields] = useForm<{ id: string; confirmed: string }, string[]>({ id: "delete-package", lastResult: lastResult ?? null });
  return (
    <details open={form.status === "error"} className="mt-8 border-t border-hair pt-3">
      <summary className="min-h-11 cursor-pointer text-13 font-semibold">{t("delete")}</summary>
      <form {...getFormProps(form)} action={action} className="mt-3 grid justify-items-start gap-3">
        <ErrorSummary form={form} title={forms("summary")} names={{ confirmed: t("delete") }} />
        <input type="hidden" name="id" value={id} />
        <CheckboxField meta={fields.confirmed} value="yes" label={t("deleteConfirm", { letter })} hint={t("deleteNote")} />
        <SubmitButton look="secondary" busy={t("deleting")}>
          {t("delete")}
        </SubmitButton>
      </form>
    </details>
  );
}
