import { eq, inArray, sql as q } from "drizzle-orm";
import { simpleParser } from "mailparser";
import { afterAll, afterEach, beforeAll, describe, expect, test } from "vitest";
import { closeDb, db } from "@/db/client";
import { deliveries, sessions, subscriptions, verificationTokens } from "@/db/schema";
import { getDeliveryReport, listUnknown } from "@/lib/deliveries/queries";
import { DomainError } from "@/lib/errors";
import { LOCALE_CODES, type Locale } from "@/lib/i18n/locales";
import { enqueueMail, enqueueRelease, enqueueWithdrawal } from "@/lib/jobs/enqueue";
import { tidyUp } from "@/lib/jobs/housekeeping";
import { leaveSubscription } from "@/lib/subscribers/leave-subscription";
import { subscriptionToken } from "@/lib/subscribers/token";
import { asStaff } from "../fixtures/assessments";
import { aDispatcher, aSink, rowOf, rowsOf, type TestSink, until, workerSql } from "../fixtures/outbox";
import { ownDatabase } from "../fixtures/own-database";
import { aRelease, queue, rendered, subscribers, withdraw } from "../fixtures/releases";
import { asVisitor } from "../fixtures/subscribers";

let drop = async () => {};
let sink: TestSink;
const running: ReturnType<typeof aDispatcher>[] = [];
const start = () => {
  const dispatcher = aDispatcher({ port: sink.port });
  running.push(dispatcher);
  return dispatcher;
};
const mailTo = async (address: string) => {
  const entry = sink.store.entries().findLast(({ to }) => to === address);
  return simpleParser((entry && sink.store.raw(entry.id)) ?? "", { skipTextToHtml: true });
};
const settled = (ids: string[]) => until(async () => (await rowsOf(ids)).every(({ state }) => ["accepted", "suppressed", "rejected", "unknown"].includes(state)));

beforeAll(async () => {
  drop = await ownDatabase("mailing");
  sink = await aSink();
});
afterEach(async () => {
  for (const dispatcher of running.splice(0)) {
    await dispatcher.stop(2_000);
    await dispatcher.sql.end();
  }
  await db.delete(deliveries);
  await db.delete(subscriptions);
});
afterAll(async () => {
  await sink.close();
  await closeDb();
  await drop();
});

