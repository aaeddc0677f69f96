// npm start: everything on one machine, from nothing. Needs only Node.js; the rest it installs or says how to.
import fs from "node:fs";
import path from "node:path";
import { dataDir, ensureBuild, ensurePackages, environment, requireNode, root, runProgram, startProgram, stopProgram, waitFor } from "./prepare.mjs";
import { ensureDatabase, freePort, startCluster } from "./server.mjs";

const dev = process.argv.includes("--dev");
const began = Date.now();
const say = (/** @type {string} */ line) => console.log(`${((Date.now() - began) / 1000).toFixed(1).padStart(6)} s  ${line}`);

/** @type {{ name: string, child: import("node:child_process").ChildProcess }[]} */
const running = [];
/** @type {import("./server.mjs").Cluster | undefined} */
let cluster;
let stopping = false;

async function stopAll(code = 0) {
  if (stopping) return;
  stopping = true;
  if (running.length > 0 || cluster) console.log("\nStopping …");
  for (const { child } of running.reverse()) await stopProgram(child, 10_000);
  await cluster?.stop();
  console.log("Everything that was started here has stopped. The data stays in .data.");
  process.exit(code);
}
process.on("SIGINT", () => stopAll());
process.on("SIGTERM", () => stopAll());

/** The ports of last time where they are free, so that addresses in sent mail go on working. */
async function ports() {
  const file = path.join(dataDir, "ports.json");
  const last = fs.existsSync(file) ? JSON.parse(fs.readFileSync(file, "utf8")) : {};
  const wanted = { web: Number(process.env["PORT"] ?? last.web ?? 3000), smtp: last.smtp ?? 2525, sink: last.sink ?? 3025, postgres: last.postgres ?? 54329 };
  /** @type {Record<string, number>} */
  const got = {};
  for (const [name, port] of Object.entries(wanted)) {
    got[name] = await freePort(port);
    if (got[name] !== port) say(`Port ${port} (${name}) is taken; using ${got[name]}.`);
  }
  fs.writeFileSync(file, JSON.stringify(got));
  return /** @type {{ web: number, smtp: number, sink: number, postgres: number }} */ (got);
}

/** Starts a process and starts it again when it ends by itself; gives up after five times in a minute. */
function keep(name, file, env) {
  const logFile = path.join(dataDir, `${name}.log`);
  const ends = [];
  const entry = { name, child: startProgram(file, env, logFile) };
  running.push(entry);
  const watch = () =>
    entry.child.once("exit", (code, signal) => {
      if (stopping) return;
      ends.push(Date.now());
      console.log(`${name} ended (${signal ?? code}); see .data/${name}.log. Starting it again.`);
      if (ends.filter((at) => at > Date.now() - 60_000).length >= 5) {
        console.log(`${name} ended five times within a minute.`);
        stopAll(1);
        return;
      }
      setTimeout(() => {
        if (stopping) return;
        entry.child = startProgram(file, env, logFile);
        watch();
      }, 1_000);
    });
  watch();
  return entry;
}

try {
  requireNode(20);
  process.chdir(root);
  ensurePackages(say);
  const at = await ports();
  say("Starting PostgreSQL …");
  cluster = await startCluster({ dataDir, port: at.postgres, say });
  if (ensureDatabase(cluster, "ebbmark")) say("Made the database.");
  const env = environment(cluster, at);
  runProgram("db/migrate.ts", env);
  const seeded = runProgram("db/seed.ts", env);
  if (seeded) say(seeded.split("\n").at(-1) ?? "");
  if (dev) Object.assign(env, { EBBMARK_DEV: "1", NODE_ENV: "development" });
  else ensureBuild(env, "start", say);
  say("Starting web, worker and mail sink …");
  keep("mail-sink", "lib/mail/sink.ts", { ...env, EBBMARK_SINK_DIR: path.join(dataDir, "mail") });
  keep("worker", "lib/jobs/worker.ts", env);
  keep("web", "lib/web/server.ts", env);
  await waitFor(`http://127.0.0.1:${at.web}/api/health`, 60_000, () => (stopping ? "The web process does not stay up; see .data/web.log." : null));
  say("Ready.");
  console.log(`
  Residents read at     http://127.0.0.1:${at.web}/en
  Staff sign in at      http://127.0.0.1:${at.web}/sign-in
  Mail can be read at   http://127.0.0.1:${at.sink}

  On the sign-in page one click signs in each person of the demonstration:
  two policy advisers, three communications officers, two legal reviewers, one administrator.
  Kelmaren and sedge fever are invented. Ctrl-C stops everything; the data stays.
`);
} catch (error) {
  console.log(`\nEbbmark could not start.\n${error instanceof Error ? error.message : error}`);
  await stopAll(1);
}
