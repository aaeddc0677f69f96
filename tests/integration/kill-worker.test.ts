import { afterAll, beforeAll, expect, test } from "vitest";
import { closeDb } from "@/db/client";
import { CONNECTIONS, killRun } from "../fixtures/kill-run";
import { ownDatabase } from "../fixtures/own-database";

// The short form; tests/long has twenty kills and two thousand mails.
let drop = async () => {};
beforeAll(async () => {
  drop = await ownDatabase("kill");
});
afterAll(async () => {
  await closeDb();
  await drop();
});

test("the worker is killed twice during a mailing: outside the unknown nothing is lost and nothing doubled", async () => {
  const report = await killRun({ kills: 2, mails: 200, seed: 20_270_302 });
  expect(report).toMatchObject({ duplicatesOutside: 0, lossesOutside: 0, unfinished: 0 });
  expect(report.unknownRoutine + report.unknownUrgent).toBeLessThanOrEqual(report.kills * 2 * CONNECTIONS);
  expect(report.duplicates).toBeLessThanOrEqual(report.unknownUrgent);
  expect(report.losses).toBeLessThanOrEqual(report.unknownRoutine);
});
