import { afterAll, beforeAll, expect, test } from "vitest";
import { closeDb } from "@/db/client";
import { CONNECTIONS, killRun } from "../fixtures/kill-run";
import { ownDatabase } from "../fixtures/own-database";

let drop = async () => {};
beforeAll(async () => {
  drop = await ownDatabase("kills");
});
afterAll(async () => {
  await closeDb();
  await drop();
});

test("20 kills during a mailing of 2,000: nothing lost or doubled but among the unknown, and those are few", async () => {
  const report = await killRun({ kills: 20, mails: 2_000, seed: Number(process.env["KILL_SEED"] ?? Date.now() % 1_000_000) });
  process.stdout.write(`${JSON.stringify(report)}\n`);
  expect(report).toMatchObject({ duplicatesOutside: 0, lossesOutside: 0, unfinished: 0 });
  expect(report.unknownRoutine + report.unknownUrgent).toBeLessThanOrEqual(report.kills * 2 * CONNECTIONS);
  expect(report.duplicates).toBeLessThanOrEqual(report.unknownUrgent);
  expect(report.losses).toBeLessThanOrEqual(report.unknownRoutine);
});
