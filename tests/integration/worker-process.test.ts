import { eq } from "drizzle-orm";
import { afterAll, beforeAll, expect, test } from "vitest";
import { closeDb, db } from "@/db/client";
import { deliveries, subscriptions } from "@/db/schema";
import { enqueueMail } from "@/lib/jobs/enqueue";
import { begin, end } from "../fixtures/kill-run";
import { aSink, rowsOf, type TestSink, until } from "../fixtures/outbox";
import { ownDatabase } from "../fixtures/own-database";
import { aRelease, queue, subscribers } from "../fixtures/releases";

let drop = async () => {};
let sink: TestSink;
beforeAll(async () => {
  drop = await ownDatabase("worker");
  sink = await aSink();
});
afterAll(async () => {
  await sink.close();
  await closeDb();
  await drop();
});

test("the worker has the rights that it needs, wakes at once, logs no address, and stops when asked", async () => {
  const [stale] = await subscribers(1);
  await db.update(subscriptions).set({ state: "pending", requestedAt: new Date(Date.now() - 8 * 86_400_000) }).where(eq(subscriptions.id, stale?.id ?? ""));
  const worker = await begin("lib/jobs/worker.ts", { ...process.env, SMTP_URL: `smtp://127.0.0.1:${sink.port}` }, "worker ready");
  let log = "";
  worker.stdout?.on("data", (chunk: Buffer) => {
    log += chunk.toString();
  });
  try {
    const people = await subscribers(2, { address: (n) => `${n === 0 ? "reply-550-5.1.1" : "anna"}+${crypto.randomUUID()}@example.org` });
    await queue((await aRelease({ locales: ["en"] })).id, people);
    const address = `link-${crypto.randomUUID()}@example.org`;
    await db.transaction((tx) => enqueueMail(tx, { kind: "signIn", recipient: address, locale: "en", payload: { link: "https://health.example.org/sign-in/confirm?token=secret-token", minutes: "10" } }));
    await until(() => sink.to(address) === 1);
    await until(async () => (await rowsOf(people.map(({ id }) => id))).every(({ state }) => state === "accepted" || state === "rejected"));
    await until(async () => (await db.select().from(subscriptions).where(eq(subscriptions.id, stale?.id ?? ""))).length === 0);
    const lines = log.split("\n").filter((line) => line.startsWith("{"));
    expect(lines.some((line) => (JSON.parse(line) as { event: string }).event === "mail rejected")).toBe(true);
    expect(lines.filter((line) => (JSON.parse(line) as { level: string }).level === "error")).toEqual([]);
    expect(log).not.toContain("@");
    expect(log).not.toContain("secret-token");
  } finally {
    const asked = Date.now();
    await end(worker, "SIGTERM");
    expect(worker.exitCode).toBe(0);
    expect(Date.now() - asked).toBeLessThan(10_000);
  }
  expect((await db.select().from(deliveries).where(eq(deliveries.state, "sending"))).length).toBe(0);
});
