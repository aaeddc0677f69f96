import { headers } from "next/headers";
import { redirect } from "next/navigation";
import { getTranslations } from "next-intl/server";
import { findStaff } from "@/app/(desk)/_lib/session";
import { env } from "@/lib/env";
import { listDemonstrationPeople } from "@/lib/users/queries";
import { accessLocale } from "../_lib/locale";
import { DemonstrationForm, RequestForm } from "./_forms";

export default async function SignInPage() {
  if (await findStaff()) redirect("/desk");
  const t = await getTranslations({ locale: await accessLocale(), namespace: "SignIn" });
  const settings = env();
  const oneClick = settings.demo && (await headers()).get("x-ebbmark-direct") === "1";
  return (
    <>
      <h1>{t("title")}</h1>
      <p className="mut mt-1.5">{t("lede", { authority: settings.AUTHORITY_NAME })}</p>
      <RequestForm />
      <p className="sm mut mt-8 border-t border-hair pt-3.5">{t("note")}</p>
      {oneClick ? (
        <section className="mt-8">
          <h2 className="text-17">{t("demoTitle")}</h2>
          <p className="sm mut mt-1">
            {t("demoText")} {settings.MAIL_SINK_URL ? t("mailAt", { address: settings.MAIL_SINK_URL }) : null}
          </p>
          <DemonstrationForm people={await listDemonstrationPeople()} />
        </section>
      ) : null}
    </>
  );
}
