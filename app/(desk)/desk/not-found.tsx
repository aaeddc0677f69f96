import { getTranslations } from "next-intl/server";
import { PageHead } from "@/components/desk/page-parts";
import { ButtonLink } from "@/components/ui/button";

export default async function DeskNotFound() {
  const t = await getTranslations("Desk.notFound");
  return (
    <main id="main" className="wrap">
      <PageHead title={t("title")} lede={t("text")} />
      <div className="mt-6">
        <ButtonLink href="/desk">{t("back")}</ButtonLink>
      </div>
    </main>
  );
}
