import { eq, sql } from "drizzle-orm";
import { afterAll, describe, expect, test } from "vitest";
import { closeDb, db } from "@/db/client";
import { deliveries, subscriptions } from "@/db/schema";
import { changeSubscription } from "@/lib/subscribers/change-subscription";
import { confirmSubscription } from "@/lib/subscribers/confirm-subscription";
import { CONSENT_TEXT_VERSION, MAILS_PER_ADDRESS } from "@/lib/subscribers/constants";
import { eraseSubscriptions } from "@/lib/subscribers/erase-subscriptions";
import { leaveSubscription } from "@/lib/subscribers/leave-subscription";
import { canConfirm, findSubscription, maskAddress } from "@/lib/subscribers/queries";
import { requestSubscription } from "@/lib/subscribers/request-subscription";
import { readSubscriptionToken, subscriptionToken } from "@/lib/subscribers/token";
import { undoLeaving } from "@/lib/subscribers/undo-leaving";
import { systemCtx } from "@/lib/context";
import { takePoint } from "@/lib/rate-limits";
import { actionsOn, anAddress, aSubscriber, asVisitor, hours, mailsTo, newestToken, subscriptionOf } from "../fixtures/subscribers";

afterAll(closeDb);

const ask = (email: string, now = new Date()) => requestSubscription(asVisitor(now), { email, locale: "uk", page: "uk" });
const later = (ms: number) => new Date(Date.now() + ms);

describe("asking", () => {
  test("sends one confirmation mail and keeps nothing but the consent record", async () => {
    const email = anAddress();
    await ask(email);
    const row = await subscriptionOf(email);
    expect(row).toMatchObject({ email, locale: "uk", state: "pending", consentText: CONSENT_TEXT_VERSION, method: "form", confirmedAt: null });
    const mails = await mailsTo(email);
    expect(mails.map(({ kind, locale, state }) => ({ kind, locale, state }))).toEqual([{ kind: "confirmSubscription", locale: "uk", state: "queued" }]);
    const token = await newestToken(email);
    expect(row?.confirmTokenHash).not.toContain(token);
    expect(await actionsOn(row?.id ?? "")).toEqual(["subscription.request"]);
  });

  test("a known address gets the same outcome and the same mail as an unknown one", async () => {
    const { email } = await aSubscriber("fr");
    const before = await subscriptionOf(email);
    expect(await ask(email)).toEqual(await ask(anAddress()));
    const [mail] = await mailsTo(email);
    expect(mail).toMatchObject({ kind: "confirmSubscription", locale: "uk", state: "queued" });
    expect(Object.keys(mail?.payload ?? {}).sort()).toEqual(["hours", "link"]);
    expect(await subscriptionOf(email)).toMatchObject({ state: "active", locale: "fr", confirmedAt: before?.confirmedAt, consentText: before?.consentText });
    await confirmSubscription(asVisitor(), await newestToken(email));
    expect(await subscriptionOf(email)).toMatchObject({ state: "active", locale: "fr", confirmedAt: before?.confirmedAt });
  });

  test("only the newest link works", async () => {
    const email = anAddress();
    await ask(email);
    const first = await newestToken(email);
    await ask(email);
    await expect(confirmSubscription(asVisitor(), first)).rejects.toMatchObject({ code: "expired" });
    await confirmSubscription(asVisitor(), await newestToken(email));
    expect((await subscriptionOf(email))?.state).toBe("active");
  });

  test("two at the same moment make one subscription", async () => {
    const email = anAddress();
    await Promise.all([ask(email), ask(email)]);
    const rows = await db.select({ id: subscriptions.id }).from(subscriptions).where(eq(subscriptions.email, email));
    expect(rows).toHaveLength(1);
  });

  test("above the limit nothing is sent, and the answer is the same", async () => {
    const email = anAddress();
    for (let time = 0; time < MAILS_PER_ADDRESS + 2; time += 1) await expect(ask(email)).resolves.toBeUndefined();
    expect(await mailsTo(email)).toHaveLength(MAILS_PER_ADDRESS);
    await ask(email, later(hours(1.1)));
    expect(await mailsTo(email)).toHaveLength(MAILS_PER_ADDRESS + 1);
  });
});

