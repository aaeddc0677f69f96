import type { Metadata } from "next";
import { notFound } from "next/navigation";
import { getTranslations } from "next-intl/server";
import { getDeskFormatter } from "@/lib/i18n/desk-formatter";
import { requireStaff } from "@/app/(desk)/_lib/session";
import { StageLine } from "@/app/(desk)/_lib/stage-line";
import { PageHead, Section } from "@/components/desk/page-parts";
import { StaffCaution } from "@/components/desk/staff-caution";
import { NotYet } from "@/components/ui/button";
import { listAssessments } from "@/lib/assessments/queries";
import { can } from "@/lib/auth/permissions";
import { getWhole, stepFacts } from "@/lib/briefings/queries";
import { reasonsAgainst } from "@/lib/briefings/workflow";
import { env } from "@/lib/env";
import { translatorOf } from "@/lib/i18n/translator";
import { listOwnReleases } from "@/lib/publications/list-own-releases";
import { PublishForm, ReviseForm, WithdrawForm } from "./_publication-forms";

export const metadata: Metadata = { title: "Publication" };

export default async function PublicationPage({ params }: { params: Promise<{ briefingId: string }> }) {
  const actor = await requireStaff();
  const { briefingId } = await params;
  const whole = await getWhole(briefingId).catch(() => notFound());
  const { row, frozen, source } = whole;
  const facts = stepFacts(whole, actor.id);
  const [t, why, format, released, others] = await Promise.all([
    getTranslations("Publication"), getTranslations("BriefingReasons"), getDeskFormatter(), listOwnReleases(briefingId), listAssessments(frozen.outbreakId),
  ]);
  const day = (date: Date) => format.dateTime(date, { day: "numeric", month: "short", year: "numeric" });
  const against = reasonsAgainst("publish", facts);
  const lock = { briefingId, version: row.version };
  const notices = Object.fromEntries(await Promise.all(row.locales.map(async (locale) => [locale, (await translatorOf(locale, "BriefingTemplates"))("withdrawn")] as const)));
  const mayPublish = can(actor.role, "briefing:publish");
  return (
    <>
      <StageLine outbreakId={frozen.outbreakId} current="publication" />
      <main id="main" className="wrap">
        <PageHead title={t("title", { title: source.title.replace(/\{\{[^}]*\}\}/g, "…") })} />
        {mayPublish ? (
          <Section title={t("publish")} note={t("publishNote")}>
            {against.length === 0 ? (
              <PublishForm {...lock} versionNumber={row.versionNumber} />
            ) : (
              <NotYet id="publish-not-yet" label={t("publish")} reasons={[t("notYet"), ...against.map((reason) => why(reason as never))]} />
            )}
          </Section>
        ) : null}
        <Section title={t("releases")}>
          {released.length === 0 ? (
            <p className="mut">{t("noRelease")}</p>
          ) : (
            <ul className="grid gap-3">
              {released.map((release) => (
                <li key={release.id} className="border-b border-hair pb-3">
                  <b>{t("release", { number: String(release.number) })}</b>, {t(`kinds.${release.kind}`)}, {day(release.publishedAt)}{" "}
                  <a href={`/en/briefings/${release.slug}`}>{t("view")}</a>
                  {release.events.map((event) => (
                    <p key={event.kind} className="sm text-brass">
                      {t(`events.${event.kind}`, { date: day(event.at) })}
                    </p>
                  ))}
                  <p className="sm mut">{t("mails", { accepted: String(release.mails.accepted), waiting: String(release.mails.waiting), failed: String(release.mails.failed) })}</p>
                </li>
              ))}
            </ul>
          )}
        </Section>
        {mayPublish && reasonsAgainst("update", facts).length === 0 ? (
          <Section title={t("revise")} note={t("reviseNote")}>
            <ReviseForm
              {...lock}
              locales={row.locales}
              assessments={[
                { value: "", label: t("same", { number: String(frozen.number) }) },
                ...others.filter(({ id, frozenAt }) => frozenAt !== null && id !== frozen.assessmentId).map(({ id, number, frozenAt }) => ({ value: id, label: t("other", { number: String(number), date: day(frozenAt as Date) }) })),
              ]}
            />
          </Section>
        ) : null}
        {can(actor.role, "briefing:withdraw") && reasonsAgainst("withdraw", facts).length === 0 ? (
          <Section title={t("withdraw")} note={t("withdrawNote")}>
            <WithdrawForm {...lock} notices={notices} />
          </Section>
        ) : null}
        <StaffCaution demonstration={env().demo} />
      </main>
    </>
  );
}
