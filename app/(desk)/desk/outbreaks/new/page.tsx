import type { Metadata } from "next";
import { getTranslations } from "next-intl/server";
import { requireStaff } from "@/app/(desk)/_lib/session";
import { PageHead, Section } from "@/components/desk/page-parts";
import { LOCALE_CODES } from "@/lib/i18n/locales";
import { OutbreakForm } from "../_outbreak-form";

export const metadata: Metadata = { title: "New outbreak" };

export default async function NewOutbreakPage() {
  await requireStaff("outbreak:write");
  const t = await getTranslations("Outbreaks");
  const today = new Date().toISOString().slice(0, 10);
  return (
    <main id="main" className="wrap">
      <PageHead title={t("newTitle")} lede={t("newLede")} />
      <Section title={t("facts.title")} note={t("facts.note")}>
        <OutbreakForm facts={{ name: "", place: "", populationPersons: "", currency: "EUR", priceYear: today.slice(0, 4), dayZero: today, languages: [...LOCALE_CODES], publicNames: {} }} />
      </Section>
    </main>
  );
}
