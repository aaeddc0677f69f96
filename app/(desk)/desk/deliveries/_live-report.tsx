"use client";
import { QueryClient, QueryClientProvider, useQuery } from "@tanstack/react-query";
import Link from "next/link";
import { useFormatter, useTranslations } from "next-intl";
import { useState } from "react";
import { Section } from "@/components/desk/page-parts";
import { CheckMark } from "@/components/ui/marks";
import { ALARMS, type Counts, type DeliveryReport } from "@/lib/deliveries/report";
import { ScrollFrame } from "@/components/ui/scroll-frame";

const POLL_MS = 3_000;
const COLUMNS = ["waiting", "accepted", "twice", "rejected", "suppressed", "unknown"] as const satisfies readonly (keyof Counts)[];

/** Counts that follow the outbox while the page is looked at; without a script they are those of the moment it was opened. */
export function LiveReport({ first }: { first: DeliveryReport }) {
  const [client] = useState(() => new QueryClient({ defaultOptions: { queries: { retry: 1 } } }));
  return (
    <QueryClientProvider client={client}>
      <Report first={first} />
    </QueryClientProvider>
  );
}

async function read(signal: AbortSignal): Promise<DeliveryReport> {
  const response = await fetch("/api/desk/deliveries", { signal });
  if (!response.ok) throw new Error(`status ${response.status}`);
  return (await response.json()) as DeliveryReport;
}

function Report({ first }: { first: DeliveryReport }) {
  const t = useTranslations("Deliveries");
  const format = useFormatter();
  const { data: report, isError } = useQuery({ queryKey: ["deliveries"], queryFn: ({ signal }) => read(signal), initialData: first, refetchInterval: POLL_MS, staleTime: POLL_MS });
  return (
    <>
      {/* One line in every case, so that nothing below it moves. */}
      <p className="sm mut mt-3">
        {isError ? t("stopped") : t("readAt", { time: format.dateTime(new Date(report.readAt), { hour: "2-digit", minute: "2-digit", second: "2-digit", hourCycle: "h23" }) })} <a href="/desk/deliveries">{t("again")}</a>
      </p>
      <Section title={t("releases.title")} note={t("releases.note")}>
        {report.releases.length === 0 ? (
          <p className="mut py-4">{t("releases.none")}</p>
        ) : (
          <CountTable
            caption={t("releases.title")}
            first={t("releases.release")}
            rows={report.releases.map((row) => ({
              key: `${row.releaseId} ${row.kind}`,
              counts: row,
              head: (
                <>
                  <Link href={`/desk/briefings/${row.briefingId}`}>{row.title}</Link>
                  <span className="sm mut block font-normal">
                    {t(`releases.${row.kind}`, { number: String(row.number), date: format.dateTime(new Date(row.publishedAt), { day: "numeric", month: "short", year: "numeric" }) })}, {t(`urgency.${row.urgency}`)}
                  </span>
                </>
              ),
            }))}
          />
        )}
      </Section>
      <Section title={t("kinds.title")} note={t("kinds.note")}>
        <CountTable caption={t("kinds.title")} first={t("kinds.kind")} rows={report.kinds.map((row) => ({ key: row.kind, counts: row, head: t(`kinds.${row.kind}`) }))} />
      </Section>
      <Section title={t("alarms.title")} note={t("alarms.note")}>
        <ul className="grid max-w-measure">
          {ALARMS.map((alarm) => {
            const count = report.alarms[alarm];
            // Suspended addresses are a fact to know, not a fault to mend.
            const state = count === 0 ? "passes" : alarm === "suspended" || alarm === "gaveUp" ? "looks" : "stops";
            return (
              <li key={alarm} className="flex items-baseline gap-3 border-b border-hair py-2">
                <span className="self-center">
                  <CheckMark state={state} />
                </span>
                <span>{t(`alarms.${alarm}`, { count })}</span>
              </li>
            );
          })}
        </ul>
      </Section>
    </>
  );
}

type Row = { key: string; head: React.ReactNode; counts: Counts };

function CountTable({ caption, first, rows }: { caption: string; first: string; rows: Row[] }) {
  const t = useTranslations("Deliveries.states");
  const format = useFormatter();
  return (
    <ScrollFrame label={caption}>
      <table className="head min-w-[720px] table-fixed">
        <caption className="sr-only">{caption}</caption>
        <thead>
          <tr>
            <th scope="col" className="w-[34%]">
              {first}
            </th>
            {COLUMNS.map((column) => (
              <th key={column} scope="col" className="text-end">
                {t(column)}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {rows.map(({ key, head, counts }) => (
            <tr key={key}>
              <th scope="row">{head}</th>
              {COLUMNS.map((column) => (
                <td key={column} className={`text-end tabular-nums ${counts[column] === 0 ? "dim" : ""} ${column === "unknown" && counts.unknown > 0 ? "font-semibold text-brass" : ""}`}>
                  {format.number(counts[column])}
                </td>
              ))}
            </tr>
          ))}
        </tbody>
      </table>
    </ScrollFrame>
  );
}
