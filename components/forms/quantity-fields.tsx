"use client";
import { type FieldMetadata, getInputProps } from "@conform-to/react";
import { useTranslations } from "next-intl";
import type { ReactNode } from "react";

type Typed = { low?: unknown; central?: unknown; high?: unknown; source?: unknown };

/** Low, central and high in one row, the source beneath; one group for assistive technology, one error list. */
export function QuantityFields({ meta, label, unit, hint, source = true, wide = false }: { meta: FieldMetadata<unknown>; label: ReactNode; unit?: ReactNode; hint?: ReactNode; source?: boolean; /** Room for amounts of money. */ wide?: boolean }) {
  const t = useTranslations("Forms");
  const fields = (meta as unknown as FieldMetadata<Typed>).getFieldset();
  const parts = ["low", "central", "high"] as const;
  const errors = [...new Set([...(meta.errors ?? []), ...parts.flatMap((part) => fields[part].errors ?? []), ...(fields.source.errors ?? [])])];
  const errorId = `${meta.id}-errors`;
  return (
    <fieldset className={`grid min-w-0 gap-x-6 gap-y-2 border-b border-hair py-3 ${wide ? "lg:grid-cols-[minmax(0,210px)_372px_minmax(0,1fr)]" : "lg:grid-cols-[minmax(0,210px)_252px_minmax(0,1fr)]"}`}>
      <legend className="sr-only">{label}</legend>
      <div className="text-15" aria-hidden="true">
        {label}
        {unit ? <span className="block text-13 text-ink-3">{unit}</span> : null}
        {hint ? <span className="hint block">{hint}</span> : null}
      </div>
      <div className={`grid grid-cols-3 gap-2 ${wide ? "max-w-[372px]" : "max-w-[252px]"}`}>
        {parts.map((part) => {
          const field = fields[part] as FieldMetadata<string>;
          const { key, ...input } = getInputProps(field, { type: "text" });
          return (
            <div key={part}>
              <label className="font-normal text-ink-2" htmlFor={input.id}>
                {t(part)}
              </label>
              <input key={key} {...input} inputMode="decimal" autoComplete="off" aria-invalid={field.errors?.length ? true : undefined} aria-describedby={errors.length ? errorId : undefined} className={`inp px-2 text-end${field.errors?.length ? " err" : ""}`} />
            </div>
          );
        })}
      </div>
      {source ? <SourceField meta={fields.source as FieldMetadata<string>} label={t("source")} /> : null}
      {errors.length ? (
        <p id={errorId} className="ferr lg:col-span-3">
          {errors.join(" ")}
        </p>
      ) : null}
    </fieldset>
  );
}

function SourceField({ meta, label }: { meta: FieldMetadata<string>; label: string }) {
  const { key, ...input } = getInputProps(meta, { type: "text" });
  return (
    <div className="max-w-[440px]">
      <label className="font-normal text-ink-2" htmlFor={input.id}>
        {label}
      </label>
      <input key={key} {...input} autoComplete="off" className="inp" />
    </div>
  );
}
