"use client";
import { getFormProps, useForm } from "@conform-to/react";
import { useTranslations } from "next-intl";
import { useActionState } from "react";
import { ErrorSummary } from "@/components/forms/error-summary";
import { TextAreaField } from "@/components/forms/field";
import { CHECKLIST_ITEMS } from "@/lib/briefings/constants";
import { reviewBriefingAction } from "../../_actions";

type Item = { answer: string; note: string };
type Facts = { briefingId: string; versionId: string; decision: string; comment: string; items: Record<string, Item> };
const ANSWERS = ["pass", "fail", "notApplicable"] as const;

/** Eighteen questions, a comment, and two buttons: sign exactly this version, or return it. */
export function ReviewForm({ briefingId, versionId, version, statement }: { briefingId: string; versionId: string; version: number; statement: string }) {
  const t = useTranslations("Review");
  const [lastResult, action] = useActionState(reviewBriefingAction, undefined);
  const [form, fields] = useForm<Facts, string[]>({ id: "review", lastResult: lastResult ?? null, defaultValue: { comment: "", items: {} } });
  const given = (n: number) => (form.initialValue?.items as Record<string, Partial<Item> | undefined> | undefined)?.[`i${n}`];
  return (
    <form {...getFormProps(form)} action={action}>
      <ErrorSummary form={form} title={t("summary")} names={{ comment: t("comment") }} />
      <input type="hidden" name="briefingId" value={briefingId} />
      <input type="hidden" name="versionId" value={versionId} />
      <div className="grid items-start gap-x-10 gap-y-8 xl:grid-cols-[minmax(0,1fr)_360px]">
        <ol>
          {CHECKLIST_ITEMS.map((n) => (
            <li key={n} className="border-b border-hair py-2">
              <fieldset className="grid items-center gap-x-6 gap-y-1 lg:grid-cols-[minmax(0,1fr)_auto]">
                <legend className="sr-only">{t(`items.i${n as 1}`)}</legend>
                <p aria-hidden="true">
                  <span className="dim me-3">{n}</span>
                  {t(`items.i${n as 1}`)}
                </p>
                <div className="flex flex-wrap gap-x-4">
                  {ANSWERS.map((answer) => (
                    <label key={answer} className="mb-0 flex min-h-11 items-center gap-2 font-normal">
                      <input type="radio" name={`items.i${n}.answer`} value={answer} defaultChecked={given(n)?.answer === answer} />
                      {t(`answers.${answer}`)}
                    </label>
                  ))}
                </div>
                <details className="lg:col-span-2" open={Boolean(given(n)?.note)}>
                  <summary className="cursor-pointer text-13 text-ink-2">{t("note")}</summary>
                  <label className="sr-only" htmlFor={`note-${n}`}>{`${t("note")}: ${t(`items.i${n as 1}`)}`}</label>
                  <input id={`note-${n}`} name={`items.i${n}.note`} defaultValue={given(n)?.note ?? ""} className="inp" autoComplete="off" maxLength={1000} />
                </details>
              </fieldset>
            </li>
          ))}
        </ol>
        <div className="sheet grid min-w-0 gap-4">
          <h2>{t("signOff")}</h2>
          <p className="sm [overflow-wrap:anywhere]">{statement}</p>
          <TextAreaField meta={fields.comment} label={t("comment")} rows={4} />
          <div className="flex flex-wrap gap-3">
            <button type="submit" name="decision" value="sign" className="btn pri">
              {t("sign", { version: String(version) })}
            </button>
            <button type="submit" name="decision" value="return" className="btn">
              {t("return")}
            </button>
          </div>
        </div>
      </div>
    </form>
  );
}