describe("a release", () => {
  test("goes to everybody on the list in their language, and to nobody else; languages it lacks get English", async () => {
    const release = await aRelease({ locales: ["en", "ar", "uk"] });
    const people = new Map<Locale, { id: string; email: string }>();
    for (const locale of LOCALE_CODES) people.set(locale, (await subscribers(1, { locale }))[0] ?? { id: "", email: "" });
    const [pending, left, suspended] = await subscribers(3);
    await db.update(subscriptions).set({ state: "pending" }).where(eq(subscriptions.id, pending?.id ?? ""));
    await db.update(subscriptions).set({ state: "left" }).where(eq(subscriptions.id, left?.id ?? ""));
    await db.update(subscriptions).set({ suppressedAt: new Date() }).where(eq(subscriptions.id, suspended?.id ?? ""));
    const count = await db.transaction((tx) => enqueueRelease(tx, { releaseId: release.id, holdMinutes: 0 }));
    expect(count).toBe(LOCALE_CODES.length);
    expect(await db.transaction((tx) => enqueueRelease(tx, { releaseId: release.id, holdMinutes: 0 }))).toBe(0);
    start();
    await settled([...people.values()].map(({ id }) => id));
    for (const [locale, { email }] of people) {
      const shown: Locale = locale === "ar" || locale === "uk" ? locale : "en";
      expect(sink.to(email)).toBe(1);
      const mail = await mailTo(email);
      expect(mail.subject).toBe(rendered(shown).title);
      expect(mail.headers.get("content-language")).toBe(shown);
      expect(mail.text).toContain(`/briefings/${release.slug}/v/1`);
    }
    for (const person of [pending, left, suspended]) expect(sink.to(person?.email ?? "")).toBe(0);
  });

  test("each reader's links are their own", async () => {
    const release = await aRelease({ locales: ["en"] });
    const people = await subscribers(3);
    await queue(release.id, people);
    start();
    await settled(people.map(({ id }) => id));
    for (const { id, email } of people) {
      const mail = await mailTo(email);
      const link = `https://health.example.org/u/${subscriptionToken(id)}`;
      expect(mail.text).toContain(link);
      expect(String(mail.html)).toContain(link);
      expect(mail.headerLines.find(({ key }) => key === "list-unsubscribe")?.line).toBe(`List-Unsubscribe: <${link}>`);
      for (const other of people) if (other.id !== id) expect(mail.text).not.toContain(subscriptionToken(other.id));
    }
  });

  test("waits while it is held, and goes nowhere when it is withdrawn in that time", async () => {
    const release = await aRelease({ locales: ["en"] });
    const people = await subscribers(3);
    await db.transaction((tx) => enqueueRelease(tx, { releaseId: release.id, holdMinutes: 10 }));
    start();
    await new Promise((resolve) => setTimeout(resolve, 500));
    expect((await rowsOf(people.map(({ id }) => id))).every(({ state }) => state === "queued")).toBe(true);
    await withdraw(release, { en: "It was wrong." });
    await db.update(deliveries).set({ nextAt: new Date() }).where(eq(deliveries.releaseId, release.id));
    await new Promise((resolve) => setTimeout(resolve, 500));
    const sql = workerSql(1);
    await tidyUp(sql, () => {});
    await sql.end();
    expect((await rowsOf(people.map(({ id }) => id))).map(({ state }) => state)).toEqual(["suppressed", "suppressed", "suppressed"]);
    expect(people.some(({ email }) => sink.to(email) > 0)).toBe(false);
  });
});

describe("afterwards", () => {
  test("a correction holds back what was still waiting, and says what was wrong with both figures", async () => {
    const faulty = await aRelease({ locales: ["en", "fr"], deaths: { without: 2110, with: 1600, averted: 510 } });
    const [reader, waiting] = await subscribers(2, { locale: "fr" });
    if (!reader || !waiting) throw new Error("no subscribers were made");
    await queue(faulty.id, [reader], "fr");
    const dispatcher = start();
    await settled([reader.id]);
    await db.insert(deliveries).values({ kind: "briefing", releaseId: faulty.id, subscriptionId: waiting.id, locale: "fr", nextAt: new Date(Date.now() + 3_600_000) });
    const right = await aRelease({ locales: ["en", "fr"], kind: "correction", corrects: faulty, correction: { en: { cause: "A wrong infectious period.", effect: "The advice stays." }, fr: { cause: "Une durée fausse.", effect: "Les conseils restent." } } });
    await db.update(deliveries).set({ nextAt: new Date() }).where(eq(deliveries.subscriptionId, waiting.id));
    expect(await db.transaction((tx) => enqueueRelease(tx, { releaseId: right.id, holdMinutes: 0 }))).toBe(2);
    dispatcher.wake();
    await until(async () => (await db.select().from(deliveries).where(eq(deliveries.releaseId, right.id))).every(({ state }) => state === "accepted"));
    expect(sink.to(waiting.email)).toBe(1);
    expect(sink.to(reader.email)).toBe(2);
    const mail = await mailTo(waiting.email);
    expect(mail.subject).toMatch(/^Correction/);
    for (const words of ["Une durée fausse.", "Les conseils restent.", "2 110", "2 030"]) expect(mail.text?.replace(/\s/g, " ")).toContain(words);
  });

  test("a withdrawal is told to those who got the briefing, in their language, once", async () => {
    const release = await aRelease({ locales: ["en", "ar"] });
    const people = await subscribers(3, { locale: "ar" });
    const [got, refused, left] = people;
    if (!got || !refused || !left) throw new Error("no subscribers were made");
    await db.insert(deliveries).values(people.map(({ id }) => ({ kind: "briefing" as const, releaseId: release.id, subscriptionId: id, locale: "ar" as const, state: id === refused.id ? ("rejected" as const) : ("accepted" as const) })));
    await db.update(subscriptions).set({ state: "left" }).where(eq(subscriptions.id, left.id));
    await withdraw(release, { en: "The order was repealed.", ar: "أُلغي الأمر." });
    expect(await db.transaction((tx) => enqueueWithdrawal(tx, { releaseId: release.id }))).toBe(1);
    expect(await db.transaction((tx) => enqueueWithdrawal(tx, { releaseId: release.id }))).toBe(0);
    start();
    await until(() => sink.to(got.email) === 1);
    const mail = await mailTo(got.email);
    expect(mail.subject).toMatch(/^سُحبت: /);
    expect(mail.text).toContain("أُلغي الأمر.");
    expect(mail.text).toContain(`/ar/briefings/${release.slug}`);
    expect([refused, left].some(({ email }) => sink.to(email) > 0)).toBe(false);
  });
});

