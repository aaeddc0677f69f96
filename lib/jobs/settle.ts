import type { SmtpResult } from "../mail/transport";

export const MINUTE_MS = 60_000;
const HOUR_MS = 60 * MINUTE_MS;
const DAY_MS = 24 * HOUR_MS;

export type MailKind = "signIn" | "invitation" | "confirmSubscription" | "briefing" | "withdrawal";

/** What is known of a delivery when its attempt ends. */
export type Attempt = {
  kind: MailKind;
  /** This one included. */
  attempts: number;
  /** Since it was put in the outbox, by the database's clock. */
  ageMs: number;
  /** Whether a lost outcome is tried once more: the release is urgent, or the mail is for one person who waits. */
  resend: boolean;
  /** Whether an outcome was lost before. */
  lostBefore: boolean;
  /** Life of the link in it. Absent: it never goes stale. */
  linkMs?: number;
};

export type Settlement = {
  state: "queued" | "deferred" | "accepted" | "rejected" | "unknown";
  /** Wait before the next attempt; null where there is none. */
  delayMs: number | null;
  /** Code and status, never text. */
  reply: string | null;
  /** The outcome of this attempt is lost. */
  lost: boolean;
  /** The address doesn't exist: nothing more is sent to it. */
  suppress: boolean;
  /** The fault is with the server or with us, so all sending pauses. */
  pause: boolean;
};

/** After a 4yz reply: half an hour at least, growing (RFC 5321, 4.5.4.1). */
const RETRY_MS = [30 * MINUTE_MS, HOUR_MS, 2 * HOUR_MS, 4 * HOUR_MS, 8 * HOUR_MS, 12 * HOUR_MS];
/** A link that lives for minutes can't wait half an hour. */
const SIGN_IN_RETRY_MS = [20_000, 40_000, MINUTE_MS, 2 * MINUTE_MS];
/** After a connection that broke off: the server said nothing about waiting. */
const DROP_RETRY_MS = [5_000, 30_000, 2 * MINUTE_MS, 10 * MINUTE_MS, 30 * MINUTE_MS, HOUR_MS];
const GIVE_UP_MS = 5 * DAY_MS;
/** A full mailbox is tried like a 4yz reply, a few times. */
const FULL_MAILBOX_ATTEMPTS = 4;

const nth = (steps: readonly number[], attempts: number): number => steps[Math.min(Math.max(attempts, 1), steps.length) - 1] ?? GIVE_UP_MS;

/** When a delivery is given up, in time since it was put in the outbox. */
export const giveUpAfterMs = ({ linkMs }: Pick<Attempt, "linkMs">): number => Math.min(GIVE_UP_MS, linkMs ?? GIVE_UP_MS);

/** What becomes of a delivery after an attempt: a table of reply codes and phases, and nothing else. */
export function settle(result: SmtpResult, attempt: Attempt): Settlement {
  const reply = result.code === null ? result.fault : [result.code, result.status].filter((part) => part !== null).join(" ");
  const none: Settlement = { state: "accepted", delayMs: null, reply, lost: false, suppress: false, pause: false };
  if (result.accepted) return none;
  // A server that isn't there, or that won't have us, says nothing about this address: everything waits.
  if (result.refusedUs || result.phase === "connecting") return later({ ...none, pause: true }, attempt, nth(DROP_RETRY_MS, attempt.attempts));
  if (result.code === null) return result.phase === "ended" ? lostOutcome(none, attempt) : later(none, attempt, nth(DROP_RETRY_MS, attempt.attempts));
  const full = result.code === 552 || result.status === "5.2.2";
  if (result.code < 500 || (full && attempt.attempts < FULL_MAILBOX_ATTEMPTS)) {
    const steps = attempt.kind === "signIn" ? SIGN_IN_RETRY_MS : RETRY_MS;
    return later(none, attempt, nth(steps, attempt.attempts));
  }
  return { ...none, state: "rejected", suppress: result.status?.startsWith("5.1.") ?? false };
}

function later(none: Settlement, attempt: Attempt, delayMs: number): Settlement {
  return attempt.ageMs + delayMs > giveUpAfterMs(attempt) ? { ...none, state: "rejected" } : { ...none, state: "deferred", delayMs };
}

/** The one case with no right answer: the message may have been taken or not. */
function lostOutcome(none: Settlement, { resend, lostBefore }: Attempt): Settlement {
  return resend && !lostBefore ? { ...none, state: "queued", delayMs: 0, lost: true } : { ...none, state: "unknown", lost: true };
}
