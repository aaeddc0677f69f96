import type { Metadata } from "next";
import Link from "next/link";
import { getTranslations } from "next-intl/server";
import { getDeskFormatter } from "@/lib/i18n/desk-formatter";
import { requireStaff, staffCtx } from "@/app/(desk)/_lib/session";
import { Note, PageHead } from "@/components/desk/page-parts";
import { Button } from "@/components/ui/button";
import { AUDIT_ACTIONS } from "@/lib/audit/entries";
import { listRegister, PAGE_ROWS, readChain } from "@/lib/audit/queries";
import { firstFault, GENESIS } from "@/lib/audit/verify";
import { ScrollFrame } from "@/components/ui/scroll-frame";

export const metadata: Metadata = { title: "Register" };

type Search = Promise<Record<string, string | string[] | undefined>>;

export default async function RegisterPage({ searchParams }: { searchParams: Search }) {
  const actor = await requireStaff("register:read");
  const search = await searchParams;
  const one = (name: string) => (typeof search[name] === "string" && search[name] !== "" ? (search[name] as string) : undefined);
  const before = Number(one("before"));
  const filter = { action: AUDIT_ACTIONS.find((action) => action === one("action")), subject: one("subject"), before: Number.isSafeInteger(before) && before > 0 ? before : undefined };
  const entries = await listRegister(await staffCtx(actor), filter);
  const [t, format] = await Promise.all([getTranslations("Register"), getDeskFormatter()]);
  const oldest = entries.at(-1)?.seq;
  const newest = entries[0]?.seq;
  // The run between the oldest and newest shown, whatever the filter hides in between.
  const run = oldest === undefined || newest === undefined ? [] : await readChain(Math.max(1, oldest - 1), newest);
  const fault = firstFault(run, run[0]?.seq === 1 ? GENESIS : null);
  const query = (extra: { before?: string }) =>
    `/desk/register?${new URLSearchParams({ ...(filter.action ? { action: filter.action } : {}), ...(filter.subject ? { subject: filter.subject } : {}), ...extra })}`;
  return (
    <main id="main" className="wrap">
      <PageHead title={t("title")} lede={t("lede")} />
      <form method="get" className="mt-6 flex flex-wrap items-end gap-4">
        <div className="w-64">
          <label htmlFor="action">{t("action")}</label>
          <select id="action" name="action" className="inp" defaultValue={filter.action ?? ""}>
            <option value="">{t("anyAction")}</option>
            {AUDIT_ACTIONS.map((action) => (
              <option key={action} value={action}>
                {t(`actions.${action}`)}
              </option>
            ))}
          </select>
        </div>
        <div className="w-72">
          <label htmlFor="subject">{t("subjectFilter")}</label>
          <input id="subject" name="subject" className="inp" defaultValue={filter.subject ?? ""} />
        </div>
        <Button type="submit">{t("apply")}</Button>
      </form>
      <div className="mt-5">
        {entries.length === 0 ? null : fault ? <Note tone="bad">{t("broken", { seq: String(fault.seq) })}</Note> : <p className="sm mut">{t("intact", { count: run.length })}</p>}
      </div>
      {entries.length === 0 ? (
        <p className="py-6">{t("empty")}</p>
      ) : (
        <ScrollFrame label={t("title")} className="mt-3">
          <table className="head">
            <thead>
              <tr>
                <th scope="col">{t("number")}</th>
                <th scope="col">{t("time")}</th>
                <th scope="col">{t("who")}</th>
                <th scope="col">{t("what")}</th>
                <th scope="col">{t("subject")}</th>
                <th scope="col">{t("fingerprint")}</th>
              </tr>
            </thead>
            <tbody>
              {entries.map((entry) => (
                <tr key={entry.seq}>
                  <td className="dim">{entry.seq}</td>
                  <td className="sm nw">{format.dateTime(entry.at, { day: "numeric", month: "short", year: "numeric", hour: "2-digit", minute: "2-digit", second: "2-digit" })}</td>
                  <th scope="row">{entry.actorName ?? (entry.actor === "visitor" ? t("visitor") : t("system", { process: entry.actor.replace(/^system:/, "") }))}</th>
                  <td>{t(`actions.${entry.action as (typeof AUDIT_ACTIONS)[number]}`)}</td>
                  <td className="sm">
                    <Link className="q" href={`/desk/register?subject=${encodeURIComponent(entry.subject)}`}>
                      {entry.subject.length > 40 ? `${entry.subject.slice(0, 24)}…` : entry.subject}
                    </Link>
                  </td>
                  <td className="xs dim">{Buffer.from(entry.hash).toString("hex").slice(0, 16)}</td>
                </tr>
              ))}
            </tbody>
          </table>
        </ScrollFrame>
      )}
      <div className="mt-4 flex gap-6">
        {filter.before ? <Link href={query({})}>{t("newest")}</Link> : null}
        {entries.length === PAGE_ROWS && oldest ? <Link href={query({ before: String(oldest) })}>{t("older")}</Link> : null}
      </div>
    </main>
  );
}
