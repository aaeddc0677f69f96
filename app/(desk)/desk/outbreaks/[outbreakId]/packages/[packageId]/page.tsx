import type { Metadata } from "next";
import Link from "next/link";
import { notFound } from "next/navigation";
import { getFormatter, getTranslations } from "next-intl/server";
import { requireStaff } from "@/app/(desk)/_lib/session";
import { StageLine } from "@/app/(desk)/_lib/stage-line";
import { Note, PageHead, Section } from "@/components/desk/page-parts";
import { StaffCaution } from "@/components/desk/staff-caution";
import { ButtonLink } from "@/components/ui/button";
import { CheckMark, EnoughMark, PackageTile } from "@/components/ui/marks";
import { can } from "@/lib/auth/permissions";
import { central } from "@/lib/engine";
import { env } from "@/lib/env";
import { listMeasures, listMeasuresById, type Measure } from "@/lib/measures/queries";
import { getOutbreak, type Outbreak } from "@/lib/outbreaks/queries";
import { readOut } from "@/lib/outbreaks/read-out";
import { dateOf } from "@/lib/packages/days";
import { phaseFactors } from "@/lib/packages/phase-factors";
import { getPackage, listPackages, type Package } from "@/lib/packages/queries";
import { checkPackage, type PackageFinding } from "@/lib/packages/rules";
import { CopyPackageForm, DeletePackageForm, type Line, PackageForm } from "../_package-forms";
import { PackageStrip } from "../_package-strip";

export const metadata: Metadata = { title: "Package" };

type Props = { params: Promise<{ outbreakId: string; packageId: string }>; searchParams: Promise<{ saved?: string }> };

