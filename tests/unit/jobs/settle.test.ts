import { describe, expect, test } from "vitest";
import { type Attempt, giveUpAfterMs, settle } from "@/lib/jobs/settle";
import { parseReply, type SmtpResult } from "@/lib/mail/transport";

const MINUTE = 60_000;
const DAY = 24 * 60 * MINUTE;
const attempt: Attempt = { kind: "briefing", attempts: 1, ageMs: 0, resend: false, lostBefore: false };
const result = (over: Partial<SmtpResult>): SmtpResult => ({ phase: "message", accepted: false, code: null, status: null, fault: null, refusedUs: false, ...over });
const reply = (text: string): SmtpResult => result({ ...parseReply(text) });

describe("what becomes of a delivery", () => {
  test("250 is accepted, and the reply keeps no text", () => {
    expect(settle(result({ phase: "ended", accepted: true, ...parseReply("250 2.0.0 Ok: queued for reader@example.org") }), attempt)).toEqual({ state: "accepted", delayMs: null, reply: "250 2.0.0", lost: false, suppress: false, pause: false });
  });

  test.each([
    ["450 4.2.1 try later", "deferred", false],
    ["421 4.7.0 too many", "deferred", false],
    ["451 greylisted", "deferred", false],
    ["452 4.2.2 full", "deferred", false],
    ["550 5.1.1 no such user", "rejected", true],
    ["553 5.1.3 bad address", "rejected", true],
    ["550 5.1.10 null MX", "rejected", true],
    ["550 refused", "rejected", false],
    ["554 5.7.1 policy", "rejected", false],
    ["550 5.7.26 not authenticated", "rejected", false],
    ["554 5.6.0 content", "rejected", false],
    ["552 5.2.2 full", "deferred", false],
    ["550 5.2.2 full", "deferred", false],
    ["550 5.2.1 disabled", "rejected", false],
  ] as const)("%s → %s, address suspended: %s", (text, state, suppress) => {
    const settled = settle(reply(text), attempt);
    expect(settled).toMatchObject({ state, suppress, lost: false, pause: false });
    expect(settled.reply).toBe(text.match(/^\d{3}(?: \d\.\d+\.\d+)?/)?.[0]);
  });

  test("a full mailbox is tried a few times and then refused", () => {
    const states = [1, 2, 3, 4, 5].map((attempts) => settle(reply("552 5.2.2 full"), { ...attempt, attempts }).state);
    expect(states).toEqual(["deferred", "deferred", "deferred", "rejected", "rejected"]);
  });

  test("after a 4yz reply the gap is half an hour at least, grows, and ends before the fifth day does", () => {
    let ageMs = 0;
    const gaps: number[] = [];
    for (let attempts = 1; attempts < 100; attempts += 1) {
      const settled = settle(reply("450 4.2.1"), { ...attempt, attempts, ageMs });
      if (settled.state === "rejected") break;
      gaps.push(settled.delayMs ?? 0);
      ageMs += settled.delayMs ?? 0;
    }
    expect(Math.min(...gaps)).toBeGreaterThanOrEqual(30 * MINUTE);
    expect([...gaps].sort((a, b) => a - b)).toEqual(gaps);
    expect(ageMs).toBeGreaterThanOrEqual(4 * DAY);
    expect(ageMs).toBeLessThanOrEqual(5 * DAY);
  });

  test("a sign-in link is tried again within minutes, and not after it has run out", () => {
    const signIn: Attempt = { ...attempt, kind: "signIn", resend: true, linkMs: 10 * MINUTE };
    expect(settle(reply("450"), signIn).delayMs).toBeLessThanOrEqual(MINUTE);
    expect(settle(reply("450"), { ...signIn, ageMs: 9.9 * MINUTE }).state).toBe("rejected");
    expect(giveUpAfterMs({ linkMs: 10 * MINUTE })).toBe(10 * MINUTE);
  });
});

describe("a connection that broke", () => {
  test.each(["ECONNECTION", "ETIMEDOUT", "ESOCKET"])("before the dot (%s): tried again soon, never unknown", (fault) => {
    const settled = settle(result({ phase: "message", fault }), attempt);
    expect(settled).toMatchObject({ state: "deferred", lost: false, reply: fault, pause: false });
    expect(settled.delayMs).toBeLessThanOrEqual(MINUTE);
  });

  test("after the dot: unknown for routine mail, once more for urgent, unknown the second time", () => {
    const cut = result({ phase: "ended", fault: "ECONNECTION" });
    expect(settle(cut, attempt)).toMatchObject({ state: "unknown", lost: true, delayMs: null });
    expect(settle(cut, { ...attempt, resend: true })).toMatchObject({ state: "queued", lost: true, delayMs: 0 });
    expect(settle(cut, { ...attempt, resend: true, lostBefore: true })).toMatchObject({ state: "unknown", lost: true, delayMs: null });
  });

  test("after the dot with an answer: the answer counts", () => {
    expect(settle(result({ phase: "ended", ...parseReply("450 4.3.0") }), attempt)).toMatchObject({ state: "deferred", lost: false });
    expect(settle(result({ phase: "ended", ...parseReply("554 5.7.1") }), attempt)).toMatchObject({ state: "rejected", lost: false });
  });

  test("a server that isn't there, or won't have us, rejects nobody: everything waits", () => {
    for (const broken of [
      result({ phase: "connecting", fault: "ESOCKET" }),
      result({ phase: "connecting", ...parseReply("554 no service") }),
      result({ phase: "connecting", refusedUs: true, ...parseReply("535 5.7.8 no") }),
      result({ phase: "message", refusedUs: true, ...parseReply("553 5.7.1 sender refused") }),
    ]) {
      expect(settle(broken, attempt)).toMatchObject({ state: "deferred", pause: true, suppress: false });
    }
  });
});

test.each([
  ["250 2.0.0 ok", 250, "2.0.0"],
  ["550-5.1.1 first\r\n550 5.1.1 second", 550, "5.1.1"],
  ["550 no status", 550, null],
  ["", null, null],
  ["250 12.1 not a status", 250, null],
])("parseReply(%s)", (text, code, status) => expect(parseReply(text)).toEqual({ code, status }));
