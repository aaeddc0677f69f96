import { Readable } from "node:stream";
import SMTPPool from "nodemailer/lib/smtp-pool";

export const TIMEOUTS = { connectionMs: 10_000, greetingMs: 10_000, socketMs: 60_000 };

/**
 * How far a message got. `connecting`: nothing was said about it; `message`: begun, and certainly not ended; `ended`:
 * its last bytes may have gone out, so only the server's answer tells whether it was taken.
 */
export type Phase = "connecting" | "message" | "ended";
export type SmtpResult = {
  phase: Phase;
  accepted: boolean;
  /** Reply code, where the server answered. */
  code: number | null;
  /** Enhanced status ("5.1.1"), where the answer had one. */
  status: string | null;
  /** What broke, where it didn't answer: ETIMEDOUT, ECONNECTION, … */
  fault: string | null;
  /** The server refused us, not this message. */
  refusedUs: boolean;
};

export type Envelope = { from: string; to: string; messageId: string };

export type MailTransport = {
  /**
   * Sends one message, once: nothing is repeated in here.
   * @param mayEnd asked before the last bytes go out; where it answers false or throws, they don't
   */
  send(message: Buffer, envelope: Envelope, mayEnd: () => Promise<boolean>): Promise<SmtpResult>;
  /** Closes idle connections, and with `force` busy ones too. */
  close(force?: boolean): void;
};

export type TransportOptions = { url: string; connections: number; name: string; timeouts?: Partial<typeof TIMEOUTS> };

/** A pool of connections that never tries anything again by itself: only the outbox decides about a second attempt. */
export function openTransport({ url, connections, name, timeouts }: TransportOptions): MailTransport {
  const { connectionMs, greetingMs, socketMs } = { ...TIMEOUTS, ...timeouts };
  const pool = new SMTPPool({
    url,
    name,
    maxConnections: connections,
    maxMessages: 500,
    maxRequeues: 0,
    connectionTimeout: connectionMs,
    greetingTimeout: greetingMs,
    socketTimeout: socketMs,
    idleTimeout: 30_000,
    disableFileAccess: true,
    disableUrlAccess: true,
  });
  return {
    close: (force = false) => pool.close({ force }),
    send: (message, { from, to, messageId }, mayEnd) =>
      new Promise((resolve) => {
        let phase: Phase = "connecting";
        const body = async function* () {
          // All but the last line first; the line and the dot that ends the message only once the outbox knows.
          const last = Math.max(0, message.length - LAST_BYTES);
          yield message.subarray(0, last);
          if (!(await mayEnd())) throw new Error("the lease on this message is lost");
          phase = "ended";
          yield message.subarray(last);
        };
        // The pool asks a mail for these four things and no more. It asks for the stream once a connection is ready, and
        // the stream begins when the server has said that it may: so each step tells how far the message is.
        const mail = {
          data: {},
          message: {
            getEnvelope: () => ({ from, to: [to] }),
            messageId: () => messageId,
            getHeader: () => messageId,
            createReadStream: () => {
              phase = "message";
              return Readable.from(body(), { objectMode: false });
            },
          },
        };
        pool.send(mail as unknown as Parameters<typeof pool.send>[0], (error, info) => {
          if (!error) {
            resolve({ phase, accepted: true, refusedUs: false, fault: null, ...parseReply(info?.response) });
            return;
          }
          const answered = error.responseCode !== undefined;
          resolve({
            phase,
            accepted: false,
            ...parseReply(answered ? (error.response ?? String(error.responseCode)) : ""),
            fault: answered ? null : (error.code ?? "EUNKNOWN"),
            refusedUs: refusedUs(error),
          });
        });
      }),
  };
}

const LAST_BYTES = 16;

/** Authentication failed or is asked for, or nobody may send from our address. */
const refusedUs = ({ code, responseCode = 0, command }: { code?: string | undefined; responseCode?: number | undefined; command?: string | undefined }): boolean =>
  code === "EAUTH" || code === "ENOAUTH" || responseCode === 530 || responseCode === 535 || (command === "MAIL FROM" && responseCode >= 500);

/** Code and enhanced status of a reply; its text stays here, for it may hold the address. */
export function parseReply(reply: string | undefined): { code: number | null; status: string | null } {
  const [, code, status] = /^(\d{3})(?:[ -](\d\.\d{1,3}\.\d{1,3})\b)?/.exec(reply ?? "") ?? [];
  return { code: code === undefined ? null : Number(code), status: status ?? null };
}