describe("confirming", () => {
  test("works once, in time, and looking uses nothing up", async () => {
    const email = anAddress();
    await ask(email);
    const token = await newestToken(email);
    expect(await canConfirm(token, new Date())).toBe(true);
    expect((await subscriptionOf(email))?.state).toBe("pending");
    const { id } = await confirmSubscription(asVisitor(), token);
    expect(await subscriptionOf(email)).toMatchObject({ state: "active", confirmTokenHash: null });
    expect(await canConfirm(token, new Date())).toBe(false);
    await expect(confirmSubscription(asVisitor(), token)).rejects.toMatchObject({ code: "expired" });
    expect(await actionsOn(id)).toEqual(["subscription.request", "subscription.confirm"]);
  });

  test("two taps at once: one works", async () => {
    const email = anAddress();
    await ask(email);
    const token = await newestToken(email);
    const outcomes = await Promise.allSettled([confirmSubscription(asVisitor(), token), confirmSubscription(asVisitor(), token)]);
    expect(outcomes.map(({ status }) => status).sort()).toEqual(["fulfilled", "rejected"]);
  });

  test("after 48 hours the link is dead", async () => {
    const email = anAddress();
    await ask(email);
    const token = await newestToken(email);
    expect(await canConfirm(token, later(hours(47.9)))).toBe(true);
    expect(await canConfirm(token, later(hours(48.1)))).toBe(false);
    await expect(confirmSubscription(asVisitor(later(hours(48.1))), token)).rejects.toMatchObject({ code: "expired" });
    expect((await subscriptionOf(email))?.state).toBe("pending");
  });

  test.each(["", "x", "A".repeat(43), "../../etc", "%00".repeat(14)])("a made-up link (%j) is refused", async (token) => {
    await expect(confirmSubscription(asVisitor(), token)).rejects.toMatchObject({ code: "expired" });
  });
});

describe("leaving", () => {
  const waiting = async (id: string, state: "queued" | "deferred" | "accepted") => {
    const [row] = await db.insert(deliveries).values({ kind: "briefing", subscriptionId: id, locale: "en", state }).returning({ id: deliveries.id });
    return row?.id ?? "";
  };
  const stateOf = async (id: string) => (await db.select({ state: deliveries.state }).from(deliveries).where(eq(deliveries.id, id)))[0]?.state;

  test("holds back what still waits, keeps what was sent, and can be repeated", async () => {
    const { id, token, email } = await aSubscriber();
    const [queued, deferred, accepted] = await Promise.all([waiting(id, "queued"), waiting(id, "deferred"), waiting(id, "accepted")]);
    expect(await leaveSubscription(asVisitor(), token, "oneClick")).toBe(true);
    expect([await stateOf(queued), await stateOf(deferred), await stateOf(accepted)]).toEqual(["suppressed", "suppressed", "accepted"]);
    expect(await subscriptionOf(email)).toMatchObject({ state: "left" });
    const leftAt = (await subscriptionOf(email))?.leftAt;
    expect(await leaveSubscription(asVisitor(later(1000)), token, "link")).toBe(true);
    expect((await subscriptionOf(email))?.leftAt).toEqual(leftAt);
    expect((await actionsOn(id)).filter((action) => action === "subscription.leave")).toHaveLength(1);
  });

  test("stops a confirmation that is still open", async () => {
    const email = anAddress();
    await ask(email);
    const row = await subscriptionOf(email);
    await leaveSubscription(asVisitor(), subscriptionToken(row?.id ?? ""), "link");
    await expect(confirmSubscription(asVisitor(), await newestToken(email))).rejects.toMatchObject({ code: "expired" });
  });

  test("nobody else is touched", async () => {
    const [one, other] = await Promise.all([aSubscriber(), aSubscriber()]);
    const theirs = await waiting(other.id, "queued");
    await leaveSubscription(asVisitor(), one.token, "link");
    expect(await stateOf(theirs)).toBe("queued");
    expect((await subscriptionOf(other.email))?.state).toBe("active");
  });

  test("can be undone for an hour, not longer, and not by somebody who never confirmed", async () => {
    const { token, email } = await aSubscriber();
    await leaveSubscription(asVisitor(), token, "link");
    await expect(undoLeaving(asVisitor(later(hours(1.01))), token)).rejects.toMatchObject({ code: "expired" });
    await undoLeaving(asVisitor(later(hours(0.9))), token);
    expect(await subscriptionOf(email)).toMatchObject({ state: "active", leftAt: null });

    const never = anAddress();
    await ask(never);
    const link = subscriptionToken((await subscriptionOf(never))?.id ?? "");
    await leaveSubscription(asVisitor(), link, "link");
    await expect(undoLeaving(asVisitor(), link)).rejects.toMatchObject({ code: "expired" });
  });
});

