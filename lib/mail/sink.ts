/**
 * npm run mail-sink: the demonstration's mail server and the page that shows what it got, both on loopback.
 * SMTP_SINK_PORT (else the port of SMTP_URL), SINK_WEB_PORT, EBBMARK_SINK_DIR (else in memory), SMTP_SINK_DELAY_MS.
 */
import { openSink } from "./sink-server";
import { openStore } from "./sink-store";
import { openSinkWeb } from "./sink-web";

const portOf = (name: string, fallback: string | undefined): number => {
  const port = Number(process.env[name] || fallback || "0");
  if (!Number.isInteger(port) || port < 0 || port > 65_535) throw new Error(`${name}: must be a port, 0 to 65535`);
  return port;
};

const store = openStore(process.env["EBBMARK_SINK_DIR"] || null);
const smtpUrl = process.env["SMTP_URL"];
const sink = await openSink({ port: portOf("SMTP_SINK_PORT", smtpUrl ? new URL(smtpUrl).port : undefined), store, delayMs: Number(process.env["SMTP_SINK_DELAY_MS"] || 0) });
const web = await openSinkWeb({ port: portOf("SINK_WEB_PORT", "3025"), store });
const address = web.address();
process.stdout.write(`mail sink ready: smtp ${sink.port}, http ${typeof address === "object" && address ? address.port : ""}, ${store.entries().length} kept\n`);

let stopping = false;
async function stop(): Promise<void> {
  if (stopping) return;
  stopping = true;
  web.closeAllConnections();
  web.close();
  await sink.close();
  store.close();
  process.exit(0);
}
process.on("SIGTERM", stop);
process.on("SIGINT", stop);
