import type { Metadata } from "next";
import { getTranslations } from "next-intl/server";
import { requireStaff } from "@/app/(desk)/_lib/session";
import { PageHead } from "@/components/desk/page-parts";
import { EMPTY_MEASURE } from "../_facts";
import { MeasureForm } from "../_measure-form";

export const metadata: Metadata = { title: "New measure" };

export default async function NewMeasurePage() {
  await requireStaff("measure:write");
  const t = await getTranslations("Measures");
  return (
    <main id="main" className="wrap">
      <PageHead title={t("newTitle")} lede={t("lede2")} />
      <MeasureForm facts={EMPTY_MEASURE} />
    </main>
  );
}
