import { and, desc, eq, gt } from "drizzle-orm";
import { db } from "@/db/client";
import { deliveries, publications, releases, subscriptions } from "@/db/schema";
import type { Locale } from "../i18n/locales";
import { UNDO_WITHIN_MINUTES } from "./constants";
import { hashConfirmToken, isConfirmToken, readSubscriptionToken } from "./token";

export type SubscriptionShown = {
  /** First letter and domain: enough to recognise one's own, too little to learn somebody else's. */
  address: string;
  locale: Locale;
  state: "pending" | "active" | "left";
  confirmedAt: string | null;
  canUndo: boolean;
  lastMail: { at: string; title: string; slug: string } | null;
};

/** What a manage link shows, or null where there is no such subscription (any more). */
export async function findSubscription(token: string, now: Date): Promise<SubscriptionShown | null> {
  const id = readSubscriptionToken(token);
  if (!id) return null;
  const [row] = await db
    .select({
      email: subscriptions.email,
      locale: subscriptions.locale,
      state: subscriptions.state,
      confirmedAt: subscriptions.confirmedAt,
      leftAt: subscriptions.leftAt,
    })
    .from(subscriptions)
    .where(eq(subscriptions.id, id));
  if (!row) return null;
  const [last] = await db
    .select({ at: deliveries.finishedAt, title: publications.title, slug: releases.slug })
    .from(deliveries)
    .innerJoin(releases, eq(releases.id, deliveries.releaseId))
    .innerJoin(publications, and(eq(publications.releaseId, releases.id), eq(publications.locale, deliveries.locale)))
    .where(and(eq(deliveries.subscriptionId, id), eq(deliveries.state, "accepted")))
    .orderBy(desc(deliveries.finishedAt))
    .limit(1);
  const undoUntil = row.leftAt ? row.leftAt.getTime() + UNDO_WITHIN_MINUTES * 60_000 : 0;
  return {
    address: maskAddress(row.email),
    locale: row.locale,
    state: row.state,
    confirmedAt: row.confirmedAt?.toISOString() ?? null,
    canUndo: row.state === "left" && row.confirmedAt !== null && undoUntil > now.getTime(),
    lastMail: last?.at ? { at: last.at.toISOString(), title: last.title, slug: last.slug } : null,
  };
}

/** Whether a confirmation link would still work; looking doesn't use it up. */
export async function canConfirm(token: string, now: Date): Promise<boolean> {
  if (!isConfirmToken(token)) return false;
  const [row] = await db
    .select({ id: subscriptions.id })
    .from(subscriptions)
    .where(and(eq(subscriptions.confirmTokenHash, hashConfirmToken(token)), gt(subscriptions.confirmExpires, now)));
  return row !== undefined;
}

export function maskAddress(email: string): string {
  const at = email.lastIndexOf("@");
  return `${email.slice(0, 1)}…${email.slice(at)}`;
}
