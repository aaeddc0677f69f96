import type { Metadata } from "next";
import Link from "next/link";
import { notFound } from "next/navigation";
import { getTranslations } from "next-intl/server";
import { getDeskFormatter } from "@/lib/i18n/desk-formatter";
import { requireStaff } from "@/app/(desk)/_lib/session";
import { StageLine } from "@/app/(desk)/_lib/stage-line";
import { BriefingArticle } from "@/components/briefings/briefing-article";
import { EmptyState, Note, PageHead, Section } from "@/components/desk/page-parts";
import { StaffCaution } from "@/components/desk/staff-caution";
import { CheckMark } from "@/components/ui/marks";
import { can } from "@/lib/auth/permissions";
import { getWhole, listReviews, listVersions, type WholeBriefing } from "@/lib/briefings/queries";
import { statementOf } from "@/lib/briefings/review-briefing";
import type { VersionContent } from "@/lib/briefings/submit-briefing";
import { canonicalJson } from "@/lib/canonical-json";
import { assessOffThread } from "@/lib/compute/assess-off-thread";
import { env } from "@/lib/env";
import { isFigureKey, readFigure } from "@/lib/figures/catalogue";
import { isLocale, LOCALES } from "@/lib/i18n/locales";
import { Changes } from "./_changes";
import { ReviewForm } from "./_review-form";
import { ScrollFrame } from "@/components/ui/scroll-frame";

export const metadata: Metadata = { title: "Review" };

type Props = { params: Promise<{ briefingId: string }>; searchParams: Promise<{ locale?: string }> };

/** Whether the frozen calculation, done again now, gives the frozen result. */
const recompute = async ({ frozen }: WholeBriefing): Promise<"recomputed" | "differs" | "couldNot"> => {
  try {
    return canonicalJson(await assessOffThread(frozen.input)) === frozen.resultText ? "recomputed" : "differs";
  } catch {
    return "couldNot";
  }
};