describe("links", () => {
  test("name one subscription and can't be forged", async () => {
    const { id, token, email } = await aSubscriber();
    expect(readSubscriptionToken(token)).toBe(id);
    expect(token).toMatch(/^[A-Za-z0-9_-]{64}$/);
    for (let at = 0; at < token.length; at += 1) {
      const forged = token.slice(0, at) + (token[at] === "A" ? "B" : "A") + token.slice(at + 1);
      expect(readSubscriptionToken(forged), `letter ${at}`).toBeNull();
    }
    const stranger = subscriptionToken(crypto.randomUUID());
    expect(readSubscriptionToken(id.replaceAll("-", "") + stranger.slice(32))).toBeNull();
    expect(await leaveSubscription(asVisitor(), `${token.slice(0, -1)}${token.endsWith("A") ? "B" : "A"}`, "link")).toBe(false);
    expect(await leaveSubscription(asVisitor(), stranger, "link")).toBe(false);
    expect((await subscriptionOf(email))?.state).toBe("active");
  });

  test("change the language and show only a masked address", async () => {
    const { id, token, email } = await aSubscriber("en");
    await changeSubscription(asVisitor(), { token, locale: "ar", page: "en" });
    expect(await findSubscription(token, new Date())).toMatchObject({ address: maskAddress(email), locale: "ar", state: "active", lastMail: null });
    expect(maskAddress("mina@example.org")).toBe("m…@example.org");
    expect(await actionsOn(id)).toContain("subscription.change");
    await expect(changeSubscription(asVisitor(), { token: subscriptionToken(crypto.randomUUID()), locale: "ar", page: "en" })).rejects.toMatchObject({ code: "notFound" });
  });
});

describe("erasing", () => {
  test("forgets who left an hour ago and who never confirmed, and nobody else", async () => {
    const stays = await aSubscriber();
    const left = await aSubscriber();
    const [mail] = await db.insert(deliveries).values({ kind: "briefing", subscriptionId: left.id, locale: "en", state: "accepted" }).returning({ id: deliveries.id });
    await leaveSubscription(asVisitor(), left.token, "link");
    const open = anAddress();
    await ask(open);
    await eraseSubscriptions({ ...systemCtx("worker"), now: later(hours(0.9)) });
    expect(await subscriptionOf(left.email)).toBeDefined();
    const now = later(hours(7 * 24 + 1));
    expect(await eraseSubscriptions({ ...systemCtx("worker"), now })).toBeGreaterThanOrEqual(2);
    expect(await subscriptionOf(left.email)).toBeUndefined();
    expect(await subscriptionOf(open)).toBeUndefined();
    expect((await subscriptionOf(stays.email))?.state).toBe("active");
    const [kept] = await db.select({ subscriptionId: deliveries.subscriptionId, state: deliveries.state }).from(deliveries).where(eq(deliveries.id, mail?.id ?? ""));
    expect(kept).toEqual({ subscriptionId: null, state: "accepted" });
    expect(await findSubscription(left.token, new Date())).toBeNull();
  });
});

describe("the register and the counters", () => {
  test("never hold an address or a subscription's id", async () => {
    const { email, id } = await aSubscriber();
    const found = await db.execute<{ n: number }>(sql`
      select (select count(*) from audit.entry where canonical like ${`%${email}%`} or canonical like ${`%${id}%`})
           + (select count(*) from rate_limits where key like ${`%${email.split("@")[0]}%`}) as n`);
    expect(Number(found[0]?.n)).toBe(0);
  });

  test("a limit counts tries at once and starts anew after its window", async () => {
    const key = `test:${crypto.randomUUID()}`;
    const now = new Date();
    const tries = await Promise.all(Array.from({ length: 8 }, () => takePoint(key, { limit: 5, windowMs: 1000, now })));
    expect(tries.filter(Boolean)).toHaveLength(5);
    expect(await takePoint(key, { limit: 5, windowMs: 1000, now: new Date(now.getTime() + 1001) })).toBe(true);
  });
});
