"use client";
import { type FieldMetadata, type FormMetadata, getFormProps } from "@conform-to/react";
import { useTranslations } from "next-intl";
import type { RefObject } from "react";
import { ErrorSummary } from "@/components/forms/error-summary";
import { TextField } from "@/components/forms/field";
import type { EditAssessmentInput, EditedPackage } from "@/lib/assessments/schema";
import { type EditablePackage, PackageFields } from "./_edit-fields";
import { PackageChoice } from "./_package-choice";

type Fields = ReturnType<FormMetadata<EditAssessmentInput, string[]>["getFieldset"]>;

/** The form beside the result: what it says is what is recalculated, and what saving stores. */
export function EditPanel({
  form,
  fields,
  formRef,
  action,
  packages,
  liveErrors,
  onBegin,
  onChange,
}: {
  form: FormMetadata<EditAssessmentInput, string[]>;
  fields: Fields;
  formRef: RefObject<HTMLFormElement | null>;
  action: (data: FormData) => void;
  packages: EditablePackage[];
  /** Of the last recalculation, by field name. */
  liveErrors: Record<string, string[] | null>;
  onBegin: () => void;
  onChange: () => void;
}) {
  const t = useTranslations("Assessments");
  const errors = (name: string) => liveErrors[name] ?? form.allErrors[name];
  const lists = fields.packages.getFieldList() as unknown as FieldMetadata<EditedPackage>[];
  const chosen = [fields.packageLetters.initialValue ?? []].flat().filter((letter): letter is string => typeof letter === "string");
  const live = <T,>(meta: FieldMetadata<T>): FieldMetadata<T> => {
    const found = errors(meta.name);
    return found?.length ? new Proxy(meta, { get: (target, key) => (key === "errors" ? found : Reflect.get(target, key)) }) : meta;
  };
  const names: Record<string, string> = { title: t("fields.title"), packageLetters: t("fields.packages"), draws: t("fields.draws"), seed: t("fields.seed"), horizonDays: t("fields.horizon") };
  packages.forEach(({ letter, items }, p) => {
    names[`packages[${p}].shiftDays`] = `${letter}, ${t("fields.shift")}`;
    items.forEach(({ measure }, i) => {
      const at = `packages[${p}].items[${i}]`;
      names[`${at}.uptakePercent`] = t("fields.uptakeOf", { measure, letter });
      names[`${at}.from`] = t("fields.fromOf", { measure, letter });
      names[`${at}.to`] = t("fields.toOf", { measure, letter });
    });
  });
  const formProps = getFormProps(form);
  return (
    <form {...formProps} ref={formRef} action={action} onFocus={onBegin} onInput={onChange} className="mt-4 grid gap-5">
      <ErrorSummary form={form as never} title={t("fields.summary")} names={names} />
      <input type="hidden" name={fields.id.name} defaultValue={fields.id.initialValue} />
      <input type="hidden" name={fields.version.name} defaultValue={fields.version.initialValue} />
      <input type="hidden" name={fields.dayZero.name} defaultValue={fields.dayZero.initialValue} />
      <div className="grid gap-5 md:grid-cols-[minmax(0,2fr)_1fr_1fr_1fr] md:items-end">
        <TextField meta={live(fields.title)} label={t("fields.title")} />
        <TextField meta={live(fields.draws)} label={t("fields.draws")} hint={t("fields.drawsHint")} inputMode="numeric" />
        <TextField meta={live(fields.seed)} label={t("fields.seed")} hint={t("fields.seedHint")} inputMode="numeric" />
        <TextField meta={live(fields.horizonDays)} label={t("fields.horizon")} hint={t("fields.horizonHint")} inputMode="numeric" />
      </div>
      <PackageChoice
        meta={fields.packageLetters as unknown as FieldMetadata<unknown>}
        packages={packages.map(({ letter, name, items }) => ({ letter, name, empty: items.length === 0 }))}
        chosen={chosen}
        errors={errors("packageLetters")}
      />
      <div>
        {lists.map((meta, index) => {
          const own = packages[index];
          return own ? <PackageFields key={meta.key} meta={meta} own={own} errors={errors} /> : null;
        })}
      </div>
    </form>
  );
}
