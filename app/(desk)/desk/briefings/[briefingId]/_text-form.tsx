"use client";
import { getFormProps, getTextareaProps, useForm } from "@conform-to/react";
import { useTranslations } from "next-intl";
import { Fragment, useActionState } from "react";
import { ErrorSummary } from "@/components/forms/error-summary";
import { SubmitButton } from "@/components/forms/submit-button";
import { PART_KEYS, type PartKey } from "@/lib/briefings/constants";
import { piecesOfText } from "@/lib/figures/tokens";
import type { Locale } from "@/lib/i18n/locales";
import { saveTextAction } from "../_actions";

export type Pair = { id: string; part: PartKey; source: string; text: string; stale: boolean };
type Props = {
  briefingId: string;
  version: number;
  locale: Locale;
  dir: "ltr" | "rtl";
  language: string;
  sourceLanguage: string;
  isSource: boolean;
  title: { source: string; text: string; stale: boolean };
  pairs: Pair[];
  /** What each token shows in the language being written, and in the source. */
  shown: Record<string, string>;
  sourceShown: Record<string, string>;
  readOnly: boolean;
};

/** Text with its tokens as residents will read them, each marked with its reference. */
function Filled({ text, shown }: { text: string; shown: Record<string, string> }) {
  return piecesOfText(text).map((piece, index) =>
    piece.kind === "text" ? (
      <Fragment key={index}>{piece.text}</Fragment>
    ) : (
      <span key={index} className={`bound${shown[piece.token] === undefined ? " bad" : ""}`}>
        {shown[piece.token] ?? piece.token}
        <sup>{piece.token}</sup>
      </span>
    ),
  );
}

/** One language: in the source language the text alone, in a translation pair by pair beside its source. */
export function TextForm(props: Props) {
  const { locale, dir, isSource, pairs, shown, sourceShown, readOnly } = props;
  const t = useTranslations("Briefings");
  const parts = useTranslations("Article.parts");
  const forms = useTranslations("Forms");
  const [lastResult, action] = useActionState(saveTextAction, undefined);
  const rows: Pair[] = isSource ? PART_KEYS.filter((part) => part !== "whatToDo").flatMap((part) => [...pairs.filter((pair) => pair.part === part), { id: "new", part, source: "", text: "", stale: false }]) : pairs;
  const [form, fields] = useForm<{ title: string; paragraphs: { id: string; part: string; text: string }[] }, string[]>({
    id: `text-${locale}`,
    lastResult: lastResult ?? null,
    defaultValue: { title: props.title.text, paragraphs: rows.map(({ id, part, text }) => ({ id, part, text })) },
  });
  const list = fields.paragraphs.getFieldList();
  const numbered = new Map(pairs.map(({ id }, index) => [id, index + 1]));
  const title = getTextareaProps(fields.title);
  const columns = isSource ? "" : "lg:grid-cols-2";
  return (
    <form {...getFormProps(form)} action={action}>
      <fieldset disabled={readOnly} className="min-w-0">
        <ErrorSummary form={form} title={forms("summary")} names={{ title: t("titleField") }} />
        <input type="hidden" name="briefingId" value={props.briefingId} />
        <input type="hidden" name="version" value={props.version} />
        <input type="hidden" name="locale" value={locale} />
        <div className={`hidden gap-6 text-13 font-semibold lg:grid ${columns}`}>
          {isSource ? <span>{t("sourceColumn", { language: props.sourceLanguage })}</span> : null}
          {isSource ? null : (
            <>
              <span>{t("sourceColumn", { language: props.sourceLanguage })}</span>
              <span>{t("translationColumn", { language: props.language })}</span>
            </>
          )}
        </div>
        <div className={`grid gap-x-6 gap-y-2 border-b border-hair py-4 ${columns}`}>
          {isSource ? null : (
            <p lang="en" dir="ltr" className="bf font-semibold">
              <Filled text={props.title.source} shown={sourceShown} />
            </p>
          )}
          <div>
            <label htmlFor={title.id}>{t("titleField")}</label>
            <textarea {...title} key={fields.title.key} rows={2} lang={locale} dir={dir} className={`inp text-17 font-semibold${fields.title.errors?.length ? " err" : ""}`} />
            <Stale shown={props.title.stale && !isSource} name="titleCurrent" />
          </div>
        </div>
        {list.map((field, index) => {
          const row = rows[index];
          if (!row) return null;
          const set = field.getFieldset();
          const { key, ...area } = getTextareaProps(set.text);
          const first = index === 0 || rows[index - 1]?.part !== row.part;
          const number = numbered.get(row.id);
          const name = number ? t("paragraph", { number: String(number) }) : t("newParagraph", { part: parts(row.part) });
          return (
            <Fragment key={field.key}>
              {first ? <h2 className="mt-5 text-13 text-ink-2">{parts(row.part)}</h2> : null}
              <div id={`p${number ?? ""}`} className={`grid gap-x-6 gap-y-2 border-b border-hair py-3 ${columns} ${row.stale ? "border-s-3 border-s-brass ps-3" : ""}`}>
                {isSource ? null : (
                  <p lang="en" dir="ltr" className="bf">
                    <span className="sm dim me-2">{number}</span>
                    <Filled text={row.source} shown={sourceShown} />
                  </p>
                )}
                <div>
                  <input type="hidden" name={set.id.name} value={row.id} />
                  <input type="hidden" name={set.part.name} value={row.part} />
                  <label htmlFor={area.id} className="font-normal text-ink-2">
                    {name}
                  </label>
                  <textarea key={key} {...area} rows={number ? 3 : 1} lang={locale} dir={dir} className={`inp text-17 leading-[28px]${set.text.errors?.length ? " err" : ""}`} />
                  {number && row.text ? (
                    <p lang={locale} dir={dir} className="bf mt-1 text-15 text-ink-2">
                      <Filled text={row.text} shown={shown} />
                    </p>
                  ) : null}
                  <Stale shown={row.stale && !isSource} name={`paragraphs[${index}].current`} />
                </div>
              </div>
            </Fragment>
          );
        })}
        {isSource ? <p className="how">{t("removeHint")}</p> : null}
        {readOnly ? null : (
          <div className="mt-5">
            <SubmitButton busy={t("saving")}>{t("save", { language: props.language })}</SubmitButton>
          </div>
        )}
      </fieldset>
    </form>
  );
}

function Stale({ shown, name }: { shown: boolean; name: string }) {
  const t = useTranslations("Briefings");
  if (!shown) return null;
  return (
    <div className="mt-1 text-13 text-brass">
      <p>{t("stale")}</p>
      <label className="flex min-h-11 items-center gap-2 font-normal">
        <input type="checkbox" name={name} />
        {t("current")}
      </label>
    </div>
  );
}
