import net from "node:net";
import { eq, sql as q } from "drizzle-orm";
import { afterAll, afterEach, beforeAll, describe, expect, test } from "vitest";
import { closeDb, db } from "@/db/client";
import { deliveries, subscriptions } from "@/db/schema";
import { enqueueMail } from "@/lib/jobs/enqueue";
import type { Locale } from "@/lib/i18n/locales";
import { LOCALE_CODES } from "@/lib/i18n/locales";
import { aDispatcher, aSink, rowOf, rowsOf, type TestSink, until, workerSql } from "../fixtures/outbox";
import { ownDatabase } from "../fixtures/own-database";
import { aRelease, queue, type Release, subscribers } from "../fixtures/releases";

let drop = async () => {};
let routine: Release;
let urgent: Release;
let sink: TestSink;
const running: ReturnType<typeof aDispatcher>[] = [];

beforeAll(async () => {
  drop = await ownDatabase("dispatcher");
  sink = await aSink();
  [routine, urgent] = [await aRelease(), await aRelease({ urgency: "urgent" })];
});
afterEach(async () => {
  for (const dispatcher of running.splice(0)) {
    await dispatcher.stop(2_000);
    await dispatcher.sql.end();
  }
});
afterAll(async () => {
  await sink.close();
  await closeDb();
  await drop();
});

const start = (options: Partial<Parameters<typeof aDispatcher>[0]> = {}) => {
  const dispatcher = aDispatcher({ port: sink.port, ...options });
  running.push(dispatcher);
  return dispatcher;
};
/** One subscriber whose address scripts the server, with one delivery; what became of it. */
async function meet(words: string, { release = routine, options = {} }: { release?: Release; options?: Partial<Parameters<typeof aDispatcher>[0]> } = {}) {
  const [person] = await subscribers(1, { address: () => `${words}+${crypto.randomUUID()}@example.org` });
  if (!person) throw new Error("no subscriber was made");
  await queue(release.id, [person]);
  start(options);
  await until(async () => !["queued", "sending"].includes((await rowOf(person.id)).state), 20_000, `${words} did not end`);
  return { person, row: await rowOf(person.id), taken: sink.to(person.email) };
}

describe("what a server answers", () => {
  test("taken: accepted once, with the Message-ID that was fixed before sending", async () => {
    const { row, taken, person } = await meet("anna");
    expect(taken).toBe(1);
    expect(row).toMatchObject({ state: "accepted", attempts: 1, messageId: `<${row.id}@news.example.org>`, leaseToken: null, leaseUntil: null, endingAt: null, unknownAt: null });
    expect(row.reply).toMatch(/^250/);
    expect(row.finishedAt).not.toBeNull();
    expect(sink.store.entries().find(({ to }) => to === person.email)).toMatchObject({ messageId: row.messageId, from: `bounces+${row.id}@news.example.org` });
  });

  test.each([
    ["reply-450-4.2.1", "450 4.2.1"],
    ["data-451-4.3.0", "451 4.3.0"],
    ["reply-452", "452"],
  ])("%s: deferred by half an hour at least", async (words, reply) => {
    const { row, taken } = await meet(words);
    expect(taken).toBe(0);
    expect(row).toMatchObject({ state: "deferred", reply, finishedAt: null });
    expect(row.nextAt.getTime() - Date.now()).toBeGreaterThan(29 * 60_000);
  });

  test("5.1.1: refused, and nothing else goes to that address", async () => {
    const [person] = await subscribers(1, { address: () => `reply-550-5.1.1+${crypto.randomUUID()}@example.org` });
    if (!person) throw new Error("no subscriber was made");
    await queue(routine.id, [person]);
    await db.insert(deliveries).values({ kind: "briefing", releaseId: urgent.id, subscriptionId: person.id, locale: "en", nextAt: new Date(Date.now() + 3_600_000) });
    start();
    await until(async () => (await rowsOf([person.id])).every(({ state }) => state !== "queued" && state !== "sending"));
    const rows = await rowsOf([person.id]);
    expect(rows.map(({ state }) => state).sort()).toEqual(["rejected", "suppressed"]);
    const [subscription] = await db.select().from(subscriptions).where(eq(subscriptions.id, person.id));
    expect(subscription).toMatchObject({ state: "active" });
    expect(subscription?.suppressedAt).not.toBeNull();
  });

  test("5.7.1: refused, and no reader is suspended, however often", async () => {
    const [person] = await subscribers(1, { address: () => `data-554-5.7.1+${crypto.randomUUID()}@example.org` });
    if (!person) throw new Error("no subscriber was made");
    await queue(routine.id, [person]);
    await queue(urgent.id, [person]);
    start();
    await until(async () => (await rowsOf([person.id])).every(({ state }) => state === "rejected"));
    const [subscription] = await db.select().from(subscriptions).where(eq(subscriptions.id, person.id));
    expect(subscription?.suppressedAt).toBeNull();
  });

  test("a second refusal of another kind suspends the address, the first does not", async () => {
    const [person] = await subscribers(1, { address: () => `reply-550+${crypto.randomUUID()}@example.org` });
    if (!person) throw new Error("no subscriber was made");
    const suspended = async () => (await db.select().from(subscriptions).where(eq(subscriptions.id, person.id)))[0]?.suppressedAt;
    await queue(routine.id, [person]);
    const first = start();
    await until(async () => (await rowsOf([person.id])).every(({ state }) => state === "rejected"));
    expect(await suspended()).toBeNull();
    await queue(urgent.id, [person]);
    first.wake();
    await until(async () => (await rowsOf([person.id])).every(({ state }) => state === "rejected"));
    expect(await suspended()).not.toBeNull();
  });
});

