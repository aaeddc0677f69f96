// What both commands need before anything of ours can run. No package is imported here.
import { spawn, spawnSync } from "node:child_process";
import { createHash } from "node:crypto";
import fs from "node:fs";
import path from "node:path";
import { fileURLToPath } from "node:url";

export const root = fileURLToPath(new URL("..", import.meta.url));
export const dataDir = path.join(root, ".data");
/** The binary itself: a wrapper such as npx would outlive a kill. */
const tsx = ["--import", "tsx"];

/** @param {number} major */
export function requireNode(major) {
  const have = Number(process.versions.node.split(".")[0]);
  if (have < major) throw new Error(`Node.js ${major} or newer is needed; this is ${process.versions.node}.`);
}

/** Installs the npm packages of the lock file, once per lock file. @param {(line: string) => void} say */
export function ensurePackages(say) {
  fs.mkdirSync(dataDir, { recursive: true });
  const stamp = path.join(root, "node_modules", ".ebbmark-lock");
  const wanted = createHash("sha256").update(fs.readFileSync(path.join(root, "package-lock.json"))).digest("hex");
  if (fs.existsSync(stamp) && fs.readFileSync(stamp, "utf8") === wanted) return;
  say("Installing the npm packages of the lock file …");
  const run = spawnSync("npm", ["ci", "--no-audit", "--no-fund", "--loglevel=error"], { cwd: root, stdio: ["ignore", "ignore", "inherit"] });
  if (run.status !== 0) throw new Error("npm ci failed; the lines above say why. Is the npm registry reachable?");
  fs.writeFileSync(stamp, wanted);
}

/**
 * Environment of every process of this installation.
 * @param {import("./server.mjs").Cluster} cluster @param {{ web: number, smtp: number, sink: number, database?: string }} at
 */
export function environment(cluster, at) {
  const secret = cluster.passwords["EBBMARK_SECRET"];
  const database = at.database ?? "ebbmark";
  const url = `http://127.0.0.1:${at.web}`;
  return {
    ...process.env,
    NODE_ENV: "production",
    NEXT_TELEMETRY_DISABLED: "1",
    DATABASE_URL: cluster.url("ebbmark_web", database),
    DATABASE_PORTAL_URL: cluster.url("ebbmark_portal", database),
    DATABASE_WORKER_URL: cluster.url("ebbmark_worker", database),
    DATABASE_OWNER_URL: cluster.url("ebbmark_owner", database),
    DATABASE_VERIFIER_URL: cluster.url("ebbmark_verifier", database),
    EBBMARK_URL: url,
    EBBMARK_SECRET: secret,
    NEXTAUTH_URL: url,
    NEXTAUTH_SECRET: secret,
    SMTP_URL: `smtp://127.0.0.1:${at.smtp}`,
    MAIL_SINK_URL: `http://127.0.0.1:${at.sink}`,
    SMTP_SINK_PORT: String(at.smtp),
    SINK_WEB_PORT: String(at.sink),
    EBBMARK_DEMO: "1",
    MAIL_HOLD_MINUTES: "0",
    PORT: String(at.web),
    HOST: "127.0.0.1",
  };
}

/** Runs a TypeScript program of ours to its end. @param {string} file @param {NodeJS.ProcessEnv} env @param {string[]} args */
export function runProgram(file, env, args = []) {
  const run = spawnSync(process.execPath, [...tsx, file, ...args], { cwd: root, env, stdio: ["ignore", "pipe", "pipe"], encoding: "utf8" });
  if (run.status !== 0) throw new Error(`${file} failed:\n${run.stdout}${run.stderr}`);
  return run.stdout.trim();
}

/** Starts one that stays. @param {string} file @param {NodeJS.ProcessEnv} env @param {string} logFile */
export function startProgram(file, env, logFile) {
  const log = fs.openSync(logFile, "a");
  const child = spawn(process.execPath, [...tsx, file], { cwd: root, env, stdio: ["ignore", log, log], detached: true });
  fs.closeSync(log);
  return child;
}

/** SIGTERM, then SIGKILL for the whole group. @param {import("node:child_process").ChildProcess} child @param {number} graceMs */
export async function stopProgram(child, graceMs = 26_000) {
  if (child.exitCode !== null || child.signalCode !== null) return;
  const ended = new Promise((resolve) => child.once("exit", resolve));
  child.kill("SIGTERM");
  await Promise.race([ended, new Promise((resolve) => setTimeout(resolve, graceMs).unref())]);
  if (child.exitCode === null && child.signalCode === null && child.pid) {
    try {
      process.kill(-child.pid, "SIGKILL");
    } catch {
      child.kill("SIGKILL");
    }
    await ended;
  }
}

/** Builds the site unless sources and database are those of the last build. @param {NodeJS.ProcessEnv} env @param {string} salt @param {(line: string) => void} say */
export function ensureBuild(env, salt, say) {
  const dist = path.join(root, env["EBBMARK_DIST"] ?? ".next");
  const stamp = path.join(dist, "ebbmark-build");
  const wanted = createHash("sha256").update(salt).update(sourceHash()).digest("hex");
  if (fs.existsSync(stamp) && fs.readFileSync(stamp, "utf8") === wanted) return;
  say("Building the site …");
  const run = spawnSync("npm", ["run", "--silent", "build"], { cwd: root, env, encoding: "utf8", maxBuffer: 1 << 26 });
  if (run.status !== 0) throw new Error(`The build failed:\n${run.stdout}${run.stderr}`);
  fs.writeFileSync(stamp, wanted);
}

function sourceHash() {
  const hash = createHash("sha256");
  const walk = (/** @type {string} */ entry) => {
    const full = path.join(root, entry);
    if (!fs.existsSync(full)) return;
    if (fs.statSync(full).isDirectory()) {
      for (const name of fs.readdirSync(full).sort()) walk(path.join(entry, name));
    } else hash.update(entry).update(fs.readFileSync(full));
  };
  for (const entry of ["app", "components", "lib", "db/schema", "db/client.ts", "messages", "public", "package-lock.json", "next.config.mjs", "tailwind.config.ts", "postcss.config.mjs", "tsconfig.json"]) {
    if (entry === "messages") for (const f of fs.readdirSync(path.join(root, entry)).filter((n) => n.endsWith(".json")).sort()) walk(path.join(entry, f));
    else walk(entry);
  }
  return hash.digest("hex");
}

/** Waits until an address answers. @param {string} url @param {number} withinMs @param {() => string | null} gaveUp */
export async function waitFor(url, withinMs, gaveUp = () => null) {
  const until = Date.now() + withinMs;
  for (;;) {
    const ok = await fetch(url, { redirect: "manual" }).then((r) => r.status < 500, () => false);
    if (ok) return;
    const reason = gaveUp();
    if (reason || Date.now() > until) throw new Error(reason ?? `${url} did not answer within ${withinMs / 1000} seconds.`);
    await new Promise((resolve) => setTimeout(resolve, 150));
  }
}
