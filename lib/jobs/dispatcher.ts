import type postgres from "postgres";
import type { MailTransport, SmtpResult } from "../mail/transport";
import { inGroups } from "./in-groups";
import { faultOf, type Log } from "./log";
import { type Claimed, claim, markEnding, recover, release, type Settled, writeSettled } from "./outbox";
import { giveUpAfterMs, settle } from "./settle";

export type Composed = { message: Buffer; returnPath: string };
export type DispatcherOptions = {
  /** Own connections: claims and results never wait for anything else. */
  sql: postgres.Sql;
  transport: MailTransport;
  /** Writes one delivery's message, the same bytes every time. */
  compose: (row: Claimed) => Promise<Composed>;
  log: Log;
  domain: string;
  connections: number;
  leaseSeconds: number;
  pollMs?: number;
};
export type Dispatcher = {
  /** Says that something may be due. */
  wake(): void;
  /** Claims nothing more, lets what is under way end, gives back the rest. Safe to call twice. */
  stop(graceMs?: number): Promise<void>;
};

const RECOVER_EVERY_MS = 1_000;
/** A result in hand is worth waiting for the database: lost, it would leave a mail in doubt. */
const WRITE_TRIES = 8;
const LONGEST_PAUSE_MS = 60_000;

/**
 * Sends what is due in the outbox. What is claimed and not yet written back is at most twice the number of connections,
 * so that a crash leaves no more than that in doubt.
 */
export function startDispatcher(options: DispatcherOptions): Dispatcher {
  const { sql, transport, compose, log, domain, connections, leaseSeconds, pollMs = 1_000 } = options;
  const capacity = 2 * connections;
  /** Claimed and not yet written back. */
  const held = new Map<string, Claimed>();
  /** Of these, those whose message was handed to a connection. */
  const begun = new Set<string>();
  let stopping = false;
  let pausedUntil = 0;
  let pauseMs = 0;
  let wakeUp = () => {};
  let lastRecovery = 0;

  const mayEnd = inGroups<{ id: string; leaseToken: string }, boolean>(async (rows) => {
    const marked = await markEnding(sql, rows);
    return rows.map(({ id }) => marked.has(id));
  });
  const write = inGroups<Settled, boolean>(async (results) => {
    const written = await patiently(() => writeSettled(sql, results));
    return results.map(({ id }) => written.has(id));
  });

  async function deliver(row: Claimed): Promise<void> {
    try {
      const result = await attempt(row);
      if (result === null) return;
      const settlement = settle(result, attemptOf(row));
      notePause(settlement.pause, result.accepted);
      const written = await write({ id: row.id, leaseToken: row.leaseToken, subscriptionId: row.subscriptionId, settlement });
      if (!written) log("warn", "lease lost", { delivery: row.id, phase: result.phase, accepted: result.accepted });
      else if (settlement.state !== "accepted") log(settlement.state === "deferred" || settlement.state === "queued" ? "info" : "warn", `mail ${settlement.state}`, { delivery: row.id, kind: row.kind, reply: settlement.reply ?? "", phase: result.phase });
    } catch (error) {
      // The row stays as it is: its lease runs out, and recovery reads from it how far it got.
      log("error", "delivery failed", { delivery: row.id, ...faultOf(error) });
    } finally {
      held.delete(row.id);
      begun.delete(row.id);
      wakeUp();
    }
  }

  /** One try. Null where nothing was tried and the row was given back. */
  async function attempt(row: Claimed): Promise<SmtpResult | null> {
    const nothing = { phase: "message" as const, accepted: false, code: null, status: null, refusedUs: false };
    const { linkMs } = attemptOf(row);
    if (row.ageMs > giveUpAfterMs(linkMs === undefined ? {} : { linkMs })) return { ...nothing, fault: "EXPIRED" };
    let composed: Composed;
    try {
      composed = await compose(row);
    } catch (error) {
      log("error", "mail could not be written", { delivery: row.id, kind: row.kind, ...faultOf(error) });
      return { ...nothing, fault: "ECOMPOSE" };
    }
    if (stopping) {
      await release(sql, [row]);
      return null;
    }
    begun.add(row.id);
    return transport.send(composed.message, { from: composed.returnPath, to: row.recipient, messageId: row.messageId }, () => mayEnd(row));
  }

  function notePause(pause: boolean, accepted: boolean): void {
    if (accepted) pauseMs = 0;
    if (!pause || pausedUntil > Date.now()) return;
    pauseMs = Math.min(LONGEST_PAUSE_MS, Math.max(1_000, 2 * pauseMs));
    pausedUntil = Date.now() + pauseMs;
    log("warn", "sending pauses", { seconds: pauseMs / 1_000 });
  }

  async function recoverSometimes(): Promise<void> {
    if (Date.now() - lastRecovery < RECOVER_EVERY_MS) return;
    lastRecovery = Date.now();
    const recovered = await recover(sql);
    if (recovered.queued + recovered.resent + recovered.unknown > 0) log("warn", "recovered after a crash", recovered);
  }

  async function look(): Promise<number> {
    await recoverSometimes();
    const room = capacity - held.size;
    if (pausedUntil > Date.now() || room < connections) return 0;
    const rows = await claim(sql, { limit: room, leaseSeconds, domain });
    for (const row of rows) {
      held.set(row.id, row);
      void deliver(row);
    }
    return rows.length;
  }

  async function run(): Promise<void> {
    let failures = 0;
    while (!stopping) {
      const waking = new Promise<void>((resolve) => {
        wakeUp = resolve;
      });
      let found = 0;
      try {
        found = await look();
        failures = 0;
      } catch (error) {
        failures += 1;
        log("error", "the outbox can't be read", faultOf(error));
      }
      if (found > 0 || stopping) continue;
      await Promise.race([waking, delay(failures === 0 ? pollMs : Math.min(30_000, pollMs * 2 ** failures))]);
    }
  }

  const running = run();
  return {
    wake: () => wakeUp(),
    async stop(graceMs = 25_000) {
      stopping = true;
      wakeUp();
      await running;
      const until = Date.now() + graceMs;
      while (held.size > 0 && Date.now() < until) await delay(20);
      const rest = [...held.values()].filter(({ id }) => !begun.has(id));
      if (rest.length > 0) await release(sql, rest).catch((error: unknown) => log("error", "nothing could be given back", faultOf(error)));
      transport.close(true);
      // What was cut off now has a result too.
      for (let waited = 0; held.size > 0 && waited < 2_000; waited += 20) await delay(20);
    },
  };
}

const delay = (ms: number) => new Promise<void>((resolve) => setTimeout(resolve, ms));

async function patiently<T>(run: () => Promise<T>): Promise<T> {
  for (let tried = 1; ; tried += 1) {
    try {
      return await run();
    } catch (error) {
      if (tried === WRITE_TRIES) throw error;
      await delay(Math.min(8_000, 100 * 2 ** tried));
    }
  }
}

function attemptOf({ kind, attempts, ageMs, resend, lostBefore, payload }: Claimed) {
  const minutes = Number(payload["minutes"] ?? Number(payload["hours"]) * 60);
  return { kind, attempts, ageMs, resend, lostBefore, ...(Number.isFinite(minutes) ? { linkMs: minutes * 60_000 } : {}) };
}