describe("a connection that breaks", () => {
  test.each(["drop-at-rcpt", "drop-before-dot"])("%s: nothing was taken, so it is tried again and is never unknown", async (words) => {
    const { row, taken } = await meet(words);
    expect(taken).toBe(0);
    expect(row).toMatchObject({ state: "deferred", unknownAt: null, reply: "ECONNECTION" });
    expect(row.nextAt.getTime() - Date.now()).toBeLessThan(60_000);
  });

  test("drop-before-dot once: it arrives, once", async () => {
    const [person] = await subscribers(1, { address: () => `drop-before-dot-once+${crypto.randomUUID()}@example.org` });
    if (!person) throw new Error("no subscriber was made");
    await queue(routine.id, [person]);
    start();
    await until(async () => (await rowOf(person.id)).state === "deferred");
    await db.update(deliveries).set({ nextAt: new Date() }).where(eq(deliveries.subscriptionId, person.id));
    await until(async () => (await rowOf(person.id)).state === "accepted");
    expect(sink.to(person.email)).toBe(1);
    expect(await rowOf(person.id)).toMatchObject({ attempts: 2, unknownAt: null });
  });

  test("silence at RCPT: tried again, not unknown; silence after the dot: unknown", async () => {
    const timeouts = { socketMs: 700 };
    const early = await meet("silent-at-rcpt", { options: { timeouts } });
    expect(early.row).toMatchObject({ state: "deferred", reply: "ETIMEDOUT", unknownAt: null });
    const late = await meet("silent-after-dot", { options: { timeouts } });
    expect(late.row).toMatchObject({ state: "unknown", reply: "ETIMEDOUT" });
    expect(late.taken).toBe(1);
  });

  test.each(["drop-after-dot", "lose-after-dot"])("%s, routine: unknown, listed and not sent again", async (words) => {
    const { row, taken } = await meet(words);
    expect(row).toMatchObject({ state: "unknown", attempts: 1, reply: "ECONNECTION", payload: {}, recipient: null });
    expect(row.unknownAt).not.toBeNull();
    expect(taken).toBe(words === "drop-after-dot" ? 1 : 0);
  });

  test("lose-after-dot once, urgent: sent once more, and arrives", async () => {
    const { row, taken } = await meet("lose-after-dot-once", { release: urgent });
    expect(row).toMatchObject({ state: "accepted", attempts: 2 });
    expect(row.unknownAt).not.toBeNull();
    expect(taken).toBe(1);
  });

  test("drop-after-dot, urgent: once more and no further, with the same Message-ID and the same bytes", async () => {
    const { row, taken, person } = await meet("drop-after-dot", { release: urgent });
    expect(row).toMatchObject({ state: "unknown", attempts: 2 });
    expect(taken).toBe(2);
    const [first, second] = sink.store.entries().filter(({ to }) => to === person.email).map(({ id }) => sink.store.raw(id)?.toString("latin1"));
    expect(first).toBe(second);
  });

  test("no server at all: everything waits and is sent when it is back, with nobody refused", async () => {
    const away = await aSink();
    await away.close();
    const people = await subscribers(8);
    await queue(routine.id, people);
    start({ port: away.port, timeouts: { connectionMs: 500, greetingMs: 500 } });
    await until(async () => (await rowsOf(people.map(({ id }) => id))).some(({ state }) => state === "deferred"));
    const back = await aSink(away.port);
    await db.update(deliveries).set({ nextAt: new Date() }).where(eq(deliveries.state, "deferred"));
    await until(async () => {
      await db.execute(q`update deliveries set next_at = now() where state = 'deferred' and reply in ('ESOCKET', 'ECONNECTION', 'ETIMEDOUT')`);
      return (await rowsOf(people.map(({ id }) => id))).every(({ state }) => state === "accepted");
    });
    for (const { email } of people) expect(back.to(email)).toBe(1);
    await back.close();
  });
});