export default async function ReviewPage({ params, searchParams }: Props) {
  const actor = await requireStaff();
  const { briefingId } = await params;
  const whole = await getWhole(briefingId).catch(() => notFound());
  const { row, frozen, version, signature } = whole;
  const [t, kinds, format, versions, answers] = await Promise.all([getTranslations("Review"), getTranslations("Briefings"), getDeskFormatter(), listVersions(briefingId), listReviews(briefingId)]);
  const day = (date: Date) => format.dateTime(date, { day: "numeric", month: "short", year: "numeric", hour: "2-digit", minute: "2-digit" });
  const short = (iso: string) => format.dateTime(new Date(`${iso}T00:00:00Z`), { day: "numeric", month: "short", year: "numeric" });
  const shownVersion = versions.find(({ id }) => id === version?.id) ?? versions[0];
  const content = shownVersion ? (JSON.parse(shownVersion.content) as VersionContent) : null;
  const search = await searchParams;
  const locale = isLocale(search.locale) && row.locales.includes(search.locale) ? search.locale : row.sourceLocale;
  const rendered = content?.rendered.find((each) => each.locale === locale);
  const before = versions.find(({ number }) => number < (shownVersion?.number ?? 0));
  const beforeText = before ? (JSON.parse(before.content) as VersionContent).rendered.find((each) => each.locale === locale) : undefined;
  const inReview = row.state === "legalReview" && version !== null;
  const own = version?.authors.includes(actor.id) ?? false;
  return (
    <>
      <StageLine outbreakId={frozen.outbreakId} current="review" />
      <main id="main" className="wrap">
        <PageHead title={t("title", { title: rendered?.title ?? kinds("untitled") })} actions={shownVersion ? <span className="sm mut">{t("version", { version: String(shownVersion.number) })}</span> : null} />
        {!shownVersion || !rendered ? (
          <EmptyState title={t("notSubmitted")}>{t("notSubmittedText")}</EmptyState>
        ) : (
          <>
            {signature ? (
              <div className="mt-4">
                <Note tone="ok">{t("signedNow", { name: signature.reviewerName })}</Note>
              </div>
            ) : null}
            <nav className="tabs mt-4" aria-label={t("languages")}>
              {row.locales.map((code) => (
                <Link key={code} href={`/desk/briefings/${briefingId}/review?locale=${code}`} aria-current={code === locale ? "page" : undefined} lang={code}>
                  {LOCALES[code].name}
                </Link>
              ))}
            </nav>
            <div className="mt-6 grid items-start gap-x-12 gap-y-8 xl:grid-cols-2">
              <section className="min-w-0">
                <h2 className="text-17">{t("text")}</h2>
                <div className="sheet pub mt-2" lang={locale} dir={LOCALES[locale].dir}>
                  <BriefingArticle content={rendered} withCaution />
                </div>
              </section>
              <div className="grid min-w-0 gap-8">
                {before ? (
                  <section>
                    <h2 className="text-17">{t("changes", { version: String(before.number) })}</h2>
                    <div className="mt-2">{beforeText ? <Changes before={beforeText} now={rendered} same={t("same")} /> : null}</div>
                  </section>
                ) : (
                  <p className="sm mut">{t("noChanges")}</p>
                )}
                {await figuresTable()}
                {measuresTable()}
              </div>
            </div>
            {inReview && can(actor.role, "briefing:review") && !own ? (
              <Section title={t("checklist")} note={t("checklistNote")}>
                <ReviewForm briefingId={briefingId} versionId={version.id} version={version.number} statement={statementOf({ version: version.number, locales: row.locales, reviewDate: row.reviewDate, hash: version.contentHash })} />
              </Section>
            ) : inReview ? (
              <div className="mt-6">
                <Note>{own ? t("own") : t("cant")}</Note>
              </div>
            ) : null}
            <Section title={t("history")}>
              <ul className="grid gap-2">
                {answers.map((answer) => (
                  <li key={answer.id} className="border-b border-hair pb-2">
                    <b>{t(answer.decision, { name: answer.reviewerName, version: String(answer.versionNumber) })}</b> <span className="sm mut">{day(answer.at)}</span>
                    {answer.comment ? <p>{answer.comment}</p> : null}
                    {answer.voidReason ? <p className="text-clay">{t("voided", { reason: answer.voidReason })}</p> : null}
                    <p className="xs dim break-all">{t("fingerprint", { hash: answer.contentHash })}</p>
                  </li>
                ))}
              </ul>
            </Section>
          </>
        )}
        <StaffCaution demonstration={env().demo} />
      </main>
    </>
  );

  async function figuresTable() {
    const state = await recompute(whole);
    return (
      <section>
        <h2 className="text-17">{t("figures")}</h2>
        <p className="sm mut">
          {t("figuresIn", { number: String(frozen.number), date: day(frozen.frozenAt) })} <Link href={`/desk/assessments/${frozen.assessmentId}`}>{t("open")}</Link>
        </p>
        <p className={`st mt-2 whitespace-normal ${state === "recomputed" ? "ok" : "bad"}`}>
          <CheckMark state={state === "recomputed" ? "passes" : "stops"} />
          {t(state)}
        </p>
        <ScrollFrame label={t("figures")} className="mt-2">
          <table className="head">
            <thead>
              <tr>
                <th scope="col">{t("ref")}</th>
                <th scope="col" className="r">
                  {t("figure")}
                </th>
                <th scope="col">{t("where")}</th>
                <th scope="col" className="r">
                  {t("unrounded")}
                </th>
              </tr>
            </thead>
            <tbody>
              {(rendered?.figures ?? []).map((figure) => {
                const value = isFigureKey(figure.figure) ? readFigure(frozen.result, figure.figure, figure.package) : null;
                return (
                  <tr key={figure.ref}>
                    <th scope="row" className="text-tide">
                      {figure.ref}
                    </th>
                    <td className="r font-semibold">
                      <bdi>{figure.text}</bdi>
                    </td>
                    <td className="sm">
                      {kinds(`kinds.${figure.figure as "finalDeaths"}`)}, {figure.package === "none" ? kinds("none") : figure.package}
                    </td>
                    <td className="r xs dim [overflow-wrap:anywhere]">{figure.form === "value" ? value?.value : `${value?.low} – ${value?.high}`}</td>
                  </tr>
                );
              })}
            </tbody>
          </table>
        </ScrollFrame>
      </section>
    );
  }

  function measuresTable() {
    const decided = frozen.context.packages.find(({ letter }) => letter === row.packageLetter);
    return (
      <section>
        <h2 className="text-17">{t("measures")}</h2>
        <ScrollFrame label={t("figures")} className="mt-2">
          <table className="head">
            <thead>
              <tr>
                {(["measure", "basis", "inForce", "days"] as const).map((key) => (
                  <th key={key} scope="col">
                    {t(key)}
                  </th>
                ))}
              </tr>
            </thead>
            <tbody>
              {(rendered?.schedule.measures ?? []).map((measure, index) => {
                const kept = frozen.context.measures.find(({ code }) => code === measure.code);
                const days = measure.endDay === null ? null : measure.endDay - measure.startDay;
                const over = decided?.legalFindings.some(({ measureCode }) => measureCode === measure.code) ?? false;
                return (
                  <tr key={index}>
                    <th scope="row">{kept?.name ?? measure.code}</th>
                    <td className="sm">{measure.legalLink ? <a href={measure.legalLink}>{measure.legalBasis}</a> : measure.legalBasis || <span className="st look">{t("missing")}</span>}</td>
                    <td className="sm">
                      {short(measure.from)} – {measure.to ? short(measure.to) : t("noEnd")}
                    </td>
                    <td>
                      <span className="st">
                        <CheckMark state={over ? "stops" : "passes"} />
                        {kept?.limits.maxDays ? t("ofLimit", { days: String(days ?? "∞"), limit: String(kept.limits.maxDays) }) : t("noLimit", { days: String(days ?? "∞") })}
                        <span className="sr-only">{over ? t("over") : t("within")}</span>
                      </span>
                    </td>
                  </tr>
                );
              })}
            </tbody>
          </table>
        </ScrollFrame>
      </section>
    );
  }
}
