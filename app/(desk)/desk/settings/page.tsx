import type { Metadata } from "next";
import { getTranslations } from "next-intl/server";
import { getDeskFormatter } from "@/lib/i18n/desk-formatter";
import { requireStaff, staffCtx } from "@/app/(desk)/_lib/session";
import { PageHead, Section } from "@/components/desk/page-parts";
import { can } from "@/lib/auth/permissions";
import { LOCALES } from "@/lib/i18n/locales";
import { listOwnSessions, listUsers } from "@/lib/users/queries";
import { EndSessionsForm, InviteForm, PersonForms } from "./_people-forms";
import { ScrollFrame } from "@/components/ui/scroll-frame";

export const metadata: Metadata = { title: "Settings" };

export default async function SettingsPage() {
  const actor = await requireStaff();
  const ctx = await staffCtx(actor);
  const manages = can(actor.role, "user:manage");
  const [t, roles, format, sessions, people] = await Promise.all([
    getTranslations("Users"),
    getTranslations("Roles"),
    getDeskFormatter(),
    listOwnSessions(ctx),
    manages ? listUsers(ctx) : [],
  ]);
  const moment = (date: Date) => format.dateTime(date, { day: "numeric", month: "short", year: "numeric", hour: "2-digit", minute: "2-digit" });
  return (
    <main id="main" className="wrap">
      <PageHead title={t("title")} lede={t("lede")} />
      <Section title={t("you")} note={t("youNote")}>
        <dl className="facts grid max-w-[720px] gap-x-8 md:grid-cols-2">
          {[
            [t("name"), actor.name],
            [t("email"), actor.email],
            [t("role"), roles(actor.role)],
            [t("language"), LOCALES[actor.locale].name],
          ].map(([term, value]) => (
            <div key={term}>
              <dt>{term}</dt>
              <dd>{value}</dd>
            </div>
          ))}
        </dl>
        <p className="mt-5 font-semibold">{t("sessions", { count: sessions.length })}</p>
        <ul className="sm mut mt-1 mb-4">
          {sessions.map(({ createdAt }) => (
            <li key={createdAt.toISOString()}>{t("since", { date: moment(createdAt) })}</li>
          ))}
        </ul>
        {sessions.length > 1 ? <EndSessionsForm /> : null}
      </Section>
      {manages ? (
        <>
          <Section title={t("people")} note={t("peopleNote")}>
            <ScrollFrame label={t("people")}>
              <table className="head">
                <thead>
                  <tr>
                    <th scope="col">{t("name")}</th>
                    <th scope="col">{t("email")}</th>
                    <th scope="col">{t("role")}</th>
                    <th scope="col">{t("state")}</th>
                    <th scope="col">{t("lastSignIn")}</th>
                  </tr>
                </thead>
                <tbody>
                  {people.map((person) => (
                    <tr key={person.id}>
                      <th scope="row">
                        {person.status === "left" || person.id === actor.id ? (
                          person.name
                        ) : (
                          <details>
                            <summary className="cursor-pointer">{person.name}</summary>
                            <PersonForms userId={person.id} name={person.name} role={person.role} />
                          </details>
                        )}
                      </th>
                      <td className="sm">{person.email}</td>
                      <td>{roles(person.role)}</td>
                      <td>{t(`status.${person.status}`)}</td>
                      <td className="sm mut">{person.lastSignIn ? moment(person.lastSignIn) : t("never")}</td>
                    </tr>
                  ))}
                </tbody>
              </table>
            </ScrollFrame>
          </Section>
          <Section title={t("invite")} note={t("inviteNote")}>
            <InviteForm key={people.length} />
          </Section>
        </>
      ) : null}
    </main>
  );
}