describe("mail to one person", () => {
  const order = (recipient: string, over: { locale?: Locale; kind?: "signIn" | "invitation" | "confirmSubscription" } = {}) =>
    db.transaction((tx) => enqueueMail(tx, { kind: over.kind ?? "signIn", recipient, locale: over.locale ?? "en", payload: { link: "https://health.example.org/sign-in/confirm?token=abc", minutes: "10", hours: "48", inviter: "Ada", role: "legal" } }));
  test.each(["signIn", "invitation", "confirmSubscription"] as const)("%s goes out in every language, and afterwards neither address nor link remains", async (kind) => {
    const began = new Date();
    const addresses = LOCALE_CODES.map((locale) => `${kind.toLowerCase()}-${locale}-${crypto.randomUUID()}@example.org`);
    for (const [index, locale] of LOCALE_CODES.entries()) await order(addresses[index] ?? "", { locale, kind });
    start();
    await until(() => addresses.every((address) => sink.to(address) === 1));
    await until(async () => (await db.select().from(deliveries).where(q`${deliveries.createdAt} >= ${began.toISOString()} and ${deliveries.kind} = ${kind}`)).every(({ state }) => state === "accepted"));
    const rows = await db.select().from(deliveries).where(q`${deliveries.createdAt} >= ${began.toISOString()} and ${deliveries.kind} = ${kind}`);
    for (const row of rows) expect(row).toMatchObject({ recipient: null, payload: {} });
  });

  test("a link that has run out is not sent", async () => {
    const address = `late-${crypto.randomUUID()}@example.org`;
    await order(address);
    const [late] = await db.update(deliveries).set({ createdAt: new Date(Date.now() - 11 * 60_000) }).where(eq(deliveries.recipient, address)).returning({ id: deliveries.id });
    const find = async () => (await db.select().from(deliveries).where(eq(deliveries.id, late?.id ?? "")))[0];
    start();
    await until(async () => (await find())?.finishedAt !== null);
    expect(sink.to(address)).toBe(0);
    expect(await find()).toMatchObject({ state: "rejected", reply: "EXPIRED", recipient: null, payload: {} });
  });

  test("it goes before a mailing that is already waiting", async () => {
    const people = await subscribers(60);
    await queue(routine.id, people);
    const address = `first-${crypto.randomUUID()}@example.org`;
    await order(address);
    start({ connections: 1 });
    await until(() => sink.to(address) === 1);
    expect(people.filter(({ email }) => sink.to(email) > 0).length).toBeLessThan(10);
  });
});

