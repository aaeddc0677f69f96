import type postgres from "postgres";
import { systemCtx } from "../context";
import { eraseSubscriptions } from "../subscribers/erase-subscriptions";
import { faultOf, type Log } from "./log";
import { holdBack } from "./outbox";

const EVERY_MS = 5 * 60_000;

/** What has run out by the database's clock: sign-in links, sessions, and addresses that nobody confirmed or that left. */
export async function tidyUp(sql: postgres.Sql, log: Log): Promise<void> {
  const tasks: [name: string, run: () => Promise<number>][] = [
    ["mail held back", () => holdBack(sql)],
    ["sign-in links purged", async () => (await sql`delete from verification_tokens where expires < now()`).count],
    ["sessions purged", async () => (await sql`delete from sessions where expires < now()`).count],
    ["subscriptions erased", () => eraseSubscriptions(systemCtx("worker"))],
  ];
  for (const [name, run] of tasks) {
    // One that fails must not keep the others from running.
    const count = await run().catch((error: unknown) => {
      log("error", "housekeeping failed", { task: name, ...faultOf(error) });
      return 0;
    });
    if (count > 0) log("info", name, { count });
  }
}

/** Now and every five minutes. @returns stops it */
export function startHousekeeping(sql: postgres.Sql, log: Log): () => Promise<void> {
  let running = tidyUp(sql, log);
  const timer = setInterval(() => {
    running = running.then(() => tidyUp(sql, log));
  }, EVERY_MS);
  return async () => {
    clearInterval(timer);
    await running;
  };
}
