import type { Metadata } from "next";
import Link from "next/link";
import { notFound } from "next/navigation";
import { getLocale, getTranslations } from "next-intl/server";
import { AssessmentResultView } from "@/components/assessments/assessment-result";
import { FindingLede } from "@/components/assessments/finding-lede";
import { Note, PageHead } from "@/components/desk/page-parts";
import { StaffCaution } from "@/components/desk/staff-caution";
import { ButtonLink } from "@/components/ui/button";
import { HORIZON_DAYS_DEFAULT } from "@/lib/assessments/constants";
import { findFrozen, type FrozenAssessment, getAssessment } from "@/lib/assessments/queries";
import { buildView } from "@/lib/assessments/view";
import { can } from "@/lib/auth/permissions";
import type { Actor } from "@/lib/context";
import { env } from "@/lib/env";
import { DomainError } from "@/lib/errors";
import type { Locale } from "@/lib/i18n/locales";
import { chartWords } from "../../../_lib/assessment-words";
import { requireStaff } from "../../../_lib/session";
import { StageLine } from "../../../_lib/stage-line";
import { PrintButton } from "../_print-button";
import { WorkingAssessment } from "../_working";
import { FrozenMeasures, FrozenRecord, momentOf } from "./_frozen-record";
import { editDefaults, workingState } from "./_working-state";

type Props = { params: Promise<{ assessmentId: string }>; searchParams: Promise<{ saved?: string }> };

async function found(id: string) {
  try {
    return await getAssessment(id);
  } catch (error) {
    if (error instanceof DomainError && error.code === "notFound") notFound();
    throw error;
  }
}

export async function generateMetadata({ params }: Props): Promise<Metadata> {
  await requireStaff();
  const { row } = await found((await params).assessmentId);
  return { title: (await getTranslations("Assessments.page"))("number", { number: row.number }) };
}

export default async function AssessmentPage({ params, searchParams }: Props) {
  const actor = await requireStaff();
  const { assessmentId } = await params;
  const frozen = await findFrozen(assessmentId);
  if (frozen) return <Frozen frozen={frozen} actor={actor} />;
  return <Working id={assessmentId} actor={actor} saved={(await searchParams).saved === "1"} />;
}

async function Frozen({ frozen, actor }: { frozen: FrozenAssessment; actor: Actor }) {
  const [t, locale, words] = await Promise.all([getTranslations("Assessments"), getLocale(), chartWords()]);
  const view = buildView(frozen.input, frozen.result, frozen.context, words);
  return (
    <>
      <StageLine outbreakId={frozen.outbreakId} current="assessment" />
      <main id="main" className="wrap">
        <PageHead
          title={frozen.title}
          actions={
            <>
              <PrintButton label={t("page.print")} />
              {can(actor.role, "assessment:write") ? <ButtonLink href={`/desk/assessments/new?outbreak=${frozen.outbreakId}`}>{t("frozen.copy")}</ButtonLink> : null}
              {can(actor.role, "briefing:write") ? <ButtonLink look="primary" href={`/desk/briefings/new?assessment=${frozen.assessmentId}`}>{t("frozen.brief")}</ButtonLink> : null}
            </>
          }
        />
        <FindingLede finding={view.finding} outbreak={view.outbreak} />
        <div className="mt-5">
          <Note>
            <b>{t("frozen.note", { date: momentOf(frozen.frozenAt, locale as Locale), name: frozen.frozenBy.name })}</b> {t("frozen.nothing")}{" "}
            <a href="#record">{t("frozen.title")}</a>
          </Note>
        </div>
        <div className="mt-6">
          <AssessmentResultView view={view} horizonDays={frozen.input.horizonDays ?? HORIZON_DAYS_DEFAULT} />
        </div>
        <FrozenMeasures measures={frozen.context.measures} />
        <FrozenRecord frozen={frozen} />
        <StaffCaution demonstration={env().demo} />
      </main>
    </>
  );
}

async function Working({ id, actor, saved }: { id: string; actor: Actor; saved: boolean }) {
  const assessment = await found(id);
  const { row, outbreak } = assessment;
  const [t, words] = await Promise.all([getTranslations("Assessments"), chartWords()]);
  const state = await workingState(assessment, words, t);
  const mayWrite = can(actor.role, "assessment:write");
  return (
    <>
      <StageLine outbreakId={row.outbreakId} current="assessment" />
      <main id="main" className="wrap">
        <PageHead
          title={row.title}
          actions={
            <>
              <PrintButton label={t("page.print")} />
              <ButtonLink href={`/desk/outbreaks/${row.outbreakId}/packages`}>{t("page.packages")}</ButtonLink>
              {mayWrite ? (
                <a className="btn pri" href="#freeze-section">
                  {t("page.toFreeze")}
                </a>
              ) : null}
            </>
          }
        />
        {saved ? (
          <div className="mt-4" role="status">
            <Note tone="ok">{t("page.saved")}</Note>
          </div>
        ) : null}
        {state.problem ? (
          <div className="mt-4">
            <Note tone="bad">
              <b>{state.problem.title}</b>
              <ul className="mt-1">
                {state.problem.lines.map((line) => (
                  <li key={line}>{line}</li>
                ))}
              </ul>
            </Note>
          </div>
        ) : null}
        {mayWrite ? (
          <WorkingAssessment
            key={`${row.version} ${assessment.packages.map(({ version }) => version).join(" ")}`}
            id={row.id}
            outbreak={{ dayZero: outbreak.dayZero, currency: outbreak.currency }}
            saved={state.shown}
            {...editDefaults(assessment)}
            freeze={{ id: row.id, version: row.version, reasons: state.reasons, undeliverable: state.undeliverable }}
          />
        ) : (
          <>
            {state.shown ? <FindingLede finding={state.shown.view.finding} outbreak={state.shown.view.outbreak} /> : null}
            <p className="sm mut mt-4">{t("page.readOnly")}</p>
            <div className="mt-6">{state.shown ? <AssessmentResultView {...state.shown} /> : null}</div>
          </>
        )}
        <p className="sm mt-10 print:hidden">
          <Link href={`/desk/assessments?outbreak=${row.outbreakId}`}>{t("page.all")}</Link> · <a href={`/desk/assessments/${row.id}/input.json`} download>{t("frozen.input")}</a>
        </p>
        <StaffCaution demonstration={env().demo} />
      </main>
    </>
  );
}
