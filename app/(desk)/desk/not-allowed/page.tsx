import { getTranslations } from "next-intl/server";
import { PageHead } from "@/components/desk/page-parts";
import { ButtonLink } from "@/components/ui/button";
import { requireStaff } from "../../_lib/session";

export default async function NotAllowedPage() {
  await requireStaff();
  const t = await getTranslations("Desk.notAllowed");
  return (
    <main id="main" className="wrap">
      <PageHead title={t("title")} lede={t("text")} />
      <div className="mt-6">
        <ButtonLink href="/desk">{t("back")}</ButtonLink>
      </div>
    </main>
  );
}
