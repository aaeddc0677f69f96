"use client";
import { getFormProps, useForm } from "@conform-to/react";
import { useTranslations } from "next-intl";
import { useActionState } from "react";
import type { z } from "zod";
import { ErrorSummary } from "@/components/forms/error-summary";
import { TextField } from "@/components/forms/field";
import { SubmitButton } from "@/components/forms/submit-button";
import type { ConfirmSignInInput, RequestSignInInput } from "@/lib/auth/schema";
import type { Role } from "@/lib/auth/permissions";
import { confirmSignInAction, demonstrationSignInAction, requestSignInAction } from "./_actions";

export function RequestForm() {
  const t = useTranslations("SignIn");
  const [lastResult, action] = useActionState(requestSignInAction, undefined);
  const [form, fields] = useForm<z.input<typeof RequestSignInInput>, string[]>({ id: "sign-in", lastResult: lastResult ?? null });
  return (
    <form {...getFormProps(form)} action={action} className="mt-6 grid gap-[18px]">
      <ErrorSummary form={form} title={t("summary")} names={{ email: t("email") }} />
      <TextField meta={fields.email} label={t("email")} type="text" inputMode="email" autoComplete="username" dir="ltr" />
      <div>
        <SubmitButton busy={t("sending")}>{t("send")}</SubmitButton>
      </div>
    </form>
  );
}

export function ConfirmForm({ token }: { token: string }) {
  const t = useTranslations("SignIn");
  const [lastResult, action] = useActionState(confirmSignInAction, undefined);
  const [form] = useForm<z.input<typeof ConfirmSignInInput>, string[]>({ id: "confirm", lastResult: lastResult ?? null });
  return (
    <form {...getFormProps(form)} action={action} className="mt-6 grid gap-[18px]">
      <ErrorSummary form={form} title={t("summary")} names={{}} />
      <input type="hidden" name="token" value={token} />
      <div>
        <SubmitButton busy={t("confirming")}>{t("confirm")}</SubmitButton>
      </div>
    </form>
  );
}

export function DemonstrationForm({ people }: { people: { id: string; name: string; role: Role }[] }) {
  const t = useTranslations("SignIn");
  const [lastResult, action] = useActionState(demonstrationSignInAction, undefined);
  return (
    <form action={action} className="mt-3">
      {lastResult?.status === "error" ? (
        <p role="alert" className="ferr">
          {lastResult.error?.[""]?.join(" ")}
        </p>
      ) : null}
      <ul className="border-t border-hair">
        {people.map(({ id, name, role }) => (
          <li key={id} className="border-b border-hair">
            <button type="submit" name="userId" value={id} className="flex min-h-11 w-full cursor-pointer items-center justify-between gap-4 text-start hover:bg-sunk">
              <span className="font-semibold text-tide underline underline-offset-4">{name}</span>
              <span className="sm mut">{t(`roles.${role}`)}</span>
            </button>
          </li>
        ))}
      </ul>
    </form>
  );
}
