// npm test: installs what is missing, starts a throw-away database, mail sink, worker and web, runs every suite, stops all.
import { spawnSync } from "node:child_process";
import fs from "node:fs";
import os from "node:os";
import path from "node:path";
import { ensureBuild, ensurePackages, environment, requireNode, root, runProgram, startProgram, stopProgram, waitFor } from "../db/prepare.mjs";
import { aptInstall, ensureDatabase, freePort, startCluster } from "../db/server.mjs";

const only = process.argv.find((arg) => arg.startsWith("--only="))?.slice(7).split(",");
const long = process.argv.includes("--long");
const wants = (/** @type {string} */ name) => !only || only.includes(name);
const began = Date.now();
const say = (/** @type {string} */ line) => console.log(`${((Date.now() - began) / 1000).toFixed(1).padStart(6)} s  ${line}`);
const total = { passed: 0, failed: 0, skipped: 0 };

/** @type {import("node:child_process").ChildProcess[]} */
const running = [];
/** @type {import("../db/server.mjs").Cluster | undefined} */
let cluster;
const dataDir = fs.mkdtempSync(path.join(os.tmpdir(), "ebbmark-test-"));
fs.chmodSync(dataDir, 0o755);

/** One check that is not a vitest file; counts as one test. */
function check(/** @type {string} */ name, /** @type {string[]} */ command, env = process.env) {
  const run = spawnSync(process.execPath, command, { cwd: root, env, encoding: "utf8", maxBuffer: 1 << 26 });
  const passed = run.status === 0;
  total[passed ? "passed" : "failed"] += 1;
  say(`${passed ? "passed" : "FAILED"}: ${name}`);
  if (!passed) console.log(run.stdout + run.stderr);
}

function suite(/** @type {string[]} */ projects, env = process.env) {
  const report = path.join(dataDir, `${projects.join("-")}.json`);
  const args = ["node_modules/vitest/vitest.mjs", "run", "--reporter=default", "--reporter=json", `--outputFile.json=${report}`, ...projects.flatMap((p) => ["--project", p])];
  const run = spawnSync(process.execPath, args, { cwd: root, env: { ...env, NODE_ENV: "test", CI: "true" }, stdio: ["ignore", "inherit", "inherit"] });
  const result = fs.existsSync(report) ? JSON.parse(fs.readFileSync(report, "utf8")) : null;
  if (!result) {
    total.failed += 1;
    say(`FAILED: ${projects.join(", ")} left no report (exit ${run.status})`);
    return;
  }
  total.passed += result.numPassedTests;
  total.failed += result.numFailedTests;
  total.skipped += result.numPendingTests + result.numTodoTests;
  // A file that fails outside its tests (an import, a hook) counts too.
  const broken = result.testResults.filter((f) => f.status === "failed" && f.assertionResults.every((a) => a.status !== "failed")).length;
  total.failed += broken;
  if (run.status !== 0 && result.numFailedTests + broken === 0) total.failed += 1;
  say(`${projects.join(", ")}: ${result.numPassedTests} passed, ${result.numFailedTests + broken} failed, ${result.numPendingTests} skipped`);
}

async function stopAll() {
  for (const child of running.reverse()) await stopProgram(child, 10_000);
  await cluster?.stop();
  if (cluster) fs.rmSync(cluster.dir, { recursive: true, force: true });
  if (total.failed === 0) fs.rmSync(dataDir, { recursive: true, force: true });
  else say(`Logs are in ${dataDir}`);
}
for (const signal of ["SIGINT", "SIGTERM"]) process.on(signal, () => stopAll().then(() => process.exit(1)));

function findChromium() {
  const found = ["/usr/bin/chromium", "/usr/bin/chromium-browser"].find((file) => fs.existsSync(file));
  if (found) return found;
  if (process.getuid?.() !== 0) throw new Error("Chromium is missing. Run this once, then test again:\n  sudo apt-get install -y chromium");
  say("Chromium is missing: installing Debian's package …");
  aptInstall(["chromium"]);
  return "/usr/bin/chromium";
}

try {
  requireNode(20);
  process.chdir(root);
  ensurePackages(say);
  const browser = wants("browser") || long ? findChromium() : "";
  if (wants("types")) {
    check("types", ["node_modules/typescript/bin/tsc", "--noEmit"]);
    check("lint", ["node_modules/@biomejs/biome/bin/biome", "lint", "--config-path=.biome.json", "--diagnostic-level=error", "."]);
  }
  if (wants("unit")) suite(["unit"]);
  if (wants("reference")) suite(["reference"]);
  if (wants("integration") || wants("browser") || long) {
    cluster = await startCluster({ dataDir, durable: false, say });
    const at = { web: await freePort(), smtp: await freePort(), sink: await freePort() };
    const inDatabase = (/** @type {string} */ database) => {
      ensureDatabase(/** @type {import("../db/server.mjs").Cluster} */ (cluster), database);
      const env = {
        ...environment(/** @type {import("../db/server.mjs").Cluster} */ (cluster), { ...at, database }),
        DATABASE_SUPER_URL: /** @type {import("../db/server.mjs").Cluster} */ (cluster).url("postgres", database),
        CHROMIUM: browser,
      };
      runProgram("db/migrate.ts", env);
      return env;
    };
    if (wants("integration")) suite(["integration"], inDatabase("ebbmark_integration"));
    if (wants("browser") || long) {
      const env = { ...inDatabase("ebbmark_browser"), EBBMARK_DIST: ".next-test", EBBMARK_SINK_DIR: path.join(dataDir, "mail"), EBBMARK_LOG_DIR: dataDir };
      runProgram("db/seed.ts", env);
      ensureBuild(env, String(cluster.port), say);
      say("Starting web, worker and mail sink …");
      for (const [name, file] of [["mail-sink", "lib/mail/sink.ts"], ["worker", "lib/jobs/worker.ts"], ["web", "lib/web/server.ts"]]) {
        running.push(startProgram(/** @type {string} */ (file), env, path.join(dataDir, `${name}.log`)));
      }
      await waitFor(`http://127.0.0.1:${at.web}/api/health`, 60_000);
      if (wants("browser")) suite(["browser"], env);
      if (long) suite(["long"], env);
    }
  }
} catch (error) {
  total.failed += 1;
  console.log(error instanceof Error ? error.message : error);
} finally {
  await stopAll();
}
say("done");
if (total.passed + total.failed === 0) total.failed = 1;
console.log(`${total.passed} passed, ${total.failed} failed, ${total.skipped} skipped`);
process.exit(total.failed > 0 ? 1 : 0);
