import type { Metadata } from "next";
import Link from "next/link";
import { getTranslations } from "next-intl/server";
import { requireStaff } from "@/app/(desk)/_lib/session";
import { EmptyState, PageHead } from "@/components/desk/page-parts";
import { ButtonLink } from "@/components/ui/button";
import { StateMark } from "@/components/ui/marks";
import { can } from "@/lib/auth/permissions";
import { listBriefings } from "@/lib/briefings/queries";
import { levelOf } from "./_level";
import { ScrollFrame } from "@/components/ui/scroll-frame";

export const metadata: Metadata = { title: "Briefings" };

export default async function BriefingsPage() {
  const actor = await requireStaff();
  const [t, desk, rows] = await Promise.all([getTranslations("Briefings"), getTranslations("Desk"), listBriefings()]);
  const add = can(actor.role, "briefing:write") ? (
    <ButtonLink look="primary" href="/desk/briefings/new">
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
                {(["number", "title", "state", "languages", "rests"] as const).map((key) => (
                  <th key={key} scope="col">
                    {t(`columns.${key}`)}
                  </th>
                ))}
              </tr>
            </thead>
            <tbody>
              {rows.map((row) => (
                <tr key={row.id}>
                  <td className="dim">{row.number}</td>
                  <th scope="row">
                    <Link className="q" href={`/desk/briefings/${row.id}`}>
                      {row.title.replace(/\{\{[^}]*\}\}/g, "…") || t("untitled")}
                    </Link>
                    <span className="sm mut block font-normal">
                      {row.outbreakName}, {row.place}
                    </span>
                  </th>
                  <td>
                    <span className="st">
                      <StateMark level={levelOf(row.state)} />
                      {desk(`states.${row.state}`)}
                    </span>
                  </td>
                  <td className="sm mut">{row.locales.join(" ")}</td>
                  <td className="sm mut">{t("rests", { number: String(row.assessmentNumber), letter: row.packageLetter })}</td>
                </tr>
              ))}
            </tbody>
          </table>
        </ScrollFrame>
      )}
    </main>
  );
}
