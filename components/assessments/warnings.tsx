import { useTranslations } from "next-intl";
import type { AssessmentView } from "@/lib/assessments/view";
import { PackageTile } from "@/components/ui/marks";

/** What the reader must know beside the figures: the engine's warnings, and schedules that the law doesn't allow. */
export function Warnings({ view }: { view: AssessmentView }) {
  const t = useTranslations("Assessments");
  const short = new Map(view.measures.map(({ code, name }) => [code, name]));
  const words = (code: string, message: string) => (t.has(`warnings.${code}` as never) ? t(`warnings.${code}` as never) : message);
  const unlawful = view.packages.flatMap(({ letter, legalFindings }) => legalFindings.map((each) => ({ letter, ...each })));
  // The law's own findings say more than the engine's plain comparison.
  const own = view.result.packages.flatMap(({ id, warnings }) => warnings.filter(({ code }) => code !== "overMaxDays").map((each) => ({ id, ...each })));
  const general = view.result.warnings;
  if (unlawful.length + own.length + general.length === 0) return null;
  return (
    <section aria-label={t("warnings.title")} className="note">
      <b>{t("warnings.title")}</b>
      <ul className="mt-1 grid gap-1">
        {unlawful.map(({ letter, measureCode, kind, days, allowedDays, withinDays }) => (
          <li key={`${letter}${measureCode}`} className="flex items-start gap-2">
            <PackageTile letter={letter} />
            <span>
              {kind === "noEnd"
                ? t("warnings.noEnd", { measure: short.get(measureCode) ?? measureCode, allowed: allowedDays })
                : t("warnings.tooLong", { measure: short.get(measureCode) ?? measureCode, days: days ?? 0, allowed: allowedDays, within: withinDays ?? 0 })}
            </span>
          </li>
        ))}
        {own.map(({ id, code, message }) => (
          <li key={`${id}${code}`} className="flex items-start gap-2">
            <PackageTile letter={id} />
            <span>{words(code, message)}</span>
          </li>
        ))}
        {general.map(({ code, message }) => (
          <li key={code}>{words(code, message)}</li>
        ))}
      </ul>
    </section>
  );
}
