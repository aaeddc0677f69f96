import type { Metadata } from "next";
import Link from "next/link";
import { getTranslations } from "next-intl/server";
import { requireStaff } from "@/app/(desk)/_lib/session";
import { StageLine } from "@/app/(desk)/_lib/stage-line";
import { EmptyState, PageHead } from "@/components/desk/page-parts";
import { StaffCaution } from "@/components/desk/staff-caution";
import { Button, ButtonLink } from "@/components/ui/button";
import { can } from "@/lib/auth/permissions";
import { env } from "@/lib/env";
import { listMeasures } from "@/lib/measures/queries";
import { getOutbreak, listOutbreaks } from "@/lib/outbreaks/queries";
import { CatalogueTable } from "./_catalogue-table";

export const metadata: Metadata = { title: "Measures" };

type Search = Promise<{ find?: string | string[] }>;

export default async function MeasuresPage({ searchParams }: { searchParams: Search }) {
  const actor = await requireStaff();
  const { find } = await searchParams;
  const typed = typeof find === "string" ? find.trim() : "";
  const words = typed.toLowerCase();
  const [t, all, archived, outbreaks] = await Promise.all([getTranslations("Measures"), listMeasures(), listMeasures({ archived: true }), listOutbreaks()]);
  const rows = all.filter((row) => [row.name, row.shortName, row.instruction, row.legalBasis, row.code].some((text) => text.toLowerCase().includes(words)));
  const newest = outbreaks[0] ? await getOutbreak(outbreaks[0].id) : null;
  const add = can(actor.role, "measure:write") ? (
    <ButtonLink look="primary" href="/desk/measures/new">
      {t("new")}
    </ButtonLink>
  ) : null;
  const ladders = new Set(all.flatMap(({ ladder }) => (ladder === null ? [] : [ladder]))).size;
  return (
    <>
      {newest ? <StageLine outbreakId={newest.id} current="measures" /> : null}
      <main id="main" className="wrap">
        <PageHead title={t("title")} lede={t("lede")} actions={add} />
        {all.length === 0 ? (
          <EmptyState title={t("empty")} action={add}>
            {t("emptyText")}
          </EmptyState>
        ) : (
          <>
            <div className="mt-4 flex flex-wrap items-end justify-between gap-x-8 gap-y-3">
              <form method="get" className="flex flex-wrap items-end gap-3">
                <div className="w-72">
                  <label htmlFor="find">{t("find")}</label>
                  <input id="find" name="find" type="search" className="inp" defaultValue={typed} />
                </div>
                <Button type="submit">{t("findButton")}</Button>
                {typed ? (
                  <ButtonLink look="quiet" href="/desk/measures">
                    {t("clear")}
                  </ButtonLink>
                ) : null}
              </form>
              <p className="sm mut">{t("counts", { count: all.length, ladders, negative: all.filter(({ cut }) => cut.low < 0).length })}</p>
            </div>
            {rows.length === 0 ? <p className="py-6">{t("noMatch")}</p> : <CatalogueTable rows={rows} population={newest?.populationPersons ?? 0} currency={newest?.currency ?? ""} />}
            <p className="how">{newest ? t("perDayNote", { place: newest.place }) : t("perDayNoteNone")}</p>
          </>
        )}
        {archived.length > 0 ? (
          <details className="mt-8 border-t border-hair pt-3">
            <summary className="min-h-11 cursor-pointer text-13 font-semibold">{t("archivedTitle", { count: archived.length })}</summary>
            <ul className="mt-2 grid gap-1">
              {archived.map((row) => (
                <li key={row.id}>
                  <Link className="q" href={`/desk/measures/${row.id}`}>
                    {row.name}
                  </Link>
                </li>
              ))}
            </ul>
          </details>
        ) : null}
        <StaffCaution demonstration={env().demo} />
      </main>
    </>
  );
}
