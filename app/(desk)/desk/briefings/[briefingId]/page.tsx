import type { Metadata } from "next";
import Link from "next/link";
import { notFound } from "next/navigation";
import { getTranslations } from "next-intl/server";
import { getDeskFormatter } from "@/lib/i18n/desk-formatter";
import { requireStaff } from "@/app/(desk)/_lib/session";
import { StageLine } from "@/app/(desk)/_lib/stage-line";
import { Note, PageHead } from "@/components/desk/page-parts";
import { StaffCaution } from "@/components/desk/staff-caution";
import { ButtonLink, NotYet } from "@/components/ui/button";
import { CheckMark, StateMark } from "@/components/ui/marks";
import { can } from "@/lib/auth/permissions";
import { getWhole, listReviews, renderFacts, stepFacts, type WholeBriefing } from "@/lib/briefings/queries";
import { datesOf, renderBriefing } from "@/lib/briefings/render";
import { sourceHash } from "@/lib/briefings/hash";
import { reasonsAgainst } from "@/lib/briefings/workflow";
import { env } from "@/lib/env";
import { formatDay } from "@/lib/i18n/dates";
import { isLocale, type Locale, LOCALES } from "@/lib/i18n/locales";
import { AddFigureForm, SettingsForm, SubmitForm } from "../_small-forms";
import { TextForm } from "./_text-form";

export const metadata: Metadata = { title: "Briefing" };

type Props = { params: Promise<{ briefingId: string }>; searchParams: Promise<{ locale?: string; saved?: string }> };

/** What each token shows in one language, also those that no text uses yet. */
async function shownIn(whole: WholeBriefing, locale: Locale): Promise<Record<string, string>> {
  const all = whole.row.figures.map(({ ref }) => `{{${ref}}}`).join(" ");
  const { parts } = await renderBriefing(whole.frozen, renderFacts(whole.row), { locale, title: "", paragraphs: [{ id: "p1", part: "inShort", text: all }] });
  const figures = parts.flatMap((part) => part.paragraphs.flatMap(({ inlines }) => inlines.flatMap((inline) => (inline.kind === "figure" ? [[inline.ref, inline.text] as const] : []))));
  const dates = [...datesOf(whole.frozen, whole.row.packageLetter, whole.row.reviewDate)].map(([token, iso]) => [token, formatDay(iso, locale)] as const);
  return Object.fromEntries([...figures, ...dates]);
}

