import { useTranslations } from "next-intl";

/** Stands on every staff page that shows a result. */
export function StaffCaution({ demonstration }: { demonstration: boolean }) {
  const t = useTranslations("Desk.caution");
  return (
    <aside className="caution">
      <b>{t("title")}</b>
      <p>
        {t("text")} {demonstration ? <b>{t("invented")}</b> : null}
      </p>
    </aside>
  );
}
