import type { Metadata } from "next";
import { getTranslations } from "next-intl/server";
import { getDeskFormatter } from "@/lib/i18n/desk-formatter";
import { requireStaff, staffCtx } from "@/app/(desk)/_lib/session";
import { EmptyState, PageHead, Section } from "@/components/desk/page-parts";
import { getDeliveryReport, listUnknown } from "@/lib/deliveries/queries";
import { LOCALES } from "@/lib/i18n/locales";
import { LiveReport } from "./_live-report";
import { ScrollFrame } from "@/components/ui/scroll-frame";

export const metadata: Metadata = { title: "Deliveries" };

const endOf = (reply: string | null) => (reply === null ? "crash" : reply === "ETIMEDOUT" ? "silence" : "broken");

export default async function DeliveriesPage() {
  const ctx = await staffCtx(await requireStaff("delivery:read"));
  const [report, unknown, t, format] = await Promise.all([getDeliveryReport(ctx), listUnknown(ctx), getTranslations("Deliveries"), getDeskFormatter()]);
  return (
    <main id="main" className="wrap">
      <PageHead title={t("title")} lede={t("lede")} />
      <LiveReport first={report} />
      <Section title={t("unknown.title")} note={t("unknown.note")}>
        <div className="grid max-w-measure gap-3">
          <p>{t("unknown.why")}</p>
          <p>{t("unknown.choice")}</p>
        </div>
        {unknown.length === 0 ? (
          <EmptyState title={t("unknown.none")} />
        ) : (
          <ScrollFrame label={t("title")} className="mt-4">
            <table className="head min-w-[720px]">
              <thead>
                <tr>
                  <th scope="col">{t("unknown.mail")}</th>
                  <th scope="col">{t("unknown.language")}</th>
                  <th scope="col">{t("unknown.at")}</th>
                  <th scope="col">{t("unknown.end")}</th>
                  <th scope="col">{t("unknown.reference")}</th>
                </tr>
              </thead>
              <tbody>
                {unknown.map(({ id, title, kind, locale, at, reply }) => (
                  <tr key={id}>
                    <th scope="row">{title ?? t(`kinds.${kind}`)}</th>
                    <td className="nw">{LOCALES[locale].name}</td>
                    <td className="sm nw">{format.dateTime(new Date(at), { day: "numeric", month: "short", hour: "2-digit", minute: "2-digit", second: "2-digit", hourCycle: "h23" })}</td>
                    <td className="nw">{t(`unknown.ends.${endOf(reply)}`)}</td>
                    <td className="dim nw">{id.slice(0, 8)}</td>
                  </tr>
                ))}
              </tbody>
            </table>
          </ScrollFrame>
        )}
      </Section>
    </main>
  );
}
