"use client";
import { getFormProps, getInputProps, useForm } from "@conform-to/react";
import { useTranslations } from "next-intl";
import { useActionState } from "react";
import { ErrorSummary } from "@/components/forms/error-summary";
import { CheckboxField, TextField } from "@/components/forms/field";
import { SubmitButton } from "@/components/forms/submit-button";
import { createPackageAction, deletePackageAction, updatePackageAction } from "./_actions";

export type Line = { measureId: string; name: string; included: boolean; uptakePercent: string; from: string; until: string; never: boolean };

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

type Facts = { id: string; version: number; name: string; lines: Line[] };

/** Name, measures, uptake and dates, as plain fields; the strip above is drawn from what is saved. */
export function PackageForm({ facts, readOnly }: { facts: Facts; readOnly: boolean }) {
  const t = useTranslations("Packages");
  const forms = useTranslations("Forms");
  const [lastResult, action] = useActionState(updatePackageAction, undefined);
  const [form, fields] = useForm<Facts, string[]>({ id: "package", lastResult: lastResult ?? null, defaultValue: { ...facts, lines: facts.lines.map((line) => ({ ...line, included: line.included ? "on" : "", never: line.never ? "on" : "" })) } as never });
  const rows = fields.lines.getFieldList();
  const parts = ["uptakePercent", "from", "until"] as const;
  const names = Object.fromEntries(facts.lines.flatMap((line, i) => parts.map((part) => [`lines[${i}].${part}`, line.name])));
  return (
    <form {...getFormProps(form)} action={action}>
      <fieldset disabled={readOnly} className="min-w-0">
        <ErrorSummary form={form} title={forms("summary")} names={{ name: t("name"), ...names }} />
        <input type="hidden" name="id" value={facts.id} />
        <input type="hidden" name="version" value={facts.version} />
        <TextField meta={fields.name} label={t("name")} className="max-w-[420px]" />
        <div className="mt-4 overflow-x-auto">
          <table className="head min-w-[760px]">
            <thead>
              <tr>
                <th scope="col">{t("columns.measure")}</th>
                <th scope="col">{t("columns.uptake")}</th>
                <th scope="col">{t("columns.from")}</th>
                <th scope="col">{t("columns.until")}</th>
                <th scope="col">{t("columns.never")}</th>
              </tr>
            </thead>
            <tbody>
              {rows.map((row, index) => {
                const line = row.getFieldset();
                const name = facts.lines[index]?.name ?? "";
                const field = (part: (typeof parts)[number], type: "text" | "date", width: string) => {
                  const { key, ...input } = getInputProps(line[part], { type });
                  const errors = line[part].errors;
                  return (
                    <td>
                      <label className="sr-only" htmlFor={input.id}>
                        {`${name}: ${t(`columns.${part === "uptakePercent" ? "uptake" : part}`)}`}
                      </label>
                      <input key={key} {...input} className={`inp ${width}${errors?.length ? " err" : ""}`} aria-describedby={errors?.length ? line[part].errorId : undefined} autoComplete="off" />
                      {errors?.length ? (
                        <p id={line[part].errorId} className="ferr">
                          {errors.join(" ")}
                        </p>
                      ) : null}
                    </td>
                  );
                };
                return (
                  <tr key={row.key}>
                    <th scope="row">
                      <input type="hidden" name={line.measureId.name} value={facts.lines[index]?.measureId} />
                      <label className="mb-0 flex min-h-10 items-center gap-3 text-15 font-normal">
                        <input type="checkbox" name={line.included.name} defaultChecked={line.included.initialValue === "on"} />
                        {name}
                      </label>
                    </th>
                    {field("uptakePercent", "text", "max-w-[84px] text-end")}
                    {field("from", "date", "max-w-[160px]")}
                    {field("until", "date", "max-w-[160px]")}
                    <td>
                      <label className="mb-0 flex min-h-10 items-center font-normal">
                        <span className="sr-only">{`${name}: ${t("columns.never")}`}</span>
                        <input type="checkbox" name={line.never.name} defaultChecked={line.never.initialValue === "on"} />
                      </label>
                    </td>
                  </tr>
                );
              })}
            </tbody>
          </table>
        </div>
        {readOnly ? null : (
          <div className="mt-5">
            <SubmitButton busy={t("saving")}>{t("save")}</SubmitButton>
          </div>
        )}
      </fieldset>
    </form>
  );
}

export function DeletePackageForm({ id, letter }: { id: string; letter: string }) {
  const t = useTranslations("Packages");
  const forms = useTranslations("Forms");
  const [lastResult, action] = useActionState(deletePackageAction, undefined);
  const [form, fields] = useForm<{ id: string; confirmed: string }, string[]>({ id: "delete-package", lastResult: lastResult ?? null });
  return (
    <details className="mt-8 border-t border-hair pt-3">
      <summary className="cursor-pointer text-13 font-semibold">{t("delete")}</summary>
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
