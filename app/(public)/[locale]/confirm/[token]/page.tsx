import type { Metadata } from "next";
import { getTranslations } from "next-intl/server";
import { LinkForm } from "@/components/public/link-form";
import { CONFIRM_WITHIN_HOURS } from "@/lib/subscribers/constants";
import { canConfirm } from "@/lib/subscribers/queries";
import { errorWords } from "../../../_lib/error-words";
import { readLocale } from "../../../_lib/locale-param";
import { privateMetadata } from "../../../_lib/metadata";
import { PublicPage } from "../../../_lib/public-page";
import { confirmAction } from "./_actions";

type Props = { params: Promise<{ locale: string; token: string }> };

export const dynamic = "force-dynamic";

export async function generateMetadata({ params }: Props): Promise<Metadata> {
  await readLocale(params);
  return privateMetadata((await getTranslations("Subscribe"))("confirm.title"));
}

/** Opening the link does nothing yet: mail programs and scanners open links too. */
export default async function Confirm({ params }: Props) {
  const locale = await readLocale(params);
  const { token } = await params;
  const [t, works] = await Promise.all([getTranslations("Subscribe"), canConfirm(token, new Date())]);
  return (
    <PublicPage locale={locale} path={`/confirm/${token}`}>
      {works ? (
        <>
          <h1>{t("confirm.title")}</h1>
          <p className="col plead">{t("confirm.lead")}</p>
          <LinkForm action={confirmAction} token={token} locale={locale} look="primary" words={{ button: t("confirm.button"), summary: t("summary"), errors: await errorWords(locale) }} />
          <p className="col mut fine">{t("confirm.notYou")}</p>
        </>
      ) : (
        <>
          <h1>{t("confirm.goneTitle")}</h1>
          <p className="col plead">{t("confirm.goneLead", { hours: CONFIRM_WITHIN_HOURS })}</p>
          <p className="pgap">
            <a className="btn pri big-btn" href={`/${locale}/subscribe`}>
              {t("confirm.again")}
            </a>
          </p>
        </>
      )}
    </PublicPage>
  );
}
