import type { Metadata } from "next";
import Link from "next/link";
import { notFound } from "next/navigation";
import { getLocale, getTranslations } from "next-intl/server";
import { chartWords } from "@/app/(desk)/_lib/assessment-words";
import { requireStaff } from "@/app/(desk)/_lib/session";
import { StageLine } from "@/app/(desk)/_lib/stage-line";
import { Note, PageHead } from "@/components/desk/page-parts";
import { StaffCaution } from "@/components/desk/staff-caution";
import { ButtonLink } from "@/components/ui/button";
import { PackageTile } from "@/components/ui/marks";
import { can } from "@/lib/auth/permissions";
import { central } from "@/lib/engine";
import { env } from "@/lib/env";
import { formatShortDay } from "@/lib/figures/format";
import { type Locale, numberLocale } from "@/lib/i18n/locales";
import { listMeasures, listMeasuresById, type Measure } from "@/lib/measures/queries";
import { getOutbreak } from "@/lib/outbreaks/queries";
import { dateOf } from "@/lib/packages/days";
import { daysLeft } from "@/lib/packages/legal-findings";
import { getPackage, listPackages, type Package } from "@/lib/packages/queries";
import { checkPackage } from "@/lib/packages/rules";
import { CopyPackageForm, DeletePackageForm } from "../_package-forms";
import { type Line, PackageForm } from "../_package-form";
import { Findings } from "./_findings";
import { PackageFigures, PackageLadder } from "./_package-figures";
import { packageResult } from "./_package-result";
import { PhaseRatios } from "./_phases";

type Props = { params: Promise<{ outbreakId: string; packageId: string }>; searchParams: Promise<{ saved?: string }> };

export async function generateMetadata({ params }: Props): Promise<Metadata> {
  await requireStaff();
  const { letter, name } = await getPackage((await params).packageId).catch(() => notFound());
  return { title: (await getTranslations("Packages"))("packageTitle", { letter, name }) };
}

export default async function PackagePage({ params, searchParams }: Props) {
  const actor = await requireStaff();
  const { outbreakId, packageId } = await params;
  const [outbreak, row] = await Promise.all([getOutbreak(outbreakId).catch(() => notFound()), getPackage(packageId).catch(() => notFound())]);
  if (row.outbreakId !== outbreakId) notFound();
  const { saved } = await searchParams;
  const [t, locale, words, all, catalogue, held] = await Promise.all([
    getTranslations("Packages"),
    getLocale(),
    chartWords(),
    listPackages(outbreakId),
    listMeasures(),
    listMeasuresById(row.items.map(({ measureId }) => measureId)),
  ]);
  const mayWrite = can(actor.role, "package:write");
  const measures = [...catalogue, ...held.filter(({ id }) => catalogue.every((each) => each.id !== id))];
  const result = await packageResult(outbreak, row, measures, words);
  const date = (day: number) => formatShortDay(dateOf(outbreak.dayZero, day), numberLocale(locale as Locale), true);
  const { dayZero } = outbreak;
  return (
    <>
      <StageLine outbreakId={outbreakId} current="packages" />
      <main id="main" className="wrap">
        <PageHead
          title={t("packageTitle", { letter: row.letter, name: row.name })}
          actions={
            <>
              {mayWrite && all.length < 8 ? <CopyPackageForm outbreakId={outbreakId} id={row.id} letter={row.letter} name={row.name} /> : null}
              {can(actor.role, "assessment:write") ? (
                <ButtonLink look="primary" href={`/desk/assessments/new?outbreak=${outbreakId}`}>
                  {t("compareCount", { count: all.length })}
                </ButtonLink>
              ) : null}
            </>
          }
        />
        <nav className="tabs mt-3 overflow-x-auto" aria-label={t("title")}>
          {all.map((each) => (
            <Link key={each.id} href={`/desk/outbreaks/${outbreakId}/packages/${each.id}`} aria-current={each.id === row.id ? "page" : undefined}>
              <PackageTile letter={each.letter} />
              {each.name}
            </Link>
          ))}
          {mayWrite && all.length < 8 ? (
            <Link className="!text-tide" href={`/desk/outbreaks/${outbreakId}/packages#new`}>
              {t("newPackage")}
            </Link>
          ) : null}
        </nav>
        {saved ? (
          <div className="mt-4" role="status">
            <Note tone="ok">{t("saved")}</Note>
          </div>
        ) : null}
        <section className="mt-5" aria-labelledby="schedule">
          <h2 id="schedule" className="sr-only">
            {t("schedule")}
          </h2>
          <PackageForm
            key={row.version}
            readOnly={!mayWrite}
            facts={{ id: row.id, version: row.version, letter: row.letter, name: row.name, dayZero, lines: linesOf(row, measures, dayZero) }}
            measures={measures.map(({ id, name, leadTimeDays, maxDays, daysUsed }) => ({ id, name, leadTimeDays, maxDays: daysLeft(maxDays, daysUsed) }))}
          />
        </section>
        <div className="mt-8 grid gap-x-16 gap-y-10 border-t border-hair pt-5 lg:grid-cols-[minmax(0,1fr)_340px]">
          <div className="grid min-w-0 content-start gap-8">
            <section className="min-w-0" aria-labelledby="figures">
              <h2 id="figures" className="!text-[16px] !leading-[23px]">
                {t("phases")}
              </h2>
              {result?.view ? (
                <div className="mt-2 mb-4">
                  <PackageFigures view={result.view} />
                  <p className="how mt-3">{t("figuresNote")}</p>
                </div>
              ) : null}
              {result?.faults ? (
                <div className="my-4">
                  <Note tone="bad">
                    <b>{t("notCalculated")}</b> {result.faults.join(" ")}
                  </Note>
                </div>
              ) : null}
              <PhaseRatios outbreak={outbreak} row={row} measures={measures} view={result?.view ?? null} />
              <p className="how">{t("phasesNote")}</p>
            </section>
            <section aria-labelledby="checks">
              <h2 id="checks" className="mb-1 !text-[16px] !leading-[23px]">
                {t("checks")}
              </h2>
              <Findings findings={checkPackage(row.items, measures)} date={date} />
            </section>
          </div>
          {result?.view ? <PackageLadder view={result.view} letter={row.letter} /> : null}
        </div>
        {mayWrite ? <DeletePackageForm id={row.id} letter={row.letter} /> : null}
        <StaffCaution demonstration={env().demo} />
      </main>
    </>
  );
}

/** The package's own lines first, as they stand; then every other measure of the catalogue, not ticked. */
function linesOf(row: Package, measures: readonly Measure[], dayZero: string): Line[] {
  const percent = (share: number) => String(Number((share * 100).toPrecision(12)));
  const own = row.items.map(({ measureId, uptake, startDay, endDay }): Line => ({
    measureId,
    included: true,
    uptakePercent: typeof uptake === "number" ? { low: "", central: percent(uptake), high: "" } : { low: percent(uptake.low), central: percent(central(uptake)), high: percent(uptake.high) },
    from: dateOf(dayZero, startDay),
    until: endDay === null ? "" : dateOf(dayZero, endDay - 1),
    never: endDay === null,
  }));
  const others = measures.filter(({ id }) => row.items.every(({ measureId }) => measureId !== id));
  return [...own, ...others.map(({ id }): Line => ({ measureId: id, included: false, uptakePercent: { low: "", central: "100", high: "" }, from: "", until: "", never: false }))];
}
