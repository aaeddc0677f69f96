import type { Metadata } from "next";
import Link from "next/link";
import { getFormatter, getTranslations } from "next-intl/server";
import { Fragment } from "react";
import { requireStaff } from "@/app/(desk)/_lib/session";
import { EmptyState, PageHead } from "@/components/desk/page-parts";
import { StaffCaution } from "@/components/desk/staff-caution";
import { Button, ButtonLink } from "@/components/ui/button";
import { Figure } from "@/components/ui/marks";
import { can } from "@/lib/auth/permissions";
import { central } from "@/lib/engine";
import { env } from "@/lib/env";
import { listMeasures, type Measure } from "@/lib/measures/queries";
import { listOutbreaks } from "@/lib/outbreaks/queries";
import { PayerBar } from "./_payer-bar";

export const metadata: Metadata = { title: "Measures" };

type Search = Promise<{ find?: string | string[] }>;

export default async function MeasuresPage({ searchParams }: { searchParams: Search }) {
  const actor = await requireStaff();
  const { find } = await searchParams;
  const words = typeof find === "string" ? find.trim().toLowerCase() : "";
  const [t, format, all, outbreaks] = await Promise.all([getTranslations("Measures"), getFormatter(), listMeasures(), listOutbreaks()]);
  const rows = all.filter((row) => words === "" || [row.name, row.instruction, row.legalBasis, row.code].some((text) => text.toLowerCase().includes(words)));
  const population = outbreaks[0]?.populationPersons ?? 0;
  const add = can(actor.role, "measure:write") ? (
    <ButtonLink look="primary" href="/desk/measures/new">
      {t("new")}
    </ButtonLink>
  ) : null;
  const percent = (value: number) => format.number(value * 100, { maximumFractionDigits: 1 });
  const perDay = (row: Measure, payer: string) =>
    row.costs.filter((cost) => cost.payer === payer && !cost.transfer).reduce((sum, cost) => sum + central(cost.perDay ?? 0) + central(cost.perResidentDay ?? 0) * population, 0);
  const groups = groupByLadder(rows);
  return (
    <main id="main" className="wrap">
      <PageHead title={t("title")} lede={t("lede", { count: all.length })} actions={add} />
      {all.length === 0 ? (
        <EmptyState title={t("empty")} action={add}>
          {t("emptyText")}
        </EmptyState>
      ) : (
        <>
          <form method="get" className="mt-5 flex flex-wrap items-end gap-3">
            <div className="w-72">
              <label htmlFor="find">{t("find")}</label>
              <input id="find" name="find" type="search" className="inp" defaultValue={words} />
            </div>
            <Button type="submit">{t("findButton")}</Button>
            {words ? (
              <ButtonLink look="quiet" href="/desk/measures">
                {t("clear")}
              </ButtonLink>
            ) : null}
          </form>
          {rows.length === 0 ? (
            <p className="py-6">{t("noMatch")}</p>
          ) : (
            <div className="mt-4 overflow-x-auto">
              <table className="head min-w-[900px]">
                <thead>
                  <tr>
                    <th scope="col">{t("columns.measure")}</th>
                    <th scope="col">{t("columns.cut")}</th>
                    <th scope="col">{t("columns.law")}</th>
                    <th scope="col" className="r">
                      {t("columns.longest")}
                    </th>
                    <th scope="col" className="r">
                      {t("columns.lead")}
                    </th>
                    <th scope="col" className="r">
                      {t("columns.cost", { currency: "€" })}
                    </th>
                    <th scope="col">{t("columns.payer")}</th>
                  </tr>
                </thead>
                <tbody>
                  {groups.map(({ ladder, measures }) => (
                    <Fragment key={ladder ?? "others"}>
                      {groups.length > 1 ? (
                        <tr className="grp">
                          <th colSpan={7} scope="colgroup">
                            {ladder ? t("ladder", { name: ladder }) : t("others")}
                          </th>
                        </tr>
                      ) : null}
                      {measures.map((row) => {
                        const shares = { public: perDay(row, "public"), business: perDay(row, "business"), household: perDay(row, "household") };
                        return (
                          <tr key={row.id}>
                            <th scope="row" className="max-w-[340px]">
                              <Link className="q font-semibold" href={`/desk/measures/${row.id}`}>
                                {row.name}
                              </Link>
                              <span className="sm mut block font-normal">{row.instruction}</span>
                            </th>
                            <td>
                              <Figure value={percent(row.cut.central)} interval={`${percent(row.cut.low)} to ${percent(row.cut.high)}`} unit="%" />
                            </td>
                            <td className="sm">{row.legalBasis || <span className="st look">{t("noLaw")}</span>}</td>
                            <td className="r nw">{row.maxDays ? t("days", { count: row.maxDays }) : t("noLimit")}</td>
                            <td className="r nw">{t("days", { count: row.leadTimeDays })}</td>
                            <td className="r">{format.number((shares.public + shares.business + shares.household) / 1000, { maximumSignificantDigits: 3 })}</td>
                            <td>
                              <PayerBar shares={shares} names={{ public: t("payers.public"), business: t("payers.business"), household: t("payers.household") }} />
                            </td>
                          </tr>
                        );
                      })}
                    </Fragment>
                  ))}
                </tbody>
              </table>
            </div>
          )}
          <p className="how">{t("perDayNote")}</p>
        </>
      )}
      <StaffCaution demonstration={env().demo} />
    </main>
  );
}

function groupByLadder(rows: readonly Measure[]): { ladder: string | null; measures: Measure[] }[] {
  const groups = new Map<string | null, Measure[]>();
  for (const row of rows) groups.set(row.ladder, [...(groups.get(row.ladder) ?? []), row]);
  return [...groups].map(([ladder, measures]) => ({ ladder, measures }));
}
