import { cookies } from "next/headers";
import { getTranslations } from "next-intl/server";
import { ButtonLink } from "@/components/ui/button";
import { askedCookieName } from "@/lib/auth/constants";
import { findSignIn } from "@/lib/auth/find-sign-in";
import { env } from "@/lib/env";
import { accessLocale } from "../../_lib/locale";
import { ConfirmForm } from "../_forms";

/** Reading this page uses nothing up; only the button does. */
export default async function ConfirmPage({ searchParams }: { searchParams: Promise<{ token?: string | string[] }> }) {
  const { token } = await searchParams;
  const key = (await cookies()).get(askedCookieName(env().EBBMARK_URL.startsWith("https:")))?.value;
  const locale = await accessLocale();
  const t = await getTranslations({ locale, namespace: "SignIn" });
  const address = typeof token === "string" && key ? await findSignIn(token, key, new Date()) : null;
  if (address === null || typeof token !== "string") {
    return (
      <>
        <h1>{t("deadTitle")}</h1>
        <p className="mt-3">{t("deadText")}</p>
        <div className="mt-6">
          <ButtonLink href={`/sign-in?lang=${locale}`} look="primary">
            {t("again")}
          </ButtonLink>
        </div>
      </>
    );
  }
  return (
    <>
      <h1>{t("confirmTitle", { address })}</h1>
      <p className="mt-3">{t("confirmText")}</p>
      <ConfirmForm token={token} />
    </>
  );
}
