"use client";
import { getFormProps, useForm } from "@conform-to/react";
import { useTranslations } from "next-intl";
import { useActionState, useRef } from "react";
import { ErrorSummary } from "@/components/forms/error-summary";
import { TextField } from "@/components/forms/field";
import { SubmitButton } from "@/components/forms/submit-button";
import { dateOf, dayOf } from "@/lib/packages/days";
import { updatePackageAction } from "./_actions";
import { LINE_COLUMNS, PackageLine, PARTS, UPTAKE_COLUMNS } from "./_package-line";
import { PackageStrip, type StripLine } from "./_package-strip";

export type Line = { measureId: string; included: boolean; uptakePercent: { low: string; central: string; high: string }; from: string; until: string; never: boolean };
export type LineMeasure = { id: string; name: string; leadTimeDays: number; maxDays: number | null };
type Facts = { id: string; version: number; letter: string; name: string; dayZero: string; lines: Line[] };
type Typed = Omit<Facts, "lines"> & { lines: (Omit<Line, "included" | "never"> & { included: string; never: string })[] };

const isDate = (value: string | undefined): value is string => value !== undefined && /^\d{4}-\d{2}-\d{2}$/.test(value);

/** Name, measures, uptake and dates as plain fields; the strip above them follows what is typed. */
export function PackageForm({ facts, measures, readOnly }: { facts: Facts; measures: LineMeasure[]; readOnly: boolean }) {
  const t = useTranslations("Packages");
  const forms = useTranslations("Forms");
  const element = useRef<HTMLFormElement>(null);
  const [lastResult, action] = useActionState(updatePackageAction, undefined);
  const { letter, lines: saved, ...rest } = facts;
  // As a browser sends it: text, and nothing for a box without a tick.
  const ticked = (on: boolean) => (on ? "on" : undefined);
  const defaultValue = { ...rest, version: String(rest.version), lines: saved.map((line) => ({ ...line, included: ticked(line.included), never: ticked(line.never) })) };
  const [form, fields] = useForm<Typed, string[]>({ id: "package", lastResult: lastResult ?? null, defaultValue: defaultValue as never });
  const rows = fields.lines.getFieldList();
  const measureOf = new Map(measures.map((measure) => [measure.id, measure]));
  const lines = rows.map((row) => ({ row, line: row.getFieldset() }));

  const strip = lines.flatMap(({ row, line }, index): StripLine[] => {
    const measure = measureOf.get(String(line.measureId.value ?? ""));
    const [from, until, never] = [line.from.value, line.until.value, line.never.value === "on"];
    if (!measure || line.included.value !== "on" || !isDate(from)) return [];
    const startDay = dayOf(facts.dayZero, from);
    const endDay = never ? null : isDate(until) ? dayOf(facts.dayZero, until) + 1 : startDay + 1;
    return startDay < 0 || (endDay !== null && endDay <= startDay) ? [] : [{ ...measure, key: row.key ?? row.id, index, startDay, endDay }];
  });

  /** Types new dates into a line's fields, so that everything that follows the fields follows the bar too. */
  const move = (line: StripLine, days: number) => {
    const by = Math.max(days, -line.startDay);
    const write = (name: string, day: number) => {
      const input = element.current?.elements.namedItem(name);
      if (!(input instanceof HTMLInputElement)) return;
      input.value = dateOf(facts.dayZero, day);
      input.dispatchEvent(new Event("input", { bubbles: true }));
    };
    const moved = lines[line.index]?.line;
    if (!moved || by === 0) return;
    write(moved.from.name, line.startDay + by);
    if (line.endDay !== null) write(moved.until.name, line.endDay - 1 + by);
  };

  return (
    <form {...getFormProps(form)} ref={element} action={action}>
      <PackageStrip lines={strip} dayZero={facts.dayZero} letter={letter} {...(readOnly ? {} : { onMove: move })} />
      {fields.name.dirty || fields.lines.dirty ? (
        <p className="sm mut mt-2" role="status">
          {t("unsaved")}
        </p>
      ) : null}
      <fieldset disabled={readOnly} className="mt-6 min-w-0">
        <ErrorSummary form={form} title={forms("summary")} names={Object.fromEntries(lines.flatMap(({ line }) => namesOf(line, measureOf.get(String(line.measureId.value ?? ""))?.name ?? "")))} />
        <input type="hidden" name="id" value={facts.id} />
        <input type="hidden" name="version" value={facts.version} />
        <input type="hidden" name="dayZero" value={facts.dayZero} />
        <TextField meta={fields.name} label={t("name")} className="max-w-[420px]" />
        <div className={`mt-5 hidden border-b border-rule pb-1 items-end text-13 text-ink-2 lg:grid ${LINE_COLUMNS}`} aria-hidden="true">
          <span>{t("columns.measure")}</span>
          <span>
            {t("columns.uptake")}
            <span className={`xs dim text-end ${UPTAKE_COLUMNS}`}>
              {PARTS.map((part) => (
                <span key={part}>{t(`uptakePart.${part}`)}</span>
              ))}
            </span>
          </span>
          <span>{t("columns.from")}</span>
          <span>{t("columns.until")}</span>
          <span />
        </div>
        {lines.map(({ row, line }, index) => (
          <PackageLine
            key={row.key}
            line={line}
            name={measureOf.get(String(line.measureId.initialValue ?? ""))?.name ?? ""}
            dayZero={facts.dayZero}
            readOnly={readOnly}
            again={form.insert.getButtonProps({ name: fields.lines.name, index: index + 1, defaultValue: { measureId: String(line.measureId.initialValue ?? ""), included: "on", uptakePercent: { low: "", central: "100", high: "" }, from: "", until: "", never: "" } })}
          />
        ))}
        {readOnly ? null : (
          <div className="mt-5">
            <SubmitButton busy={t("saving")}>{t("save")}</SubmitButton>
          </div>
        )}
      </fieldset>
    </form>
  );
}

type LineFields = Parameters<typeof PackageLine>[0]["line"];

/** Whose line a message is about: every field of a line is known by its measure. */
function namesOf(line: LineFields, measure: string): [string, string][] {
  const uptake = line.uptakePercent.getFieldset();
  return [uptake.low, uptake.central, uptake.high, line.from, line.until].map(({ name }) => [name, measure]);
}