export default async function BriefingPage({ params, searchParams }: Props) {
  const actor = await requireStaff();
  const { briefingId } = await params;
  const whole = await getWhole(briefingId).catch(() => notFound());
  const { row, texts, source, frozen, findings } = whole;
  const search = await searchParams;
  const locale = isLocale(search.locale) && row.locales.includes(search.locale) ? search.locale : row.sourceLocale;
  const [t, format, shown, sourceShown, answers, why] = await Promise.all([
    getTranslations("Briefings"), getDeskFormatter(), shownIn(whole, locale), shownIn(whole, row.sourceLocale), listReviews(briefingId), getTranslations("BriefingReasons"),
  ]);
  const facts = stepFacts(whole, actor.id);
  const readOnly = !can(actor.role, "briefing:write") || reasonsAgainst("edit", facts).length > 0;
  const against = reasonsAgainst("submit", facts);
  const own = texts.find((text) => text.locale === locale);
  const isSource = locale === row.sourceLocale;
  const pairs = source.paragraphs.map(({ id, part, text }) => {
    const mine = isSource ? { text, sourceHash: sourceHash(text) } : own?.paragraphs.find((each) => each.id === id);
    return { id, part, source: text, text: mine?.text ?? "", stale: Boolean(mine?.text) && mine?.sourceHash !== sourceHash(text) };
  });
  const all = [...findings.values()].flat();
  const here = findings.get(locale) ?? [];
  const lastReturn = answers.findLast(({ decision }) => decision === "returned");
  return (
    <>
      <StageLine outbreakId={frozen.outbreakId} current="briefing" />
      <main id="main" className="wrap">
        <PageHead
          title={t("editTitle", { number: String(row.number), title: source.title.replace(/\{\{([^}]*)\}\}/g, (_, token: string) => sourceShown[token] ?? "…") || t("untitled") })}
          actions={
            <>
              <ButtonLink href={`/desk/briefings/${briefingId}/preview/${locale}`}>{t("seeAs")}</ButtonLink>
              <ButtonLink href={`/desk/briefings/${briefingId}/review`}>{t("review")}</ButtonLink>
              <ButtonLink href={`/desk/briefings/${briefingId}/publication`}>{t("publication")}</ButtonLink>
              {can(actor.role, "briefing:submit") && against.length === 0 ? <SubmitForm briefingId={briefingId} version={row.version} /> : null}
            </>
          }
        />
        <p className="mut mt-1">
          {t("from", { number: String(frozen.number), date: format.dateTime(frozen.frozenAt, { day: "numeric", month: "long", hour: "2-digit", minute: "2-digit" }) })} {t(`stateNote.${row.state}`, { comment: lastReturn?.comment ?? "" })}
        </p>
        {search.saved ? (
          <div className="mt-3" role="status">
            <Note tone="ok">{t("saved")}</Note>
          </div>
        ) : null}
        <nav className="tabs mt-4" aria-label={t("tabs")}>
          {row.locales.map((code) => {
            const stops = (findings.get(code) ?? []).filter(({ level }) => level === "stops").length;
            return (
              <Link key={code} href={`/desk/briefings/${briefingId}?locale=${code}`} aria-current={code === locale ? "page" : undefined}>
                <StateMark level={stops === 0 ? "full" : "half"} />
                <span lang={code}>{LOCALES[code].name}</span>
                <small className="dim">{code === row.sourceLocale ? t("sourceTab") : stops ? t("open", { count: stops }) : t("ready")}</small>
              </Link>
            );
          })}
        </nav>
        <div className="mt-5 grid items-start gap-x-10 gap-y-8 xl:grid-cols-[minmax(0,1fr)_320px]">
          <TextForm
            key={`${locale}-${own?.version}`}
            briefingId={briefingId}
            version={own?.version ?? 1}
            locale={locale}
            dir={LOCALES[locale].dir}
            language={LOCALES[locale].name}
            sourceLanguage={LOCALES[row.sourceLocale].name}
            isSource={isSource}
            title={{ source: source.title, text: own?.title ?? "", stale: Boolean(own?.title) && own?.titleSourceHash !== sourceHash(source.title) }}
            pairs={pairs}
            shown={shown}
            sourceShown={sourceShown}
            readOnly={readOnly}
          />
          <aside aria-label={t("checks")} className="grid gap-8">
            <section>
              <h2 className="text-17">{t("checks")}</h2>
              <p className="sm mut">{t("checksLede", { stops: all.filter(({ level }) => level === "stops").length, looks: all.filter(({ level }) => level === "looks").length })}</p>
              <ul className="chk mt-2">
                {here.map((finding, index) => (
                  <li key={index}>
                    <CheckMark state={finding.level} />
                    <span>{t(`finding.${finding.code}`, { ...finding, paragraph: finding.paragraph ?? 0, token: "token" in finding ? finding.token : "", digits: "digits" in finding ? finding.digits : "", words: "words" in finding ? finding.words : 0 } as never)}</span>
                    {finding.paragraph ? <a href={`#p${finding.paragraph}`}>{t("go")}</a> : <span />}
                  </li>
                ))}
                {here.length === 0 ? (
                  <li>
                    <CheckMark state="passes" />
                    <span>{t("all")}</span>
                  </li>
                ) : null}
              </ul>
              {against.length > 0 && can(actor.role, "briefing:submit") && (row.state === "draft" || row.state === "underCorrection") ? (
                <div className="mt-4">
                  <NotYet id="not-yet" label={t("submit")} reasons={[t("notYet"), ...against.map((reason) => why(reason as never))]} />
                </div>
              ) : null}
            </section>
            {readOnly ? null : <SettingsForm key={row.version} briefingId={briefingId} version={row.version} reviewDate={row.reviewDate} />}
            <section>
              <h2 className="text-17">{t("figures")}</h2>
              <p className="sm mut">{t("figuresNote")}</p>
              <table className="mt-2">
                <tbody>
                  {row.figures.map(({ ref, figure, package: letter, form }) => (
                    <tr key={ref}>
                      <th scope="row" className="text-tide">{`{{${ref}}}`}</th>
                      <td className="r">
                        <bdi>{shown[ref]}</bdi>
                      </td>
                      <td className="sm mut">
                        {t(`kinds.${figure as "finalDeaths"}`)}, {letter === "none" ? t("none") : letter}, {t(`forms.${form}`)}
                      </td>
                    </tr>
                  ))}
                </tbody>
              </table>
              <details className="mt-3">
                <summary className="cursor-pointer text-13 font-semibold">{t("dates")}</summary>
                <ul className="sm mt-2 grid gap-1">
                  {[...datesOf(frozen, row.packageLetter, row.reviewDate).keys()].map((token) => (
                    <li key={token}>
                      {`{{${token}}}`} <span className="mut">{shown[token]}</span>
                    </li>
                  ))}
                </ul>
              </details>
              {readOnly ? null : <AddFigureForm briefingId={briefingId} version={row.version} packages={frozen.context.packages.map(({ letter }) => letter)} />}
            </section>
          </aside>
        </div>
        <StaffCaution demonstration={env().demo} />
      </main>
    </>
  );
}
