import type postgres from "postgres";
import type { Locale } from "../i18n/locales";
import type { MailKind, Settlement } from "./settle";

export type Claimed = {
  id: string;
  kind: MailKind;
  locale: Locale;
  releaseId: string | null;
  subscriptionId: string | null;
  recipient: string;
  payload: Record<string, string>;
  /** When the reader confirmed the subscription; null for mail that isn't to the list. */
  confirmedAt: Date | null;
  createdAt: Date;
  ageMs: number;
  attempts: number;
  lostBefore: boolean;
  resend: boolean;
  messageId: string;
  leaseToken: string;
};

type Sql = postgres.Sql;
type Tx = postgres.TransactionSql;

/** Settings of the dispatcher's own connections. */
export const OUTBOX_CONNECTION = {
  application_name: "ebbmark-dispatcher",
  statement_timeout: 15_000,
  idle_in_transaction_session_timeout: 15_000,
  lock_timeout: 5_000,
  TimeZone: "UTC",
  // Just after a mailing was queued the planner still believes the table empty, and would read it whole for each claim.
  enable_bitmapscan: "off",
  enable_seqscan: "off",
  jit: "off",
} as const;

/**
 * Takes up to `limit` deliveries that are due, mail to one person first, and commits them as `sending` with lease and
 * Message-ID before anything is connected.
 */
export async function claim(sql: Sql, { limit, leaseSeconds, domain }: { limit: number; leaseSeconds: number; domain: string }): Promise<Claimed[]> {
  return sql.begin(async (tx) => {
    const single = await tx<{ id: string }[]>`
      select id from deliveries where state in ('queued', 'deferred') and next_at <= now() and release_id is null
      order by next_at limit ${limit} for update skip locked`;
    const listed = single.length < limit ? await pickListed(tx, limit - single.length) : [];
    const ids = [...single.map(({ id }) => id), ...listed];
    if (ids.length === 0) return [];
    const rows = await tx<Claimed[]>`
      with lease as (select gen_random_uuid() as token)
      update deliveries d
      set state = 'sending', attempts = d.attempts + 1, lease_token = lease.token,
          lease_until = now() + make_interval(secs => ${leaseSeconds}), ending_at = null,
          message_id = coalesce(d.message_id, '<' || d.id || '@' || ${domain}::text || '>')
      from lease, deliveries o
      left join subscriptions s on s.id = o.subscription_id
      left join releases r on r.id = o.release_id
      where d.id = any(${ids}) and o.id = d.id
      returning d.id, d.kind, d.locale, d.release_id as "releaseId", d.subscription_id as "subscriptionId",
        coalesce(s.email, d.recipient) as recipient, d.payload, s.confirmed_at as "confirmedAt", d.created_at as "createdAt",
        (extract(epoch from now() - d.created_at) * 1000)::float8 as "ageMs", d.attempts,
        d.unknown_at is not null as "lostBefore", (r.id is null or r.urgency = 'urgent') as resend,
        d.message_id as "messageId", d.lease_token as "leaseToken"`;
    return [...rows];
  }) as Promise<Claimed[]>;
}

/**
 * Locks deliveries to the list, and shares their subscriptions until the claim commits: an unsubscribe that has committed
 * is seen by the second statement, and one that is under way keeps its delivery for the next look. What may not go out
 * any more is held back at once, so that it never stands in the way of the rest.
 */
async function pickListed(tx: Tx, limit: number): Promise<string[]> {
  const due = await tx<{ id: string; kind: MailKind; releaseId: string; subscriptionId: string | null }[]>`
    select id, kind, release_id as "releaseId", subscription_id as "subscriptionId" from deliveries
    where state in ('queued', 'deferred') and next_at <= now() and release_id is not null
    order by next_at limit ${limit} for update skip locked`;
  if (due.length === 0) return [];
  const subscriptionIds = due.flatMap(({ subscriptionId }) => subscriptionId ?? []);
  const shared = await tx<{ id: string; may: boolean }[]>`
    select id, state = 'active' and suppressed_at is null as may from subscriptions
    where id = any(${subscriptionIds}) for share skip locked`;
  const closed = await tx<{ id: string }[]>`select release_id as id from release_events where release_id = any(${due.map(({ releaseId }) => releaseId)})`;
  const may = new Map(shared.map((row) => [row.id, row.may]));
  const over = new Set(closed.map(({ id }) => id));
  const barred = due.filter(({ kind, releaseId, subscriptionId }) => subscriptionId === null || may.get(subscriptionId) === false || (kind === "briefing" && over.has(releaseId)));
  if (barred.length > 0) await tx`update deliveries set state = 'suppressed', finished_at = now() where id = any(${barred.map(({ id }) => id)})`;
  return due.filter((row) => !barred.includes(row) && row.subscriptionId !== null && may.get(row.subscriptionId) === true).map(({ id }) => id);
}

/** Notes that the last bytes of these may go out from now on. @returns those whose lease still holds */
export async function markEnding(sql: Sql, rows: readonly { id: string; leaseToken: string }[]): Promise<Set<string>> {
  const marked = await sql<{ id: string }[]>`
    update deliveries d set ending_at = now()
    from jsonb_to_recordset(${sql.json(rows.map(({ id, leaseToken }) => ({ id, token: leaseToken })))}) as r(id uuid, token uuid)
    where d.id = r.id and d.lease_token = r.token and d.state = 'sending' and d.lease_until > now()
    returning d.id`;
  return new Set(marked.map(({ id }) => id));
}

export type Settled = { id: string; leaseToken: string; subscriptionId: string | null; settlement: Settlement };

