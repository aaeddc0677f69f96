import { sql } from "drizzle-orm";
import { deliveries } from "@/db/schema";
import type { Tx } from "@/lib/context";
import type { Locale } from "@/lib/i18n/locales";

/** Mail to one person that isn't a briefing. Links in `payload` are whole addresses; it is emptied once the mail is final. */
export type MailOrder = {
  kind: "signIn" | "invitation" | "confirmSubscription";
  recipient: string;
  locale: Locale;
  payload: Record<string, string>;
  nextAt?: Date;
};

/** Puts one mail in the outbox, in the transaction that it belongs to. */
export async function enqueueMail(tx: Tx, { kind, recipient, locale, payload, nextAt }: MailOrder): Promise<void> {
  await tx.insert(deliveries).values({ kind, recipient, locale, payload, ...(nextAt ? { nextAt } : {}) });
  await hint(tx);
}

/**
 * One delivery per active subscriber of a release, in the publishing transaction; in the subscriber's language where
 * the release has it, else in English, else in any language that it has.
 * @returns how many
 */
export async function enqueueRelease(tx: Tx, { releaseId, holdMinutes }: { releaseId: string; holdMinutes: number }): Promise<number> {
  const rows = await tx.execute(sql`
    insert into deliveries (kind, release_id, subscription_id, locale, next_at)
    select 'briefing', ${releaseId}, s.id,
           case when s.locale = any(l.locales) then s.locale when 'en' = any(l.locales) then 'en' else l.locales[1] end,
           now() + make_interval(mins => ${holdMinutes})
    from subscriptions s
    cross join (select array_agg(locale order by locale) as locales from publications where release_id = ${releaseId}) l
    where s.state = 'active' and s.suppressed_at is null and l.locales is not null
    on conflict do nothing`);
  await hint(tx);
  return Number((rows as unknown as { count: number }).count);
}

/**
 * One delivery per subscriber who got a release that is now withdrawn, or may have got it: they had the faulty text in
 * hand. In the language in which they got it, in the withdrawing transaction, without a hold.
 * @returns how many
 */
export async function enqueueWithdrawal(tx: Tx, { releaseId }: { releaseId: string }): Promise<number> {
  const rows = await tx.execute(sql`
    insert into deliveries (kind, release_id, subscription_id, locale)
    select 'withdrawal', d.release_id, d.subscription_id, d.locale
    from deliveries d join subscriptions s on s.id = d.subscription_id
    where d.release_id = ${releaseId} and d.kind = 'briefing' and d.state in ('accepted', 'unknown', 'sending')
      and s.state = 'active' and s.suppressed_at is null
    on conflict do nothing`);
  await hint(tx);
  return Number((rows as unknown as { count: number }).count);
}

/** Wakes the worker at commit; it also looks by itself every second. */
const hint = (tx: Tx) => tx.execute(sql`select pg_notify('ebbmark_outbox', '')`);
