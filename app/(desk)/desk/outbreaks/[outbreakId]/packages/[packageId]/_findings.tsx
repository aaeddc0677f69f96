import { useTranslations } from "next-intl";
import type { ReactNode } from "react";
import { CheckMark } from "@/components/ui/marks";
import type { PackageFinding } from "@/lib/packages/rules";

/** What the checks say, each with what follows from it. @param date writes a day from day 0 as a date */
export function Findings({ findings, date }: { findings: readonly PackageFinding[]; date: (day: number) => string }) {
  const t = useTranslations("Packages.finding");
  const level = useTranslations("Packages.level");
  const words = (finding: PackageFinding): { main: ReactNode; more?: ReactNode } => {
    switch (finding.code) {
      case "ladder":
        return { main: t("ladder", { measure: finding.measure, other: finding.other }), more: t("stopsMore") };
      case "overlap":
        return { main: t("overlap", { measure: finding.measure }), more: t("stopsMore") };
      case "leadTime":
        return { main: t("leadTime", { measure: finding.measure, days: finding.days }), more: t("leadTimeMore", { date: date(finding.days) }) };
      case "tooLong":
        return { main: t("tooLong", { measure: finding.measure, days: finding.days, allowed: finding.allowed, within: finding.within ?? 0 }), more: t("unlawfulMore") };
      case "noEnd":
        return { main: t("noEnd", { measure: finding.measure, allowed: finding.allowed }), more: t("unlawfulMore") };
      case "nearLimit":
        return {
          main: t("nearLimit", { measure: finding.measure, days: finding.days, allowed: finding.allowed, within: finding.within ?? 0 }),
          more: t("nearLimitMore", { date: date(finding.lastDay), law: finding.legalBasis || "none" }),
        };
      case "review":
        return { main: t("review", { measure: finding.measure, every: finding.every }), more: t("reviewMore", { dates: finding.dueDays.map(date).join(", ") }) };
      default:
        return { main: t(finding.code) };
    }
  };
  return (
    <ul className="chk">
      {findings.map((finding, index) => {
        const { main, more } = words(finding);
        return (
          <li key={index}>
            <CheckMark state={finding.level} />
            <span>
              <span className="sr-only">{level(finding.level)}</span> {main}
              {more ? <span className="sm mut block">{more}</span> : null}
            </span>
          </li>
        );
      })}
    </ul>
  );
}