/**
 * Writes results, whoever still holds the lease. What is final loses its address and its links. A 5yz reply may suspend
 * the address: at once where it doesn't exist, else at the second one.
 * @returns ids that were written; the others have been recovered by somebody else
 */
export async function writeSettled(sql: Sql, results: readonly Settled[]): Promise<Set<string>> {
  const records = results.map(({ id, leaseToken, settlement: { state, delayMs, reply, lost } }) => ({ id, token: leaseToken, state, delay: delayMs, reply, lost }));
  const write = (on: Sql | Tx) => on<{ id: string }[]>`
    update deliveries d
    set state = r.state, reply = r.reply, lease_token = null, lease_until = null, ending_at = null,
        unknown_at = case when r.lost then coalesce(d.unknown_at, now()) else d.unknown_at end,
        next_at = case when r.delay is null then d.next_at else now() + make_interval(secs => r.delay / 1000 * (1 + random() * 0.1)) end,
        finished_at = case when r.delay is null then now() end,
        recipient = case when r.delay is null then null else d.recipient end,
        payload = case when r.delay is null then '{}'::jsonb else d.payload end
    from jsonb_to_recordset(${sql.json(records)}) as r(id uuid, token uuid, state text, delay float8, reply text, lost boolean)
    where d.id = r.id and d.lease_token = r.token and d.state = 'sending'
    returning d.id`;
  const rejected = results.filter(({ subscriptionId, settlement }) => subscriptionId !== null && settlement.state === "rejected");
  if (rejected.length === 0) return new Set((await write(sql)).map(({ id }) => id));
  return sql.begin(async (tx) => {
    // In the order in which an unsubscribe locks: the subscription first.
    const concerned = rejected.map(({ subscriptionId }) => subscriptionId ?? "");
    await tx`select id from subscriptions where id = any(${concerned}) order by id for update`;
    const written = new Set((await write(tx)).map(({ id }) => id));
    const gone = rejected.filter(({ id, settlement }) => settlement.suppress && written.has(id)).map(({ subscriptionId }) => subscriptionId ?? "");
    await suspend(tx, concerned, gone);
    return written;
  }) as Promise<Set<string>>;
}

/** @param gone addresses that don't exist; the others of `concerned` are suspended if this was their second refusal */
async function suspend(tx: Tx, concerned: string[], gone: string[]): Promise<void> {
  const suspended = await tx<{ id: string }[]>`
    update subscriptions s set suppressed_at = now()
    where s.suppressed_at is null and s.id = any(${concerned})
      and (s.id = any(${gone}) or 2 <= (
        select count(*) from deliveries d
        where d.subscription_id = s.id and d.state = 'rejected' and d.reply like '5%' and d.reply not like '% 5.7.%'))
    returning s.id`;
  if (suspended.length === 0) return;
  await tx`
    update deliveries set state = 'suppressed', finished_at = now()
    where subscription_id = any(${suspended.map(({ id }) => id)}) and state in ('queued', 'deferred')`;
}

export type Recovered = { queued: number; resent: number; unknown: number };

/**
 * Takes back what was being sent when its lease ran out, by the database's clock. Where the last bytes can't have gone
 * out it waits again. Where they may have, urgent mail goes out once more with the same Message-ID; the rest is `unknown`.
 */
export async function recover(sql: Sql): Promise<Recovered> {
  const rows = await sql<{ state: string; lost: boolean }[]>`
    with expired as (
      select d.id, d.ending_at is not null as lost,
             case when d.ending_at is null or (d.unknown_at is null and (r.id is null or r.urgency = 'urgent')) then 'queued' else 'unknown' end as state
      from deliveries d left join releases r on r.id = d.release_id
      where d.state = 'sending' and d.lease_until <= now()
      for update of d skip locked)
    update deliveries d
    set state = e.state, lease_token = null, lease_until = null, ending_at = null, next_at = now(),
        unknown_at = case when e.lost then coalesce(d.unknown_at, now()) else d.unknown_at end,
        finished_at = case when e.state = 'unknown' then now() end,
        recipient = case when e.state = 'unknown' then null else d.recipient end,
        payload = case when e.state = 'unknown' then '{}'::jsonb else d.payload end
    from expired e where d.id = e.id
    returning e.state, e.lost`;
  const count = (state: string, lost: boolean) => rows.filter((row) => row.state === state && row.lost === lost).length;
  return { queued: count("queued", false), resent: count("queued", true), unknown: count("unknown", true) };
}

/** Gives back what was claimed and not begun, at a graceful stop. The attempt didn't happen. */
export async function release(sql: Sql, rows: readonly { id: string; leaseToken: string }[]): Promise<number> {
  if (rows.length === 0) return 0;
  const released = await sql`
    update deliveries d set state = 'queued', lease_token = null, lease_until = null, attempts = d.attempts - 1
    from jsonb_to_recordset(${sql.json(rows.map(({ id, leaseToken }) => ({ id, token: leaseToken })))}) as r(id uuid, token uuid)
    where d.id = r.id and d.lease_token = r.token and d.state = 'sending' and d.ending_at is null`;
  return released.count;
}

/** Holds back for good what must not go out any more: to those who left, and of releases that were replaced or withdrawn. */
export async function holdBack(sql: Sql): Promise<number> {
  const held = await sql`
    update deliveries d set state = 'suppressed', finished_at = now()
    where d.state in ('queued', 'deferred') and d.release_id is not null and (
      not exists (select from subscriptions s where s.id = d.subscription_id and s.state = 'active' and s.suppressed_at is null)
      or (d.kind = 'briefing' and exists (select from release_events e where e.release_id = d.release_id)))`;
  return held.count;
}
