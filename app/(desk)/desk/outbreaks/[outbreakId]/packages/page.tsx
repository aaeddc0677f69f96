import type { Metadata } from "next";
import Link from "next/link";
import { notFound } from "next/navigation";
import { getTranslations } from "next-intl/server";
import { requireStaff } from "@/app/(desk)/_lib/session";
import { StageLine } from "@/app/(desk)/_lib/stage-line";
import { EmptyState, PageHead, Section } from "@/components/desk/page-parts";
import { StaffCaution } from "@/components/desk/staff-caution";
import { ButtonLink } from "@/components/ui/button";
import { PackageTile } from "@/components/ui/marks";
import { can } from "@/lib/auth/permissions";
import { stripLastDay } from "@/lib/charts/schedule-strip";
import { env } from "@/lib/env";
import { listMeasures, listMeasuresById } from "@/lib/measures/queries";
import { getOutbreak } from "@/lib/outbreaks/queries";
import { daysLeft } from "@/lib/packages/legal-findings";
import { listPackages, type Package } from "@/lib/packages/queries";
import { PackageStrip, type StripLine } from "./_package-strip";
import { NewPackageForm } from "./_package-forms";

export const metadata: Metadata = { title: "Packages" };

export default async function PackagesPage({ params }: { params: Promise<{ outbreakId: string }> }) {
  const actor = await requireStaff();
  const { outbreakId } = await params;
  const outbreak = await getOutbreak(outbreakId).catch(() => notFound());
  const [t, rows, measures] = await Promise.all([getTranslations("Packages"), listPackages(outbreakId), listMeasures()]);
  const held = new Map((await listMeasuresById(rows.flatMap(({ items }) => items.map(({ measureId }) => measureId)))).map((measure) => [measure.id, measure]));
  const linesOf = ({ items }: Package) =>
    items.map(({ measureId, startDay, endDay }, index): StripLine => {
      const { name = "", leadTimeDays = 0, maxDays = null, daysUsed = null } = held.get(measureId) ?? {};
      return { key: `${measureId}-${index}`, index, name, startDay, endDay, leadTimeDays, maxDays: daysLeft(maxDays, daysUsed) };
    });
  const last = stripLastDay(rows.flatMap(linesOf));
  const mayWrite = can(actor.role, "package:write");
  return (
    <>
      <StageLine outbreakId={outbreakId} current="packages" />
      <main id="main" className="wrap">
        <PageHead
          title={t("title")}
          lede={t("lede", { count: rows.length })}
          actions={
            rows.length > 0 && can(actor.role, "assessment:write") ? (
              <ButtonLink look="primary" href={`/desk/assessments/new?outbreak=${outbreakId}`}>
                {t("compare")}
              </ButtonLink>
            ) : null
          }
        />
        {measures.length === 0 ? (
          <EmptyState title={t("noMeasures")} action={<ButtonLink href="/desk/measures">{t("toMeasures")}</ButtonLink>} />
        ) : rows.length === 0 ? (
          <EmptyState title={t("empty")}>{t("emptyText")}</EmptyState>
        ) : (
          rows.map((row) => (
            <Section
              key={row.id}
              title={
                <span className="flex items-center gap-2">
                  <PackageTile letter={row.letter} />
                  <Link className="q" href={`/desk/outbreaks/${outbreakId}/packages/${row.id}`}>
                    {row.name}
                  </Link>
                </span>
              }
            >
              <PackageStrip
                letter={row.letter}
                dayZero={outbreak.dayZero}
                lines={linesOf(row)}
                last={last}
              />
            </Section>
          ))
        )}
        {mayWrite && rows.length < 8 ? (
          <Section id="new" title={t("newPackage")}>
            <NewPackageForm outbreakId={outbreakId} />
          </Section>
        ) : null}
        <StaffCaution demonstration={env().demo} />
      </main>
    </>
  );
}
