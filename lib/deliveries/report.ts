import type { MailKind } from "../jobs/settle";
import type { Locale } from "../i18n/locales";

/** How many deliveries stand where. Together they are all that were put in the outbox. */
export type Counts = {
  /** Queued, put off, or being sent. */
  waiting: number;
  accepted: number;
  rejected: number;
  /** Held back: the reader left, the address is suspended, or the release was replaced. */
  suppressed: number;
  /** The outcome is lost and stays so. */
  unknown: number;
  /** Of the accepted: sent a second time after a lost outcome, so the reader may have it twice. */
  twice: number;
};
export const NO_COUNTS: Counts = { waiting: 0, accepted: 0, rejected: 0, suppressed: 0, unknown: 0, twice: 0 };

export type ReleaseCounts = Counts & {
  releaseId: string;
  briefingId: string;
  title: string;
  number: number;
  urgency: "urgent" | "routine";
  kind: "briefing" | "withdrawal";
  /** ISO moment. */
  publishedAt: string;
};
export type KindCounts = Counts & { kind: Exclude<MailKind, "briefing" | "withdrawal"> };

/** What somebody should look at, as counts; 0 is quiet. */
export const ALARMS = ["overdue", "unreachable", "refusedUs", "policy", "gaveUp", "suspended"] as const;
export type Alarms = Record<(typeof ALARMS)[number], number>;

export type DeliveryReport = { readAt: string; releases: ReleaseCounts[]; kinds: KindCounts[]; alarms: Alarms };
/** One delivery whose outcome is lost: where it belongs, never to whom it went. */
export type UnknownDelivery = { id: string; title: string | null; kind: MailKind; locale: Locale; at: string; reply: string | null };
