/** npm run worker: sends the outbox and tidies up. Any number may run; each mail still goes out once. */
import "./worker-process";
import { readFileSync } from "node:fs";
import postgres from "postgres";
import { closeDb } from "@/db/client";
import { type Env, env } from "../env";
import type { Sender } from "../mail/compose";
import { openTransport } from "../mail/transport";
import { deliveryComposer } from "./compose-delivery";
import { startDispatcher } from "./dispatcher";
import { startHousekeeping } from "./housekeeping";
import { faultOf, jsonLog as log } from "./log";
import { OUTBOX_CONNECTION } from "./outbox";

const settings = env();

/** Raw connections of the dispatcher, apart from those of commands: dates come as dates, and claims never wait. */
const sql = postgres(settings.DATABASE_WORKER_URL ?? settings.DATABASE_URL, {
  max: 3,
  connect_timeout: 5,
  connection: OUTBOX_CONNECTION,
  onnotice: () => {},
});

function senderOf(settings: Env): Sender {
  const { DKIM_DOMAIN: domain, DKIM_SELECTOR: selector, DKIM_KEY_FILE: keyFile } = settings;
  return {
    from: settings.MAIL_FROM,
    replyTo: settings.AUTHORITY_CONTACT.includes("@") ? settings.AUTHORITY_CONTACT : settings.MAIL_FROM,
    domain: settings.MAIL_DOMAIN,
    base: settings.EBBMARK_URL,
    authority: settings.AUTHORITY_NAME,
    dkim: domain && selector && keyFile ? { domain, selector, privateKey: readFileSync(keyFile, "utf8") } : null,
  };
}

const sender = senderOf(settings);
const dispatcher = startDispatcher({
  sql,
  transport: openTransport({ url: settings.SMTP_URL, connections: settings.MAIL_CONNECTIONS, name: settings.MAIL_DOMAIN }),
  compose: deliveryComposer({ sql, sender, contact: settings.AUTHORITY_CONTACT, demonstration: settings.demo }),
  log,
  domain: settings.MAIL_DOMAIN,
  connections: settings.MAIL_CONNECTIONS,
  leaseSeconds: settings.MAIL_LEASE_SECONDS,
});
const stopHousekeeping = startHousekeeping(sql, log);
// A hint and no more: the dispatcher looks every second anyway, and the listener reconnects by itself.
sql.listen("ebbmark_outbox", () => dispatcher.wake()).catch((error: unknown) => log("warn", "not listening", faultOf(error)));

let stopping = false;
async function stop(): Promise<void> {
  if (stopping) return;
  stopping = true;
  log("info", "worker stops");
  await dispatcher.stop();
  await stopHousekeeping();
  await Promise.all([sql.end({ timeout: 2 }), closeDb()]);
  process.exit(0);
}
process.on("SIGTERM", stop);
process.on("SIGINT", stop);
// The outbox survives a crash by design; a process in an unknown state doesn't go on sending.
process.on("unhandledRejection", (error) => {
  log("error", "unhandled rejection", faultOf(error));
  process.exit(1);
});

process.stdout.write("worker ready\n");
