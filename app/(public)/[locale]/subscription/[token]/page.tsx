import type { Metadata } from "next";
import { getTranslations } from "next-intl/server";
import { LanguageChoice } from "@/components/public/language-choice";
import { LinkForm } from "@/components/public/link-form";
import { formatDay } from "@/lib/i18n/dates";
import { LOCALES, type Locale } from "@/lib/i18n/locales";
import { findSubscription, type SubscriptionShown } from "@/lib/subscribers/queries";
import { errorWords } from "../../../_lib/error-words";
import { readLocale } from "../../../_lib/locale-param";
import { privateMetadata } from "../../../_lib/metadata";
import { PublicPage } from "../../../_lib/public-page";
import { changeAction, leaveAction, undoAction } from "./_actions";

type Props = { params: Promise<{ locale: string; token: string }>; searchParams: Promise<{ done?: string | string[] }> };

export const dynamic = "force-dynamic";

export async function generateMetadata({ params }: Props): Promise<Metadata> {
  await readLocale(params);
  return privateMetadata((await getTranslations("Subscribe"))("manage.title"));
}

/** What somebody sees after tapping "Manage" in an e-mail. */
export default async function Subscription({ params, searchParams }: Props) {
  const locale = await readLocale(params);
  const { token } = await params;
  const [t, shown, { done }] = await Promise.all([getTranslations("Subscribe.manage"), findSubscription(token, new Date()), searchParams]);
  return (
    <PublicPage locale={locale} path={`/subscription/${encodeURIComponent(token)}`}>
      <h1>{shown ? t("title") : t("goneTitle")}</h1>
      {shown ? (
        <Shown shown={shown} token={token} locale={locale} done={typeof done === "string" ? done : ""} />
      ) : (
        <>
          <p className="col plead">{t("goneLead")}</p>
          <p className="pgap">
            <a className="btn pri big-btn" href={`/${locale}/subscribe`}>
              {t("again")}
            </a>
          </p>
        </>
      )}
    </PublicPage>
  );
}

async function Shown({ shown, token, locale, done }: { shown: SubscriptionShown; token: string; locale: Locale; done: string }) {
  const [t, words, errors] = await Promise.all([getTranslations("Subscribe.manage"), getTranslations("Subscribe"), errorWords(locale)]);
  const form = { token, locale };
  const say = (button: string) => ({ button, summary: words("summary"), errors });
  if (shown.state === "left") {
    return (
      <div className="note ok col pgap" role="status">
        <b>{t("left")}</b> {t("leftLead")} {shown.canUndo ? <LinkForm {...form} action={undoAction} look="link" words={say(t("undo"))} /> : null}
      </div>
    );
  }
  if (shown.state === "pending") return <p className="ntc col pgap">{t("pending")}</p>;
  const own = LOCALES[shown.locale].name;
  const note = done === "confirmed" ? t("confirmed") : done === "changed" ? t("changed", { language: own }) : done === "undone" ? t("undone") : null;
  return (
    <>
      {note ? (
        <p className="note ok col pgap" role="status">
          {note}
        </p>
      ) : null}
      <dl className="own">
        <div>
          <dt>{t("address")}</dt>
          <dd>
            <bdi>{shown.address}</bdi>
          </dd>
        </div>
        <div>
          <dt>{t("language")}</dt>
          <dd lang={shown.locale} className="names">
            {own}
          </dd>
        </div>
        {shown.confirmedAt ? (
          <div>
            <dt>{t("since")}</dt>
            <dd>{formatDay(shown.confirmedAt, locale)}</dd>
          </div>
        ) : null}
        {shown.lastMail ? (
          <div>
            <dt>{t("last")}</dt>
            <dd>
              {formatDay(shown.lastMail.at, locale)}:{" "}
              <a href={`/${shown.locale}/briefings/${shown.lastMail.slug}`} lang={shown.locale} dir={LOCALES[shown.locale].dir}>
                {shown.lastMail.title}
              </a>
            </dd>
          </div>
        ) : null}
      </dl>
      <div className="ptwo">
        <section className="pbox">
          <h2>{t("change")}</h2>
          <LinkForm {...form} action={changeAction} look="secondary" words={say(t("save"))}>
            <LanguageChoice legend={words("language")} chosen={shown.locale} />
          </LinkForm>
        </section>
        <section className="pbox">
          <h2>{t("stop")}</h2>
          <p className="mut">{t("stopLead")}</p>
          <LinkForm {...form} action={leaveAction} look="secondary" words={say(t("stop"))} />
        </section>
      </div>
    </>
  );
}