describe("leaving while a mailing goes out", () => {
  test("nobody is claimed after their leaving has committed; each of the others gets it once", async () => {
    const release = await aRelease({ locales: ["en"] });
    const people = await subscribers(400);
    await queue(release.id, people);
    const [leavers, stayers] = [people.filter((_, index) => index % 2 === 0), people.filter((_, index) => index % 2 === 1)];
    start();
    start();
    // In the order in which they are claimed, and against it, so that both meet.
    for (let from = 0; from < leavers.length; from += 20) {
      await Promise.all(leavers.slice(from, from + 20).map(({ id }) => leaveSubscription(asVisitor(), subscriptionToken(id), "oneClick")));
    }
    await settled(people.map(({ id }) => id));
    const rows = await db
      .select({ state: deliveries.state, attempts: deliveries.attempts, left: subscriptions.leftAt, email: subscriptions.email, subscriptionId: subscriptions.id })
      .from(deliveries)
      .innerJoin(subscriptions, eq(subscriptions.id, deliveries.subscriptionId))
      .where(inArray(subscriptions.id, people.map(({ id }) => id)));
    expect(rows).toHaveLength(people.length);
    const held = rows.filter(({ state }) => state === "suppressed");
    // A row that was held back was never claimed, and its reader got nothing.
    for (const { email, attempts } of held) expect([attempts, sink.to(email)]).toEqual([0, 0]);
    for (const { state, email } of rows) if (state === "accepted") expect(sink.to(email)).toBe(1);
    expect(stayers.every(({ email }) => sink.to(email) === 1)).toBe(true);
    expect(held.length).toBeGreaterThan(0);
  });

  test("a claim waits for no unsubscribe: what is locked is left for the next look", async () => {
    const release = await aRelease({ locales: ["en"] });
    const [leaver, other] = await subscribers(2);
    if (!leaver || !other) throw new Error("no subscribers were made");
    await queue(release.id, [leaver, other]);
    const sql = workerSql(1);
    await sql.begin(async (tx) => {
      await tx`select id from subscriptions where id = ${leaver.id} for update`;
      start();
      await until(async () => (await rowOf(other.id)).state === "accepted");
      expect((await rowOf(leaver.id)).state).toBe("queued");
      await tx`update subscriptions set state = 'left', left_at = now() where id = ${leaver.id}`;
    });
    await new Promise((resolve) => setTimeout(resolve, 400));
    expect((await rowOf(leaver.id)).attempts).toBe(0);
    expect(sink.to(leaver.email)).toBe(0);
    await sql.end();
  });
});

