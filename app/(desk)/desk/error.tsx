"use client";
import { useTranslations } from "next-intl";

export default function DeskError({ error, reset }: { error: Error & { digest?: string }; reset: () => void }) {
  const t = useTranslations("Desk.error");
  return (
    <main id="main" className="wrap">
      <h1>{t("title")}</h1>
      <p className="lede">{t("text", { reference: error.digest ?? "–" })}</p>
      <button type="button" className="btn mt-6" onClick={reset}>
        {t("retry")}
      </button>
    </main>
  );
}
