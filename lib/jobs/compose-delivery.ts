import type postgres from "postgres";
import type { RenderedBriefing } from "../briefings/rendered";
import { formatDay } from "../i18n/dates";
import type { Locale } from "../i18n/locales";
import { composeMessage, returnPathOf, type Sender } from "../mail/compose";
import { type MailModel, personalise, type WrittenMail } from "../mail/model";
import { briefingMail, withdrawalMail } from "../mail/templates/briefing";
import { type Authority, confirmMail, invitationMail, signInMail } from "../mail/templates/transactional";
import { writeMail } from "../mail/write-mail";
import { chooseSaid } from "../publications/published";
import { subscriptionToken } from "../subscribers/token";
import type { Composed } from "./dispatcher";
import type { Claimed } from "./outbox";

export type ComposeOptions = { sql: postgres.Sql; sender: Sender; contact: string; demonstration: boolean };

const KEPT = 40;

/**
 * Writes deliveries as messages. A release is read and rendered once per language; what differs from reader to reader
 * is filled into the finished text, so that fifty thousand mails cost fifty thousand replacements and no rendering.
 */
export function deliveryComposer({ sql, sender, contact, demonstration }: ComposeOptions): (row: Claimed) => Promise<Composed> {
  const authority: Authority = { name: sender.authority, contact, demonstration };
  const written = new Map<string, Promise<WrittenMail>>();

  function ofRelease(releaseId: string, locale: Locale, kind: "briefing" | "withdrawal"): Promise<WrittenMail> {
    const key = `${releaseId} ${locale} ${kind}`;
    const kept = written.get(key);
    if (kept) return kept;
    const made = (kind === "briefing" ? releaseModel : withdrawalModel)(sql, releaseId, locale, sender.base).then(writeMail);
    made.catch(() => written.delete(key));
    written.set(key, made);
    for (const oldest of written.keys()) if (written.size > KEPT) written.delete(oldest);
    return made;
  }

  return async (row) => {
    const returnPath = returnPathOf(row.id, sender.domain);
    const facts = { to: row.recipient, locale: row.locale, messageId: row.messageId, date: row.createdAt };
    if (row.kind !== "briefing" && row.kind !== "withdrawal") {
      const model = await { signIn: signInMail, invitation: invitationMail, confirmSubscription: confirmMail }[row.kind](row.locale, row.payload, authority);
      return { returnPath, message: await composeMessage(writeMail(model), { ...facts, list: null }, sender) };
    }
    if (!row.releaseId || !row.subscriptionId || !row.confirmedAt) throw new Error("a delivery to the list names no release or no confirmed subscription");
    const token = subscriptionToken(row.subscriptionId);
    const mail = personalise(await ofRelease(row.releaseId, row.locale, row.kind), { token, since: formatDay(row.confirmedAt.toISOString(), row.locale) });
    return { returnPath, message: await composeMessage(mail, { ...facts, list: { token } }, sender) };
  };
}

type ReleaseRow = {
  number: number;
  kind: "first" | "update" | "correction";
  publishedAt: Date;
  correction: Partial<Record<Locale, { cause: string; effect: string }>>;
  content: string;
  before: string | null;
  notice: Partial<Record<Locale, string>> | null;
};

async function readRelease(sql: postgres.Sql, releaseId: string, locale: Locale): Promise<ReleaseRow> {
  const [row] = await sql<ReleaseRow[]>`
    select r.number, r.kind, r.published_at as "publishedAt", r.correction, p.content,
      (select q.content from releases b join publications q on q.release_id = b.id and q.locale = p.locale
       where b.briefing_id = r.briefing_id and b.number = r.number - 1) as before,
      (select e.notice from release_events e where e.release_id = r.id and e.kind = 'withdrawn') as notice
    from releases r join publications p on p.release_id = r.id and p.locale = ${locale}
    where r.id = ${releaseId}`;
  if (!row) throw new Error("a release has no text in the language of a delivery");
  return row;
}

async function releaseModel(sql: postgres.Sql, releaseId: string, locale: Locale, base: string): Promise<MailModel> {
  const row = await readRelease(sql, releaseId, locale);
  const said = chooseSaid(row.correction, locale);
  return briefingMail({
    content: asRendered(row.content),
    release: { number: row.number, kind: row.kind, publishedAt: row.publishedAt.toISOString() },
    correction: said && { lang: said.lang, ...said.value },
    before: row.kind === "correction" && row.before !== null ? asRendered(row.before) : null,
    base,
  });
}

async function withdrawalModel(sql: postgres.Sql, releaseId: string, locale: Locale, base: string): Promise<MailModel> {
  const row = await readRelease(sql, releaseId, locale);
  const said = chooseSaid(row.notice ?? {}, locale);
  return withdrawalMail({
    content: asRendered(row.content),
    release: { number: row.number, kind: row.kind, publishedAt: row.publishedAt.toISOString() },
    notice: said && { lang: said.lang, text: said.value },
    base,
  });
}

// Safe: the publishing command alone writes these rows, from a RenderedBriefing, and they never change.
const asRendered = (text: string): RenderedBriefing => JSON.parse(text) as RenderedBriefing;
