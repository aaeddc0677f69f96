import { sql } from "drizzle-orm";
import { check, index, integer, jsonb, pgTable, text, uniqueIndex, uuid } from "drizzle-orm/pg-core";
import type { Locale } from "../../lib/i18n/locales";
import { at, createdAt, id, sha256 } from "./columns";
import { releases } from "./publications";

/** Consent record and nothing more: address, language, text version, times, method. */
export const subscriptions = pgTable(
  "subscriptions",
  {
    id: id(),
    /** Lower-cased, NFC. */
    email: text("email").notNull(),
    locale: text("locale").$type<Locale>().notNull(),
    state: text("state").$type<"pending" | "active" | "left">().notNull().default("pending"),
    /** Version of the consent text that was shown. */
    consentText: text("consent_text").notNull(),
    method: text("method").$type<"form" | "import" | "demonstration">().notNull().default("form"),
    requestedAt: at("requested_at").notNull(),
    confirmedAt: at("confirmed_at"),
    leftAt: at("left_at"),
    /** SHA-256 of the confirmation token; null once used. */
    confirmTokenHash: sha256("confirm_token_hash"),
    confirmExpires: at("confirm_expires"),
    /** A second 5xx suspends; see deliveries for why. */
    suppressedAt: at("suppressed_at"),
  },
  (t) => [
    uniqueIndex("subscriptions_email").on(t.email),
    index("subscriptions_active").on(t.locale).where(sql`${t.state} = 'active'`),
    uniqueIndex("subscriptions_confirm").on(t.confirmTokenHash).where(sql`${t.confirmTokenHash} is not null`),
    check("subscriptions_state", sql`${t.state} in ('pending','active','left')`),
    check("subscriptions_active_confirmed", sql`${t.state} <> 'active' or ${t.confirmedAt} is not null`),
  ],
);

/**
 * The outbox: one row per mail, written in the transaction that it belongs to. For releases one row per
 * (release, subscription, kind), which is also the permanent record of what happened.
 */
export const deliveries = pgTable(
  "deliveries",
  {
    id: id(),
    kind: text("kind").$type<"signIn" | "invitation" | "confirmSubscription" | "briefing" | "withdrawal">().notNull(),
    releaseId: uuid("release_id").references(() => releases.id),
    subscriptionId: uuid("subscription_id").references(() => subscriptions.id, { onDelete: "set null" }),
    /** Address for mail that isn't a briefing; null for briefings, which read the subscription, and after scrubbing. */
    recipient: text("recipient"),
    locale: text("locale").$type<Locale>().notNull(),
    /** Template arguments (links with one-time tokens); emptied once the mail is final. */
    payload: jsonb("payload").$type<Record<string, string>>().notNull().default({}),
    state: text("state")
      .$type<"queued" | "sending" | "accepted" | "deferred" | "rejected" | "unknown" | "suppressed">()
      .notNull()
      .default("queued"),
    attempts: integer("attempts").notNull().default(0),
    nextAt: at("next_at").notNull().defaultNow(),
    leaseToken: uuid("lease_token"),
    leaseUntil: at("lease_until"),
    /** Set before the connection is opened, so that a resend carries the same one. */
    messageId: text("message_id"),
    /** Set before the last bytes of the message go out: from here on the server may have taken it. Null: it can't have. */
    endingAt: at("ending_at"),
    /** When the outcome of an attempt was lost; stays, so that a mail sent twice can be told from one sent once. */
    unknownAt: at("unknown_at"),
    /** Last SMTP reply code and enhanced status, never the text (it may hold the address). */
    reply: text("reply"),
    createdAt: createdAt(),
    finishedAt: at("finished_at"),
  },
  (t) => [
    uniqueIndex("deliveries_once").on(t.releaseId, t.subscriptionId, t.kind).where(sql`${t.releaseId} is not null`),
    index("deliveries_due").on(t.nextAt).where(sql`${t.state} in ('queued','deferred')`),
    // Mail to one person is looked for first, also behind fifty thousand briefings.
    index("deliveries_due_single").on(t.nextAt).where(sql`${t.state} in ('queued','deferred') and ${t.releaseId} is null`),
    index("deliveries_leased").on(t.leaseUntil).where(sql`${t.state} = 'sending'`),
    index("deliveries_release").on(t.releaseId, t.state),
    check(
      "deliveries_state",
      sql`${t.state} in ('queued','sending','accepted','deferred','rejected','unknown','suppressed')`,
    ),
    check("deliveries_kind", sql`${t.kind} in ('signIn','invitation','confirmSubscription','briefing','withdrawal')`),
  ],
);

/** Counters for limits, by hashed network or address; purged by age. */
export const rateLimits = pgTable("rate_limits", {
  key: text("key").primaryKey(),
  points: integer("points").notNull(),
  windowEnds: at("window_ends").notNull(),
});
