"use client";
import { type FieldMetadata, getInputProps, getSelectProps, getTextareaProps } from "@conform-to/react";
import type { ReactNode } from "react";

type Shared = {
  meta: FieldMetadata<unknown>;
  label: ReactNode;
  hint?: ReactNode;
  /** Lower-case name for assistive technology where the label alone isn't clear. */
  className?: string;
  /** Language of what is typed, where it isn't the page's. */
  lang?: string;
  dir?: "ltr" | "rtl";
};

/** Label, hint, control and error in one place; the error names what is allowed and is tied to the control. */
function Frame({ meta, label, hint, className, children }: Shared & { children: ReactNode }) {
  return (
    <div className={className}>
      <label htmlFor={meta.id}>{label}</label>
      {hint ? (
        <p id={`${meta.id}-hint`} className="hint mb-1">
          {hint}
        </p>
      ) : null}
      {children}
      <FieldError meta={meta} />
    </div>
  );
}

export function FieldError({ meta }: { meta: FieldMetadata<unknown> }) {
  return meta.errors?.length ? (
    <p id={meta.errorId} className="ferr">
      {meta.errors.join(" ")}
    </p>
  ) : null;
}

const described = ({ meta, hint }: Shared) =>
  [hint ? `${meta.id}-hint` : null, meta.errors?.length ? meta.errorId : null].filter(Boolean).join(" ") || undefined;
const look = (meta: FieldMetadata<unknown>) => `inp${meta.errors?.length ? " err" : ""}`;

type InputMode = "text" | "decimal" | "numeric" | "email" | "url";

export function TextField(props: Shared & { type?: "text" | "email" | "date" | "url"; inputMode?: InputMode; autoComplete?: string; suffix?: ReactNode }) {
  const { key, ...input } = getInputProps(props.meta as FieldMetadata<string>, { type: props.type ?? "text" });
  return (
    <Frame {...props}>
      <div className="flex items-center gap-2">
        <input
          key={key}
          {...input}
          aria-describedby={described(props)}
          inputMode={props.inputMode}
          autoComplete={props.autoComplete ?? "off"}
          lang={props.lang}
          dir={props.dir}
          className={look(props.meta)}
        />
        {props.suffix ? <span className="sm mut whitespace-nowrap">{props.suffix}</span> : null}
      </div>
    </Frame>
  );
}

export function TextAreaField(props: Shared & { rows?: number }) {
  const { key, ...input } = getTextareaProps(props.meta as FieldMetadata<string>);
  return (
    <Frame {...props}>
      <textarea key={key} {...input} aria-describedby={described(props)} rows={props.rows ?? 3} lang={props.lang} dir={props.dir} className={look(props.meta)} />
    </Frame>
  );
}

export function SelectField(props: Shared & { options: { value: string; label: string }[] }) {
  const { key, ...input } = getSelectProps(props.meta as FieldMetadata<string>);
  return (
    <Frame {...props}>
      <select key={key} {...input} aria-describedby={described(props)} className={look(props.meta)}>
        {props.options.map((option) => (
          <option key={option.value} value={option.value}>
            {option.label}
          </option>
        ))}
      </select>
    </Frame>
  );
}

export function CheckboxField(props: Shared & { value?: string }) {
  const { key, ...input } = getInputProps(props.meta as FieldMetadata<boolean>, { type: "checkbox", ...(props.value ? { value: props.value } : {}) });
  return (
    <div className={props.className}>
      <label className="flex items-start gap-3 font-normal">
        <input key={key} {...input} aria-describedby={described(props)} />
        <span>{props.label}</span>
      </label>
      {props.hint ? (
        <p id={`${props.meta.id}-hint`} className="hint">
          {props.hint}
        </p>
      ) : null}
      <FieldError meta={props.meta} />
    </div>
  );
}
