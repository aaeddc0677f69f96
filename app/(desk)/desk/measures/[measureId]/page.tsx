import type { Metadata } from "next";
import { notFound } from "next/navigation";
import { getTranslations } from "next-intl/server";
import { requireStaff } from "@/app/(desk)/_lib/session";
import { Note, PageHead, Section } from "@/components/desk/page-parts";
import { StaffCaution } from "@/components/desk/staff-caution";
import { can } from "@/lib/auth/permissions";
import { env } from "@/lib/env";
import { getMeasure } from "@/lib/measures/queries";
import { measureFacts } from "../_facts";
import { ArchiveForm, MeasureForm } from "../_measure-form";

export const metadata: Metadata = { title: "Measure" };

type Props = { params: Promise<{ measureId: string }>; searchParams: Promise<{ saved?: string }> };

export default async function MeasurePage({ params, searchParams }: Props) {
  const actor = await requireStaff();
  const { measureId } = await params;
  const measure = await getMeasure(measureId).catch(() => notFound());
  const { saved } = await searchParams;
  const t = await getTranslations("Measures");
  const readOnly = !can(actor.role, "measure:write");
  return (
    <main id="main" className="wrap">
      <PageHead title={t("editTitle", { name: measure.name })} lede={t("lede2")} />
      {saved ? (
        <div className="mt-4" role="status">
          <Note tone="ok">{t("saved")}</Note>
        </div>
      ) : null}
      {measure.archived ? (
        <div className="mt-4">
          <Note tone="look">{t("archivedNote")}</Note>
        </div>
      ) : null}
      <MeasureForm key={measure.version} facts={measureFacts(measure)} readOnly={readOnly} />
      {readOnly ? null : (
        <Section title={t("catalogue")}>
          <ArchiveForm id={measure.id} archived={measure.archived} />
        </Section>
      )}
      <StaffCaution demonstration={env().demo} />
    </main>
  );
}
