import { getTranslations } from "next-intl/server";
import { ButtonLink } from "@/components/ui/button";
import { SIGN_IN_MINUTES } from "@/lib/auth/constants";
import { accessLocale } from "../../_lib/locale";

export default async function SentPage() {
  const locale = await accessLocale();
  const t = await getTranslations({ locale, namespace: "SignIn" });
  return (
    <>
      <h1>{t("sentTitle")}</h1>
      <p className="mt-3">{t("sentText", { minutes: SIGN_IN_MINUTES })}</p>
      <p className="mut mt-3">{t("sentAgain")}</p>
      <div className="mt-6">
        <ButtonLink href={`/sign-in?lang=${locale}`}>{t("again")}</ButtonLink>
      </div>
    </>
  );
}
