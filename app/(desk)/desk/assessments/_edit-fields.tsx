"use client";
import type { FieldMetadata } from "@conform-to/react";
import { useTranslations } from "next-intl";
import type { ReactNode } from "react";
import { PackageTile } from "@/components/ui/marks";
import type { EditedItem, EditedPackage } from "@/lib/assessments/schema";

export type EditableItem = { measureId: string; measure: string; /** Set where uptake has a range: it is edited with the package. */ uptakeRange: string | null };
export type EditablePackage = { letter: string; name: string; version: number; items: EditableItem[] };
type Errors = (name: string) => string[] | undefined;

function Cell({ meta, label, errors, type }: { meta: FieldMetadata<unknown>; label: { short: ReactNode; full: string }; errors: Errors; type: "text" | "date" }) {
  const found = errors(meta.name);
  return (
    <div className={`min-w-0 ${type === "text" ? "col-span-2 max-w-[112px] md:col-span-1" : ""}`}>
      <label htmlFor={meta.id} className="md:sr-only">
        <span aria-hidden="true">{label.short}</span>
        <span className="sr-only">{label.full}</span>
      </label>
      <input
        key={meta.key}
        id={meta.id}
        name={meta.name}
        type={type}
        inputMode={type === "text" ? "decimal" : undefined}
        defaultValue={typeof meta.initialValue === "string" ? meta.initialValue : ""}
        aria-invalid={found?.length ? true : undefined}
        aria-describedby={found?.length ? meta.errorId : undefined}
        autoComplete="off"
        className={`inp ${found?.length ? "err" : ""}`}
      />
      {found?.length ? (
        <p id={meta.errorId} className="ferr">
          {found.join(" ")}
        </p>
      ) : null}
    </div>
  );
}

/** Uptake and dates of one package, line by line, and a number of days by which all of it moves. */
export function PackageFields({ meta, own, errors }: { meta: FieldMetadata<EditedPackage>; own: EditablePackage; errors: Errors }) {
  const t = useTranslations("Assessments.fields");
  const fields = meta.getFieldset();
  const items = fields.items.getFieldList() as unknown as FieldMetadata<EditedItem>[];
  const columns = "md:grid-cols-[minmax(0,1fr)_112px_176px_176px]";
  const lines = `grid-cols-2 ${columns}`;
  const wrong = Object.keys(meta.allErrors).length > 0 || own.items.some((_, index) => ["from", "to", "uptakePercent"].some((field) => errors(`${fields.items.name}[${index}].${field}`)?.length));
  return (
    <details className="border-t border-hair py-2" {...(wrong ? { open: true } : {})}>
      <summary className="min-h-[32px] cursor-pointer py-1 font-semibold">
        <span className="inline-flex items-center gap-2">
          <PackageTile letter={own.letter} /> {own.name}
        </span>
      </summary>
      <input type="hidden" name={fields.letter.name} value={own.letter} />
      <input type="hidden" name={fields.version.name} value={own.version} />
      <div className={`sm mut mt-2 hidden gap-4 border-b border-rule pb-1 md:grid ${columns}`} aria-hidden="true">
        <span>{t("measure")}</span>
        <span>{t("uptake")}</span>
        <span>{t("from")}</span>
        <span>
          {t("to")} <span className="dim">{t("toHint")}</span>
        </span>
      </div>
      {items.map((item, index) => {
        const line = own.items[index];
        if (!line) return null;
        const cell = item.getFieldset();
        const names = { measure: line.measure, letter: own.letter };
        return (
          <fieldset key={item.key} className={`grid items-start gap-x-4 gap-y-2 border-b border-hair py-2 ${lines}`}>
            <legend className="sr-only">{line.measure}</legend>
            <input type="hidden" name={cell.measureId.name} value={line.measureId} />
            <span aria-hidden="true" className="col-span-2 pt-2 font-medium md:col-span-1">
              {line.measure}
            </span>
            {line.uptakeRange === null ? (
              <Cell meta={cell.uptakePercent as FieldMetadata<unknown>} label={{ short: t("uptake"), full: t("uptakeOf", names) }} errors={errors} type="text" />
            ) : (
              <span className="sm col-span-2 pt-2 md:col-span-1">
                {line.uptakeRange} <span className="dim block">{t("uptakeRangeHint")}</span>
              </span>
            )}
            <Cell meta={cell.from as FieldMetadata<unknown>} label={{ short: t("from"), full: t("fromOf", names) }} errors={errors} type="date" />
            <Cell meta={cell.to as FieldMetadata<unknown>} label={{ short: t("to"), full: t("toOf", names) }} errors={errors} type="date" />
          </fieldset>
        );
      })}
      <div className="mt-3 max-w-[280px]">
        <label htmlFor={fields.shiftDays.id}>{t("shift")}</label>
        <p id={`${fields.shiftDays.id}-hint`} className="hint mb-1">
          {t("shiftHint")}
        </p>
        <input
          key={fields.shiftDays.key}
          id={fields.shiftDays.id}
          name={fields.shiftDays.name}
          defaultValue={typeof fields.shiftDays.initialValue === "string" ? fields.shiftDays.initialValue : "0"}
          inputMode="text"
          autoComplete="off"
          aria-describedby={[`${fields.shiftDays.id}-hint`, errors(fields.shiftDays.name)?.length ? fields.shiftDays.errorId : null].filter(Boolean).join(" ")}
          className={`inp !w-[96px] ${errors(fields.shiftDays.name)?.length ? "err" : ""}`}
        />
        {errors(fields.shiftDays.name)?.length ? (
          <p id={fields.shiftDays.errorId} className="ferr">
            {errors(fields.shiftDays.name)?.join(" ")}
          </p>
        ) : null}
      </div>
    </details>
  );
}
