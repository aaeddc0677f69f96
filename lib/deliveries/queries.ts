import { sql } from "drizzle-orm";
import { db } from "@/db/client";
import { requirePermission } from "@/lib/auth/require-permission";
import type { StaffCtx } from "@/lib/context";
import type { MailKind } from "../jobs/settle";
import type { Locale } from "../i18n/locales";
import { type Alarms, type Counts, type DeliveryReport, NO_COUNTS, type ReleaseCounts, type UnknownDelivery } from "./report";

const RELEASES_SHOWN = 12;
const UNKNOWN_SHOWN = 50;

const counts = sql`
  count(*) filter (where d.state in ('queued', 'deferred', 'sending'))::int as waiting,
  count(*) filter (where d.state = 'accepted')::int as accepted,
  count(*) filter (where d.state = 'rejected')::int as rejected,
  count(*) filter (where d.state = 'suppressed')::int as suppressed,
  count(*) filter (where d.state = 'unknown')::int as unknown,
  count(*) filter (where d.state = 'accepted' and d.unknown_at is not null)::int as twice`;

/** Where the deliveries of the newest releases and of mail to single people stand. Holds no address. */
export async function getDeliveryReport(ctx: StaffCtx): Promise<DeliveryReport> {
  requirePermission(ctx.actor, "delivery:read");
  const [releases, kinds, alarms] = await Promise.all([countReleases(), countKinds(), countAlarms()]);
  return { readAt: new Date().toISOString(), releases, kinds, alarms };
}

async function countReleases(): Promise<ReleaseCounts[]> {
  const rows = await db.execute<Omit<ReleaseCounts, "publishedAt"> & { publishedAt: Date | string }>(sql`
    with newest as (select id, briefing_id, number, urgency, published_at from releases order by published_at desc limit ${RELEASES_SHOWN})
    select r.id as "releaseId", r.briefing_id as "briefingId", r.number, r.urgency, r.published_at as "publishedAt", coalesce(d.kind, 'briefing') as kind,
      (select p.title from publications p where p.release_id = r.id order by p.locale = 'en' desc, p.locale limit 1) as title, ${counts}
    from newest r left join deliveries d on d.release_id = r.id
    group by r.id, r.briefing_id, r.number, r.urgency, r.published_at, d.kind
    order by r.published_at desc, d.kind desc`);
  return rows.map((row) => ({ ...row, publishedAt: new Date(row.publishedAt).toISOString() }));
}

const KINDS = ["signIn", "invitation", "confirmSubscription"] as const;

async function countKinds(): Promise<DeliveryReport["kinds"]> {
  const rows = await db.execute<Counts & { kind: (typeof KINDS)[number] }>(sql`
    select d.kind, ${counts} from deliveries d where d.release_id is null and d.created_at > now() - interval '30 days' group by d.kind`);
  return KINDS.map((kind) => rows.find((row) => row.kind === kind) ?? { kind, ...NO_COUNTS });
}

async function countAlarms(): Promise<Alarms> {
  const [row] = await db.execute<Alarms>(sql`
    select
      count(*) filter (where d.state in ('queued', 'deferred') and d.next_at < now() - interval '2 minutes'
        and (d.release_id is null or (s.state = 'active' and s.suppressed_at is null)))::int as overdue,
      count(*) filter (where d.state = 'deferred' and d.reply in ('ESOCKET', 'ECONNECTION', 'ETIMEDOUT', 'EDNS', 'ETLS'))::int as unreachable,
      count(*) filter (where d.state = 'deferred' and (d.reply ~ '^(530|535)' or d.reply in ('EAUTH', 'ENOAUTH') or (d.reply ~ '^5' and d.reply !~ '^552|5\\.2\\.2')))::int as "refusedUs",
      count(*) filter (where d.state = 'rejected' and d.reply like '% 5.7.%' and d.finished_at > now() - interval '7 days')::int as policy,
      count(*) filter (where d.state = 'rejected' and d.reply !~ '^5' and d.reply <> 'EXPIRED' and d.finished_at > now() - interval '7 days')::int as "gaveUp",
      (select count(*) from subscriptions where suppressed_at is not null)::int as suspended
    from deliveries d left join subscriptions s on s.id = d.subscription_id`);
  return row ?? { overdue: 0, unreachable: 0, refusedUs: 0, policy: 0, gaveUp: 0, suspended: 0 };
}

/** Deliveries whose outcome is lost and stays so, newest first. */
export async function listUnknown(ctx: StaffCtx): Promise<UnknownDelivery[]> {
  requirePermission(ctx.actor, "delivery:read");
  const rows = await db.execute<{ id: string; title: string | null; kind: MailKind; locale: Locale; at: Date | string; reply: string | null }>(sql`
    select d.id, d.kind, d.locale, d.unknown_at as at, d.reply,
      (select p.title from publications p where p.release_id = d.release_id order by p.locale = 'en' desc, p.locale limit 1) as title
    from deliveries d where d.state = 'unknown' order by d.unknown_at desc nulls last limit ${UNKNOWN_SHOWN}`);
  return rows.map((row) => ({ ...row, at: new Date(row.at).toISOString() }));
}
