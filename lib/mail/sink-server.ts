import { SMTPServer, type SMTPServerSession } from "smtp-server";
import { type Script, scriptReader } from "./sink-script";
import type { SinkStore } from "./sink-store";

export type Sink = { port: number; close(): Promise<void> };

const MOST_BYTES = 10 * 1024 * 1024;

/**
 * A mail server on loopback that keeps what it gets and sends nothing on. Recipients can ask for any answer (sink-script).
 * @param port 0 for a free one
 */
export async function openSink({ port, store, delayMs = 0 }: { port: number; store: SinkStore; delayMs?: number }): Promise<Sink> {
  const readScript = scriptReader();
  /** What the recipient of a session's present message asks for. */
  const scripts = new Map<string, Script>();
  const server = new SMTPServer({
    authOptional: true,
    disabledCommands: ["AUTH", "STARTTLS"],
    disableReverseLookup: true,
    logger: false,
    size: MOST_BYTES,
    socketTimeout: 120_000,
    closeTimeout: 500,
    onRcptTo({ address }, session, done) {
      const script = readScript(address);
      scripts.set(session.id, script);
      if (script.act === "reply" && script.at === "rcpt") done(refusal(script));
      else if (script.act === "drop" && script.at === "rcpt") drop(session);
      else if (!(script.act === "silent" && script.at === "rcpt")) done();
    },
    onData(stream, session, done) {
      const script = scripts.get(session.id) ?? { act: "take" };
      const chunks: Buffer[] = [];
      stream.on("error", () => {});
      stream.on("data", (chunk: Buffer) => {
        chunks.push(chunk);
        if (script.act === "drop" && script.at === "beforeDot") drop(session);
      });
      stream.on("end", () => {
        const { mailFrom, rcptTo } = session.envelope;
        if (script.act === "reply") {
          done(refusal(script));
          return;
        }
        const taken = script.act !== "drop" || (script.at === "afterDot" && script.taken);
        if (taken) store.add({ from: mailFrom ? mailFrom.address : "", to: rcptTo[0]?.address ?? "", raw: Buffer.concat(chunks) });
        if (script.act === "drop") drop(session);
        else if (script.act !== "silent") setTimeout(() => done(null, "2.0.0 kept"), delayMs);
      });
    },
    onClose: (session) => scripts.delete(session.id),
  });

  /** Cuts the connection as a crash would, without a word. */
  function drop({ id }: SMTPServerSession): void {
    for (const connection of server.connections) {
      const { session, _socket } = connection as unknown as { session: SMTPServerSession; _socket: { destroy(): void } };
      if (session.id === id) _socket.destroy();
    }
  }

  server.on("error", () => {});
  await new Promise<void>((resolve, reject) => {
    server.server.once("error", reject);
    server.listen(port, "127.0.0.1", () => resolve());
  });
  const address = server.server.address();
  return {
    port: typeof address === "object" && address ? address.port : port,
    close: () => new Promise((resolve) => server.close(() => resolve())),
  };
}

function refusal({ code, text }: Extract<Script, { act: "reply" }>): Error {
  return Object.assign(new Error(text), { responseCode: code });
}