describe("housekeeping", () => {
  test("purges what has run out and nothing else", async () => {
    const past = new Date(Date.now() - 60_000);
    const future = new Date(Date.now() + 3_600_000);
    const { actor } = await asStaff("adviser");
    const mark = crypto.randomUUID();
    await db.insert(sessions).values([past, future].map((expires, index) => ({ sessionToken: `${mark}-${index}`, userId: actor.id, expires })));
    await db.insert(verificationTokens).values([past, future].map((expires, index) => ({ identifier: `${mark}-${index}@example.org`, token: `${mark}-${index}`, expires })));
    const [old, young] = await subscribers(2);
    const asked = (days: number) => new Date(Date.now() - days * 86_400_000);
    await db.update(subscriptions).set({ state: "pending", requestedAt: asked(8) }).where(eq(subscriptions.id, old?.id ?? ""));
    await db.update(subscriptions).set({ state: "pending", requestedAt: asked(6) }).where(eq(subscriptions.id, young?.id ?? ""));
    const sql = workerSql(1);
    const faults: string[] = [];
    await tidyUp(sql, (level, event) => {
      if (level === "error") faults.push(event);
    });
    await sql.end();
    expect(faults).toEqual([]);
    expect((await db.select({ token: sessions.sessionToken }).from(sessions).where(q`${sessions.sessionToken} like ${`${mark}%`}`)).map(({ token }) => token)).toEqual([`${mark}-1`]);
    expect((await db.select({ token: verificationTokens.token }).from(verificationTokens).where(q`${verificationTokens.token} like ${`${mark}%`}`)).map(({ token }) => token)).toEqual([`${mark}-1`]);
    expect((await db.select({ id: subscriptions.id }).from(subscriptions)).map(({ id }) => id)).toEqual([young?.id]);
  });
});

describe("the report", () => {
  test("counts add up to everybody who was on the list, and hold no address", async () => {
    const release = await aRelease({ locales: ["en"], urgency: "urgent" });
    const words = ["anna", "reply-450", "reply-552-5.2.2", "reply-550-5.1.1", "data-554-5.7.1", "drop-after-dot"];
    const people = await subscribers(words.length, { address: (n) => `${words[n]}+${crypto.randomUUID()}@example.org` });
    const [gone] = await subscribers(1);
    await db.transaction((tx) => enqueueRelease(tx, { releaseId: release.id, holdMinutes: 0 }));
    await leaveSubscription(asVisitor(), subscriptionToken(gone?.id ?? ""), "link");
    start();
    await until(async () => (await rowsOf(people.map(({ id }) => id))).every(({ state }) => state !== "queued" && state !== "sending"));
    const ctx = await asStaff("communications");
    const report = await getDeliveryReport(ctx);
    const row = report.releases.find(({ releaseId }) => releaseId === release.id);
    expect(row).toMatchObject({ waiting: 2, accepted: 1, rejected: 2, suppressed: 1, unknown: 1, twice: 0, urgency: "urgent", kind: "briefing" });
    expect(report.alarms).toMatchObject({ policy: 1, suspended: 1, overdue: 0, refusedUs: 0 });
    const unknown = await listUnknown(ctx);
    expect(unknown).toHaveLength(1);
    expect(unknown[0]).toMatchObject({ kind: "briefing", locale: "en", reply: "ECONNECTION" });
    expect(JSON.stringify([report, unknown])).not.toContain("@");
  });

  test("is refused to those who may not read it", async () => {
    for (const role of ["adviser", "legal"] as const) {
      const ctx = await asStaff(role);
      await expect(getDeliveryReport(ctx)).rejects.toThrow(DomainError);
      await expect(listUnknown(ctx)).rejects.toThrow(DomainError);
    }
  });
});

test("a mail put in the outbox is on its way well before the next look: the worker listens", async () => {
  const sql = workerSql(2);
  let woken = 0;
  await sql.listen("ebbmark_outbox", () => {
    woken += 1;
  });
  await db.transaction((tx) => enqueueMail(tx, { kind: "signIn", recipient: "anna@example.org", locale: "en", payload: { link: "https://x.example.org", minutes: "10" } }));
  await until(() => woken > 0, 2_000);
  await sql.end();
});
