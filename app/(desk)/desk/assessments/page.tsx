import type { Metadata } from "next";
import Link from "next/link";
import { getLocale, getTranslations } from "next-intl/server";
import { EmptyState, PageHead } from "@/components/desk/page-parts";
import { ButtonLink } from "@/components/ui/button";
import { PackageTile, StateMark } from "@/components/ui/marks";
import { ScrollFrame } from "@/components/ui/scroll-frame";
import { listAssessments } from "@/lib/assessments/queries";
import { can } from "@/lib/auth/permissions";
import { formatShortDay } from "@/lib/figures/format";
import { type Locale, numberLocale } from "@/lib/i18n/locales";
import { requireStaff } from "../../_lib/session";
import { StageLine } from "../../_lib/stage-line";

export async function generateMetadata(): Promise<Metadata> {
  return { title: (await getTranslations("Assessments"))("list.title") };
}

export default async function AssessmentsPage({ searchParams }: { searchParams: Promise<{ outbreak?: string }> }) {
  const actor = await requireStaff();
  const { outbreak } = await searchParams;
  const rows = await listAssessments(outbreak);
  const [t, locale] = await Promise.all([getTranslations("Assessments"), getLocale()]);
  const day = (date: Date) => formatShortDay(date.toISOString().slice(0, 10), numberLocale(locale as Locale), true);
  const mayWrite = can(actor.role, "assessment:write");
  return (
    <>
      {outbreak && rows[0] ? <StageLine outbreakId={rows[0].outbreakId} current="assessment" /> : null}
      <main id="main" className="wrap">
        <PageHead
          title={t("list.title")}
          lede={t("list.lede", { count: rows.length })}
          actions={mayWrite && rows.length > 0 ? <ButtonLink look="primary" href={`/desk/assessments/new${outbreak ? `?outbreak=${encodeURIComponent(outbreak)}` : ""}`}>{t("list.new")}</ButtonLink> : null}
        />
        {rows.length === 0 ? (
          <div className="mt-6">
            <EmptyState title={t("list.empty")} action={mayWrite ? <ButtonLink look="primary" href={outbreak ? `/desk/assessments/new?outbreak=${encodeURIComponent(outbreak)}` : "/desk/outbreaks"}>{outbreak ? t("list.new") : t("list.emptyAction")}</ButtonLink> : null}>
              {t("list.emptyText")}
            </EmptyState>
          </div>
        ) : (
          <ScrollFrame label={t("list.title")} className="mt-6">
            <table className="head min-w-[640px]">
              <thead>
                <tr>
                  <th scope="col">{t("list.number")}</th>
                  <th scope="col">{t("list.assessment")}</th>
                  <th scope="col">{t("list.outbreak")}</th>
                  <th scope="col">{t("list.packages")}</th>
                  <th scope="col">{t("list.state")}</th>
                  <th scope="col">{t("list.changed")}</th>
                </tr>
              </thead>
              <tbody>
                {rows.map((row) => (
                  <tr key={row.id}>
                    <td className="num">{row.number}</td>
                    <th scope="row">
                      <Link href={`/desk/assessments/${row.id}`}>{row.title}</Link>
                    </th>
                    <td>{t("list.ofOutbreak", { name: row.outbreakName, place: row.outbreakPlace })}</td>
                    <td>
                      <span className="flex gap-1">
                        {row.packageLetters.map((letter) => (
                          <PackageTile key={letter} letter={letter} />
                        ))}
                      </span>
                    </td>
                    <td>
                      <span className="st">
                        <StateMark level={row.frozenAt ? "full" : "half"} />
                        {row.frozenAt ? t("list.frozen", { date: day(row.frozenAt) }) : t("list.working")}
                      </span>
                    </td>
                    <td className="num">{day(row.updatedAt)}</td>
                  </tr>
                ))}
              </tbody>
            </table>
          </ScrollFrame>
        )}
      </main>
    </>
  );
}
