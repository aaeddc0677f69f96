import type { Metadata } from "next";
import Link from "next/link";
import { getTranslations } from "next-intl/server";
import { getDeskFormatter } from "@/lib/i18n/desk-formatter";
import { requireStaff } from "@/app/(desk)/_lib/session";
import { EmptyState, PageHead } from "@/components/desk/page-parts";
import { ButtonLink } from "@/components/ui/button";
import { StateMark } from "@/components/ui/marks";
import { can } from "@/lib/auth/permissions";
import { listOutbreaks } from "@/lib/outbreaks/queries";
import { ScrollFrame } from "@/components/ui/scroll-frame";

export const metadata: Metadata = { title: "Outbreaks" };

export default async function OutbreaksPage() {
  const actor = await requireStaff();
  const [t, format, rows] = await Promise.all([getTranslations("Outbreaks"), getDeskFormatter(), listOutbreaks()]);
  const mayWrite = can(actor.role, "outbreak:write");
  const add = mayWrite ? (
    <ButtonLink look="primary" href="/desk/outbreaks/new">
      {t("new")}
    </ButtonLink>
  ) : null;
  return (
    <main id="main" className="wrap">
      <PageHead title={t("title")} lede={t("lede", { count: rows.length })} actions={add} />
      {rows.length === 0 ? (
        <EmptyState title={t("empty")} action={add}>
          {t("emptyText")}
        </EmptyState>
      ) : (
        <ScrollFrame label={t("title")} className="mt-6">
          <table className="head">
            <thead>
              <tr>
                <th scope="col">{t("table.outbreak")}</th>
                <th scope="col" className="r">
                  {t("table.residents")}
                </th>
                <th scope="col">{t("table.dayZero")}</th>
                <th scope="col">{t("table.profile")}</th>
                <th scope="col">{t("table.saved")}</th>
              </tr>
            </thead>
            <tbody>
              {rows.map((row) => (
                <tr key={row.id}>
                  <th scope="row">
                    <Link className="q" href={`/desk/outbreaks/${row.id}`}>
                      {row.name}, {row.place}
                    </Link>
                  </th>
                  <td className="r">{format.number(row.populationPersons)}</td>
                  <td>{format.dateTime(new Date(`${row.dayZero}T00:00:00Z`), { day: "numeric", month: "short", year: "numeric" })}</td>
                  <td>
                    <span className="st">
                      <StateMark level={row.profile ? "full" : "started"} />
                      {row.profile ? t("table.complete") : t("table.missing")}
                    </span>
                  </td>
                  <td className="sm mut">{format.dateTime(row.updatedAt, { day: "numeric", month: "short", hour: "2-digit", minute: "2-digit" })}</td>
                </tr>
              ))}
            </tbody>
          </table>
        </ScrollFrame>
      )}
    </main>
  );
}
