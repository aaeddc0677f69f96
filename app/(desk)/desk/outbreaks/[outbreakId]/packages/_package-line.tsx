"use client";
import type { FieldMetadata } from "@conform-to/react";
import { useTranslations } from "next-intl";
import type { ComponentProps } from "react";
import { dayOf } from "@/lib/packages/days";

type Typed = { measureId: string; included: string; uptakePercent: { low: string; central: string; high: string }; from: string; until: string; never: string };
type Line = ReturnType<FieldMetadata<Typed>["getFieldset"]>;

export const LINE_COLUMNS = "lg:grid-cols-[minmax(0,1fr)_222px_158px_158px_138px] lg:gap-x-5";
export const UPTAKE_COLUMNS = "grid max-w-[222px] grid-cols-3 gap-1.5";
export const PARTS = ["low", "central", "high"] as const;

/**
 * One measure of the schedule. Its fields show once it is ticked, by style alone, so that a browser without script has
 * them too and nothing typed is lost by unticking.
 */
export function PackageLine({ line, name, dayZero, readOnly, again }: { line: Line; name: string; dayZero: string; readOnly: boolean; again: ComponentProps<"button"> }) {
  const t = useTranslations("Packages");
  const uptake = line.uptakePercent.getFieldset();
  const wrong = [line.from, line.until, uptake.low, uptake.central, uptake.high, line.uptakePercent].flatMap(({ errors, errorId, name: field }) => (errors?.length ? [{ errors, errorId, field }] : []));
  const day = (value: string | undefined) => (value && /^\d{4}-\d{2}-\d{2}$/.test(value) ? dayOf(dayZero, value) : null);
  const [first, last] = [day(line.from.value), day(line.until.value)];
  const shown = "hidden group-has-[[data-included]:checked]:block";
  return (
    <fieldset className={`group grid min-w-0 grid-cols-2 items-start gap-x-4 border-b border-hair py-1 has-[[data-included]:checked]:py-2 ${LINE_COLUMNS}`}>
      <legend className="sr-only">{name}</legend>
      <input type="hidden" name={line.measureId.name} value={String(line.measureId.initialValue ?? "")} />
      <label className="col-span-2 mb-0 flex min-h-11 items-center gap-3 text-15 font-normal lg:col-span-1 group-has-[[data-included]:checked]:font-semibold lg:min-h-10">
        <input key={line.included.key} type="checkbox" name={line.included.name} data-included="" defaultChecked={line.included.initialValue === "on"} />
        {name}
      </label>
      <div className={`${shown} col-span-2 lg:col-span-1`}>
        <p className="text-13 text-ink-2 lg:sr-only">{t("columns.uptake")}</p>
        <div className={UPTAKE_COLUMNS}>
          {PARTS.map((part) => (
            <Cell key={part} meta={uptake[part]} label={t(`uptakePart.${part}`)} inputMode="decimal" className="px-2 text-end" />
          ))}
        </div>
      </div>
      <div className={`${shown} max-lg:mt-2`}>
        <Cell meta={line.from} label={t("columns.from")} type="date" />
        <p className="xs dim mt-1">{first === null ? t("dayUnknown") : t("day", { day: first })}</p>
      </div>
      <div className={`${shown} max-lg:mt-2`}>
        <Cell meta={line.until} label={t("columns.until")} type="date" />
        <p className="xs dim mt-1">{first !== null && last !== null && last >= first ? t("dayOf", { day: last, days: last - first + 1 }) : null}</p>
      </div>
      <div className={`${shown} col-span-2 max-lg:mt-1 lg:col-span-1`}>
        <label className="mb-0 flex min-h-11 items-center gap-2 font-normal lg:min-h-10">
          <input key={line.never.key} type="checkbox" name={line.never.name} defaultChecked={line.never.initialValue === "on"} />
          {t("columns.never")}
        </label>
        {readOnly ? null : (
          <button {...again} className="min-h-8 text-13 text-tide underline underline-offset-4 max-lg:min-h-11">
            {t("again")}
          </button>
        )}
      </div>
      {wrong.length > 0 ? (
        <div className="col-span-2 lg:col-span-5">
          {wrong.map(({ errors, errorId, field }) => (
            <p key={field} id={errorId} className="ferr">
              {errors.join(" ")}
            </p>
          ))}
        </div>
      ) : null}
    </fieldset>
  );
}

type CellProps = { meta: FieldMetadata<string>; label: string; type?: "text" | "date"; inputMode?: "decimal"; className?: string };

function Cell({ meta, label, type = "text", inputMode, className = "" }: CellProps) {
  const wrong = meta.errors?.length ? true : undefined;
  return (
    <div className="min-w-0">
      <label htmlFor={meta.id} className="mb-0.5 text-13 font-normal text-ink-2 lg:sr-only">
        {label}
      </label>
      <input
        key={meta.key}
        id={meta.id}
        name={meta.name}
        type={type}
        inputMode={inputMode}
        defaultValue={typeof meta.initialValue === "string" ? meta.initialValue : ""}
        aria-invalid={wrong}
        aria-describedby={wrong ? meta.errorId : undefined}
        autoComplete="off"
        className={`inp ${className}${wrong ? " err" : ""}`}
      />
    </div>
  );
}