export default async function PackagePage({ params, searchParams }: Props) {
  const actor = await requireStaff();
  const { outbreakId, packageId } = await params;
  const [outbreak, row] = await Promise.all([getOutbreak(outbreakId).catch(() => notFound()), getPackage(packageId).catch(() => notFound())]);
  if (row.outbreakId !== outbreakId) notFound();
  const { saved } = await searchParams;
  const [t, format, all, catalogue, held] = await Promise.all([
    getTranslations("Packages"),
    getFormatter(),
    listPackages(outbreakId),
    listMeasures(),
    listMeasuresById(row.items.map(({ measureId }) => measureId)),
  ]);
  const mayWrite = can(actor.role, "package:write");
  const measures = [...catalogue, ...held.filter(({ id }) => catalogue.every((each) => each.id !== id))];
  const findings = checkPackage(row.items, measures);
  return (
    <>
      <StageLine outbreakId={outbreakId} current="packages" />
      <main id="main" className="wrap">
        <PageHead
          title={t("packageTitle", { letter: row.letter, name: row.name })}
          actions={
            <>
              {mayWrite ? <CopyPackageForm outbreakId={outbreakId} id={row.id} letter={row.letter} name={row.name} /> : null}
              {can(actor.role, "assessment:write") ? (
                <ButtonLink look="primary" href={`/desk/assessments/new?outbreak=${outbreakId}`}>
                  {t("compare")}
                </ButtonLink>
              ) : null}
            </>
          }
        />
        <nav className="tabs mt-4" aria-label={t("title")}>
          {all.map((each) => (
            <Link key={each.id} href={`/desk/outbreaks/${outbreakId}/packages/${each.id}`} aria-current={each.id === row.id ? "page" : undefined}>
              <PackageTile letter={each.letter} />
              {each.name}
            </Link>
          ))}
        </nav>
        {saved ? (
          <div className="mt-4" role="status">
            <Note tone="ok">{t("saved")}</Note>
          </div>
        ) : null}
        <Section title={t("schedule")} note={t("scheduleNote")}>
          <PackageStrip row={row} dayZero={outbreak.dayZero} />
        </Section>
        <Section title={t("lines")} note={t("linesNote")}>
          <PackageForm key={row.version} readOnly={!mayWrite} facts={{ id: row.id, version: row.version, name: row.name, lines: linesOf(row, measures, outbreak.dayZero) }} />
        </Section>
        <Section title={t("phases")} note={t("phasesNote")}>
          <Phases outbreak={outbreak} row={row} measures={measures} />
        </Section>
        <Section title={t("checks")}>
          <ul className="chk max-w-[720px]">
            {findings.map((finding, index) => (
              <li key={index}>
                <CheckMark state={finding.level} />
                <span>{sentence(t, finding)}</span>
              </li>
            ))}
          </ul>
        </Section>
        {mayWrite ? <DeletePackageForm id={row.id} letter={row.letter} /> : null}
        <StaffCaution demonstration={env().demo} />
      </main>
    </>
  );

  async function Phases(props: { outbreak: Outbreak; row: Package; measures: Measure[] }) {
    const { profile } = props.outbreak;
    const out =
      profile &&
      readOut({
        population: props.outbreak.populationPersons,
        infectious: profile.infectious.central,
        removed: profile.removed.central,
        exposed: profile.latentPeriodDays ? (profile.exposed?.central ?? null) : 0,
        given: profile.transmission.given,
        value: profile.transmission.value.central,
        infectiousPeriodDays: profile.infectiousPeriodDays.central,
        latentPeriodDays: profile.latentPeriodDays?.central ?? null,
      });
    if (!out) return <p className="mut">{t("noProfile")}</p>;
    const n = (value: number) => format.number(value, { minimumFractionDigits: 2, maximumFractionDigits: 2 });
    return (
      <table className="head max-w-[820px]">
        <thead>
          <tr>
            <th scope="col">{t("phaseFrom")}</th>
            <th scope="col" className="r">
              {t("phaseR")}
            </th>
            <th scope="col" className="r">
              {t("phaseB")}
            </th>
            <th scope="col">{t("phaseWhat")}</th>
          </tr>
        </thead>
        <tbody>
          {phaseFactors(props.row.items, props.measures).map(({ fromDay, factor, names }) => {
            const b = out.thresholdRatio / factor;
            return (
              <tr key={fromDay}>
                <th scope="row">{format.dateTime(new Date(`${dateOf(props.outbreak.dayZero, fromDay)}T00:00:00Z`), { day: "numeric", month: "short", year: "numeric" })}</th>
                <td className="r">{n(1 / b)}</td>
                <td className="r">
                  <b>{n(b)}</b>
                </td>
                <td>
                  <span className="st whitespace-normal">
                    <EnoughMark state={b >= 1 ? "above" : "below"} />
                    <span className="sr-only">{b >= 1 ? t("above") : t("below")}</span>
                    {names.length ? names.join(", ") : t("phaseNone")}
                  </span>
                </td>
              </tr>
            );
          })}
        </tbody>
      </table>
    );
  }
}

type Translate = Awaited<ReturnType<typeof getTranslations<"Packages">>>;

function sentence(t: Translate, finding: PackageFinding): string {
  switch (finding.code) {
    case "ladder":
      return t("finding.ladder", { measure: finding.measure, other: finding.other });
    case "overlap":
      return t("finding.overlap", { measure: finding.measure });
    case "leadTime":
      return t("finding.leadTime", { measure: finding.measure, days: finding.days });
    case "tooLong":
      return t("finding.tooLong", { measure: finding.measure, days: finding.days, allowed: finding.allowed, within: finding.within ?? 0 });
    case "noEnd":
      return t("finding.noEnd", { measure: finding.measure, allowed: finding.allowed });
    default:
      return t(`finding.${finding.code}`);
  }
}

/** One line per measure of the catalogue, those of the package filled in; a measure that stands twice has two lines. */
function linesOf(row: Package, measures: readonly Measure[], dayZero: string): Line[] {
  const percent = (value: number) => String(Number((value * 100).toPrecision(12)));
  return measures.flatMap((measure): Line[] => {
    const own = row.items.filter(({ measureId }) => measureId === measure.id);
    const blank = { measureId: measure.id, name: measure.name, included: false, uptakePercent: "100", from: "", until: "", never: false };
    return own.length === 0
      ? [blank]
      : own.map((item) => ({
          ...blank,
          included: true,
          uptakePercent: percent(central(item.uptake)),
          from: dateOf(dayZero, item.startDay),
          until: item.endDay === null ? "" : dateOf(dayZero, item.endDay - 1),
          never: item.endDay === null,
        }));
  });
}
