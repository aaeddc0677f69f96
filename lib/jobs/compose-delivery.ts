import { createHash } from "node:crypto";
import type postgres from "postgres";
import type { RenderedBriefing } from "../briefings/rendered";
import { formatDay } from "../i18n/dates";
import type { Locale } from "../i18n/locales";
import { prepareMessage, type Reader, returnPathOf, type Sender } from "../mail/compose";
import type { MailModel } from "../mail/model";
import { briefingMail, withdrawalMail } from "../mail/templates/briefing";
import { type Authority, confirmMail, invitationMail, signInMail } from "../mail/templates/transactional";
import { writeMail } from "../mail/write-mail";
import { chooseSaid } from "../publications/published";
import { subscriptionToken } from "../subscribers/token";
import type { Composed } from "./dispatcher";
import type { Claimed } from "./outbox";

export type ComposeOptions = { sql: postgres.Sql; sender: Sender; contact: string; demonstration: boolean };

const KEPT = 40;
type Prepared = (reader: Reader) => Promise<Buffer>;
const boundaryOf = (key: string): string => createHash("sha256").update(key).digest("hex").slice(0, 32);

/** Writes deliveries as messages. A release is read, rendered and encoded once per language; a reader costs a join. */
export function deliveryComposer({ sql, sender, contact, demonstration }: ComposeOptions): (row: Claimed) => Promise<Composed> {
  const authority: Authority = { name: sender.authority, contact, demonstration };
  const prepared = new Map<string, Promise<Prepared>>();

  function ofRelease(releaseId: string, locale: Locale, kind: "briefing" | "withdrawal"): Promise<Prepared> {
    const key = `${releaseId} ${locale} ${kind}`;
    const kept = prepared.get(key);
    if (kept) return kept;
    const model = (kind === "briefing" ? releaseModel : withdrawalModel)(sql, releaseId, locale, sender.base);
    const made = model.then((mail) => prepareMessage(writeMail(mail), { locale, list: true, boundary: boundaryOf(key) }, sender));
    made.catch(() => prepared.delete(key));
    prepared.set(key, made);
    for (const oldest of prepared.keys()) if (prepared.size > KEPT) prepared.delete(oldest);
    return made;
  }

  async function ofOne(row: Claimed & { kind: "signIn" | "invitation" | "confirmSubscription" }): Promise<Prepared> {
    const mail = await { signIn: signInMail, invitation: invitationMail, confirmSubscription: confirmMail }[row.kind](row.locale, row.payload, authority);
    return prepareMessage(writeMail(mail), { locale: row.locale, list: false, boundary: boundaryOf(row.messageId) }, sender);
  }

  return async (row) => {
    const returnPath = returnPathOf(row.id, sender.domain);
    const reader = { to: row.recipient, messageId: row.messageId, date: row.createdAt };
    if (row.kind !== "briefing" && row.kind !== "withdrawal") {
      const write = await ofOne({ ...row, kind: row.kind });
      return { returnPath, message: await write({ ...reader, token: "", since: "" }) };
    }
    if (!row.releaseId || !row.subscriptionId || !row.confirmedAt) throw new Error("a delivery to the list names no release or no confirmed subscription");
    const write = await ofRelease(row.releaseId, row.locale, row.kind);
    return { returnPath, message: await write({ ...reader, token: subscriptionToken(row.subscriptionId), since: formatDay(row.confirmedAt.toISOString(), row.locale) }) };
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
