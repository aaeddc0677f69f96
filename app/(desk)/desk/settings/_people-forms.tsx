"use client";
import { getFormProps, useForm } from "@conform-to/react";
import { useTranslations } from "next-intl";
import { useActionState } from "react";
import type { z } from "zod";
import { ErrorSummary } from "@/components/forms/error-summary";
import { CheckboxField, SelectField, TextField } from "@/components/forms/field";
import { SubmitButton } from "@/components/forms/submit-button";
import { ROLES, type Role } from "@/lib/auth/permissions";
import { LOCALE_CODES, LOCALES } from "@/lib/i18n/locales";
import type { ChangeRoleInput, DeactivateUserInput, InviteUserInput } from "@/lib/users/schema";
import { changeRoleAction, deactivateUserAction, endOtherSessionsAction, inviteUserAction } from "./_actions";

function useRoleOptions() {
  const roles = useTranslations("Roles");
  return ROLES.map((role) => ({ value: role, label: roles(role) }));
}

export function InviteForm() {
  const t = useTranslations("Users");
  const roles = useRoleOptions();
  const [lastResult, action] = useActionState(inviteUserAction, undefined);
  const [form, fields] = useForm<z.input<typeof InviteUserInput>, string[]>({ id: "invite", lastResult: lastResult ?? null, defaultValue: { role: "adviser", locale: "en" } });
  const names = { name: t("name"), email: t("email"), role: t("role"), locale: t("language") };
  return (
    <form {...getFormProps(form)} action={action} className="grid max-w-[720px] gap-4 md:grid-cols-2">
      <div className="md:col-span-2">
        <ErrorSummary form={form} title={t("summary")} names={names} />
      </div>
      <TextField meta={fields.name} label={names.name} />
      <TextField meta={fields.email} label={names.email} inputMode="email" />
      <SelectField meta={fields.role} label={names.role} options={roles} />
      <SelectField meta={fields.locale} label={names.locale} options={LOCALE_CODES.map((code) => ({ value: code, label: LOCALES[code].name }))} />
      <div>
        <SubmitButton busy={t("inviting")}>{t("inviteButton")}</SubmitButton>
      </div>
    </form>
  );
}

export function PersonForms({ userId, name, role }: { userId: string; name: string; role: Role }) {
  const t = useTranslations("Users");
  const roles = useRoleOptions();
  const [roleResult, roleAction] = useActionState(changeRoleAction, undefined);
  const [endResult, endAction] = useActionState(deactivateUserAction, undefined);
  const [roleForm, roleFields] = useForm<z.input<typeof ChangeRoleInput>, string[]>({ id: `role-${userId}`, lastResult: roleResult ?? null, defaultValue: { role } });
  const [endForm, endFields] = useForm<z.input<typeof DeactivateUserInput>, string[]>({ id: `end-${userId}`, lastResult: endResult ?? null });
  return (
    <div className="grid gap-6 py-3 md:grid-cols-2">
      <form {...getFormProps(roleForm)} action={roleAction} className="grid content-start gap-3">
        <ErrorSummary form={roleForm} title={t("summary")} names={{ role: t("role") }} />
        <input type="hidden" name="userId" value={userId} />
        <SelectField meta={roleFields.role} label={t("role")} options={roles} />
        <div>
          <SubmitButton look="secondary" busy={t("changing")}>
            {t("changeRole")}
          </SubmitButton>
        </div>
      </form>
      <form {...getFormProps(endForm)} action={endAction} className="grid content-start gap-3">
        <ErrorSummary form={endForm} title={t("summary")} names={{ confirmed: t("confirm", { name }) }} />
        <input type="hidden" name="userId" value={userId} />
        <CheckboxField meta={endFields.confirmed} value="yes" label={t("confirm", { name })} />
        <div>
          <SubmitButton look="secondary" busy={t("deactivating")}>
            {t("deactivate", { name })}
          </SubmitButton>
        </div>
      </form>
    </div>
  );
}

export function EndSessionsForm() {
  const t = useTranslations("Users");
  const [, action] = useActionState(endOtherSessionsAction, undefined);
  return (
    <form action={action}>
      <input type="hidden" name="scope" value="others" />
      <SubmitButton look="secondary" busy={t("ending")}>
        {t("endOthers")}
      </SubmitButton>
    </form>
  );
}