describe("results and leases", () => {
  test("two dispatchers side by side send each mail once", async () => {
    const people = await subscribers(300);
    await queue(routine.id, people);
    start();
    start();
    start({ connections: 2 });
    await until(async () => (await rowsOf(people.map(({ id }) => id))).every(({ state }) => state === "accepted"), 40_000);
    expect(people.filter(({ email }) => sink.to(email) !== 1)).toEqual([]);
  });

  test("what was being sent when a lease ran out: waits again before the dot, else by the release's class", async () => {
    const people = await subscribers(4);
    const [before, after, urgentAfter, twice] = people;
    if (!before || !after || !urgentAfter || !twice) throw new Error("no subscribers were made");
    const values = (id: string, releaseId: string, over: object) => ({ kind: "briefing" as const, releaseId, subscriptionId: id, locale: "en" as const, state: "sending" as const, attempts: 1, leaseToken: crypto.randomUUID(), leaseUntil: new Date(Date.now() - 1_000), messageId: `<${id}@news.example.org>`, ...over });
    await db.insert(deliveries).values([
      values(before.id, routine.id, {}),
      values(after.id, routine.id, { endingAt: new Date() }),
      values(urgentAfter.id, urgent.id, { endingAt: new Date() }),
      values(twice.id, urgent.id, { endingAt: new Date(), unknownAt: new Date() }),
    ]);
    start();
    await until(async () => (await rowsOf(people.map(({ id }) => id))).every(({ state }) => state !== "sending" && state !== "queued"));
    expect(await rowOf(before.id)).toMatchObject({ state: "accepted", unknownAt: null });
    expect(await rowOf(after.id)).toMatchObject({ state: "unknown" });
    expect(await rowOf(urgentAfter.id)).toMatchObject({ state: "accepted", messageId: `<${urgentAfter.id}@news.example.org>` });
    expect((await rowOf(urgentAfter.id)).unknownAt).not.toBeNull();
    expect(await rowOf(twice.id)).toMatchObject({ state: "unknown" });
    expect([before, after, urgentAfter, twice].map(({ email }) => sink.to(email))).toEqual([1, 0, 1, 0]);
  });

  test("a worker that lost its lease does not end its message", async () => {
    const [person] = await subscribers(1);
    if (!person) throw new Error("no subscriber was made");
    await queue(routine.id, [person]);
    const { claim, markEnding } = await import("@/lib/jobs/outbox");
    const sql = workerSql(1);
    const [row] = await claim(sql, { limit: 1, leaseSeconds: 60, domain: "news.example.org" });
    if (!row) throw new Error("nothing was claimed");
    await sql`update deliveries set lease_token = gen_random_uuid() where id = ${row.id}`;
    expect((await markEnding(sql, [row])).size).toBe(0);
    await sql`update deliveries set lease_token = ${row.leaseToken}, lease_until = now() - interval '1 second' where id = ${row.id}`;
    expect((await markEnding(sql, [row])).size).toBe(0);
    await sql.end();
  });

  test("a graceful stop ends what was begun and gives back the rest", async () => {
    const people = await subscribers(400);
    await queue(routine.id, people);
    const dispatcher = aDispatcher({ port: sink.port });
    await until(() => people.some(({ email }) => sink.to(email) > 0));
    await dispatcher.stop(5_000);
    const rows = await rowsOf(people.map(({ id }) => id));
    const states = new Set(rows.map(({ state }) => state));
    expect([...states].every((state) => state === "accepted" || state === "queued")).toBe(true);
    expect(rows.filter(({ state }) => state === "accepted").length).toBe(people.filter(({ email }) => sink.to(email) === 1).length);
    expect(rows.filter(({ state }) => state === "queued").every(({ attempts }) => attempts === 0)).toBe(true);
    await dispatcher.sql.end();
    await db.delete(deliveries).where(eq(deliveries.releaseId, routine.id));
  });

  test("every connection that a server saw is an attempt that is counted: nothing is tried again in secret", async () => {
    let connections = 0;
    const mute = net.createServer((socket) => {
      connections += 1;
      socket.end();
    });
    await new Promise<void>((resolve) => {
      mute.listen(0, "127.0.0.1", resolve);
    });
    const [person] = await subscribers(1);
    if (!person) throw new Error("no subscriber was made");
    await queue(routine.id, [person]);
    start({ port: (mute.address() as net.AddressInfo).port });
    await until(async () => (await rowOf(person.id)).state === "deferred");
    await new Promise((resolve) => setTimeout(resolve, 1_500));
    expect([connections, (await rowOf(person.id)).attempts]).toEqual([1, 1]);
    mute.close();
  });
});
