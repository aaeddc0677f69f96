import { getLocale, getTranslations } from "next-intl/server";
import { Section } from "@/components/desk/page-parts";
import { ScrollFrame } from "@/components/ui/scroll-frame";
import { objectHashOf } from "@/lib/assessments/object-hash";
import type { FrozenAssessment } from "@/lib/assessments/queries";
import type { MeasureSnapshot } from "@/lib/assessments/snapshot";
import { formatDay, formatTime } from "@/lib/i18n/dates";
import type { Locale } from "@/lib/i18n/locales";

/** Day and time of an act, with the zone. */
export const momentOf = (at: Date, locale: Locale): string => `${formatDay(at.toISOString(), locale)}, ${formatTime(at.toISOString())}`;

/** The record: who, when, why, the hashes, the files. */
export async function FrozenRecord({ frozen }: { frozen: FrozenAssessment }) {
  const [t, locale] = await Promise.all([getTranslations("Assessments.frozen"), getLocale()]);
  const at = momentOf(frozen.frozenAt, locale as Locale);
  const base = `/desk/assessments/${frozen.assessmentId}`;
  const hash = (value: string) => <code className="text-[13px] break-all">{value}</code>;
  const facts = [
    [t("by"), frozen.frozenBy.name],
    [t("at"), <time key="at" dateTime={frozen.frozenAt.toISOString()}>{at}</time>],
    [t("reason"), frozen.reason],
    [t("engine"), frozen.engineVersion],
    [t("inputHash"), hash(frozen.inputHash)],
    [t("resultHash"), hash(frozen.resultHash)],
    [t("contextHash"), hash(frozen.contextHash)],
    [t("objectHash"), hash(objectHashOf(frozen))],
  ] as const;
  return (
    <Section id="record" title={t("title")} note={t("titleNote")}>
      <dl className="max-w-[60rem]">
        {facts.map(([name, value]) => (
          <div key={name} className="grid gap-x-6 border-b border-hair py-2 md:grid-cols-[200px_minmax(0,1fr)]">
            <dt className="mut sm">{name}</dt>
            <dd>{value}</dd>
          </div>
        ))}
      </dl>
      <p className="mt-4 flex flex-wrap gap-x-6 gap-y-2 print:hidden">
        <span>{t("download")}</span>
        {(["input", "result", "context"] as const).map((file) => (
          <a key={file} href={`${base}/${file}.json`} download>
            {t(file)}
          </a>
        ))}
      </p>
      <p className="hint mt-2">{t("recompute")}</p>
    </Section>
  );
}

/** Legal basis, evidence and limits as they stood on the day of freezing. */
export async function FrozenMeasures({ measures }: { measures: MeasureSnapshot[] }) {
  const t = await getTranslations("Assessments.frozen");
  const limits = ({ limits: l }: MeasureSnapshot) =>
    [
      l.maxDays === null ? t("limitNone") : l.maxDaysWithin === null ? t("limitDays", { days: l.maxDays }) : t("limitWithin", { days: l.maxDays, within: l.maxDaysWithin }),
      ...(l.daysUsed ? [t("limitUsed", { days: l.daysUsed })] : []),
      ...(l.reviewEveryDays ? [t("limitReview", { days: l.reviewEveryDays })] : []),
    ].join("; ");
  return (
    <Section title={t("measures")} note={t("measuresNote")}>
      <ScrollFrame label={t("measures")}>
        <table className="head min-w-[720px]">
          <thead>
            <tr>
              <th scope="col">{t("measure")}</th>
              <th scope="col">{t("legalBasis")}</th>
              <th scope="col">{t("limits")}</th>
              <th scope="col">{t("evidence")}</th>
            </tr>
          </thead>
          <tbody>
            {measures.map((measure) => (
              <tr key={measure.code}>
                <th scope="row">{measure.name}</th>
                <td className="sm">
                  {measure.legalBasis || <span className="text-brass">{t("noBasis")}</span>}
                  {/^https?:\/\/[^/]/.test(measure.legalLink) ? (
                    <>
                      {" "}
                      <a href={measure.legalLink} rel="noreferrer">
                        {measure.legalLink.split("/")[2]}
                      </a>
                    </>
                  ) : null}
                </td>
                <td className="sm">{limits(measure)}</td>
                <td className="sm">{measure.evidence || measure.cutSource}</td>
              </tr>
            ))}
          </tbody>
        </table>
      </ScrollFrame>
    </Section>
  );
}
