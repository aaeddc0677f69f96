import type { Metadata } from "next";
import { getTranslations } from "next-intl/server";
import { CONFIRM_WITHIN_HOURS, MAILS_PER_ADDRESS } from "@/lib/subscribers/constants";
import { readLocale } from "../../../_lib/locale-param";
import { privateMetadata } from "../../../_lib/metadata";
import { PublicPage } from "../../../_lib/public-page";

type Props = { params: Promise<{ locale: string }> };

export async function generateMetadata({ params }: Props): Promise<Metadata> {
  await readLocale(params);
  return privateMetadata((await getTranslations("Subscribe"))("sent.title"));
}

export default async function Sent({ params }: Props) {
  const locale = await readLocale(params);
  const t = await getTranslations("Subscribe.sent");
  return (
    <PublicPage locale={locale} path="/subscribe">
      <h1>{t("title")}</h1>
      <div className="note ok col pgap" role="status">
        <p>{t("lead", { hours: CONFIRM_WITHIN_HOURS })}</p>
      </div>
      <p className="col pgap">
        {t("nothing", { count: MAILS_PER_ADDRESS })} <a href={`/${locale}/subscribe`}>{t("again")}</a>
      </p>
    </PublicPage>
  );
}
