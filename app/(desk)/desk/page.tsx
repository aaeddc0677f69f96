import type { Metadata } from "next";
import Link from "next/link";
import { getTranslations } from "next-intl/server";
import { getDeskFormatter } from "@/lib/i18n/desk-formatter";
import { requireStaff, staffCtx } from "@/app/(desk)/_lib/session";
import { PageHead, Section } from "@/components/desk/page-parts";
import { ButtonLink } from "@/components/ui/button";
import { StateMark } from "@/components/ui/marks";
import { listRegister } from "@/lib/audit/queries";
import { can } from "@/lib/auth/permissions";
import { listNewest, listTasks, type Task } from "@/lib/briefings/tasks";
import { listOutbreaks } from "@/lib/outbreaks/queries";
import { levelOf } from "./briefings/_level";
import { ScrollFrame } from "@/components/ui/scroll-frame";

export const metadata: Metadata = { title: "Desk" };

export default async function DeskHome() {
  const actor = await requireStaff();
  const ctx = await staffCtx(actor);
  const [t, states, acts, format, tasks, newest, entries, outbreaks] = await Promise.all([
    getTranslations("Desk.home"), getTranslations("Desk.states"), getTranslations("Register"), getDeskFormatter(), listTasks(ctx), listNewest(),
    can(actor.role, "register:read") ? listRegister(ctx, {}) : [], listOutbreaks(),
  ]);
  const head = (task: Task) =>
    task.kind === "invited" ? t("tasks.invited", { count: task.count }) : "name" in task ? t(`tasks.${task.kind}`, { name: task.name }) : t(`tasks.${task.kind}`, { number: String(task.number) });
  return (
    <main id="main" className="wrap">
      <PageHead title={t("title", { name: actor.name })} lede={t("lede", { count: tasks.length })} />
      <Section title={t("waiting")} note={t("waitingNote")}>
        {outbreaks.length === 0 ? (
          <div className="grid justify-items-start gap-3">
            <p className="font-semibold">{t("firstStep")}</p>
            <p className="mut">{can(actor.role, "outbreak:write") ? t("firstStepNote") : t("firstStepWait")}</p>
            {can(actor.role, "outbreak:write") ? (
              <ButtonLink look="primary" href="/desk/outbreaks/new">
                {t("newOutbreak")}
              </ButtonLink>
            ) : null}
          </div>
        ) : tasks.length === 0 ? (
          <p className="mut">{t("nothing")}</p>
        ) : (
          <ol className="border-t-2 border-ink">
            {tasks.map((task, index) => (
              <li key={`${task.kind}${task.href}`} className="grid grid-cols-[34px_minmax(0,1fr)_auto] items-start gap-4 border-b border-hair py-4">
                <span className="text-27 leading-[30px] font-light text-ink-3">{index + 1}</span>
                <div className="max-w-[40rem]">
                  <h3 className="text-17">{head(task)}</h3>
                  <p className="sm mut">{t(`tasks.${task.kind}Note`)}</p>
                </div>
                <ButtonLink look={index === 0 ? "primary" : "secondary"} href={task.href}>
                  {t("open")}
                </ButtonLink>
              </li>
            ))}
          </ol>
        )}
      </Section>
      <Section title={t("briefings")} note={t("briefingsNote")}>
        {newest.length === 0 ? (
          <p className="mut">{t("noBriefings")}</p>
        ) : (
          <ScrollFrame label={t("briefings")}>
            <table className="head">
              <thead>
                <tr>
                  <th scope="col">{t("number")}</th>
                  <th scope="col">{t("briefing")}</th>
                  <th scope="col">{t("state")}</th>
                  <th scope="col">{t("restsOn")}</th>
                </tr>
              </thead>
              <tbody>
                {newest.map((row) => (
                  <tr key={row.id}>
                    <td className="dim">{row.number}</td>
                    <th scope="row">
                      <Link className="q" href={`/desk/briefings/${row.id}`}>
                        {row.title.replace(/\{\{[^}]*\}\}/g, "…")}
                      </Link>
                    </th>
                    <td>
                      <span className="st">
                        <StateMark level={levelOf(row.state)} />
                        {states(row.state)}
                      </span>
                    </td>
                    <td className="sm mut">{t("restsOnAssessment", { number: String(row.assessmentNumber) })}</td>
                  </tr>
                ))}
              </tbody>
            </table>
          </ScrollFrame>
        )}
      </Section>
      {entries.length > 0 ? (
        <Section title={t("register")} note={t("registerNote")}>
          <ul>
            {entries.slice(0, 6).map((entry) => (
              <li key={entry.seq} className="border-b border-hair py-2">
                <b>{entry.actorName ?? (entry.actor === "visitor" ? acts("visitor") : acts("system", { process: entry.actor.replace(/^system:/, "") }))}</b> {acts(`actions.${entry.action as "user.invite"}`)}{" "}
                <span className="sm mut">{format.dateTime(entry.at, { day: "numeric", month: "short", hour: "2-digit", minute: "2-digit" })}</span>
              </li>
            ))}
          </ul>
        </Section>
      ) : null}
    </main>
  );
}
