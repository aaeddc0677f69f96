import { spawnSync } from "node:child_process";
import fs from "node:fs";
import path from "node:path";

/** Every process of ours starts in the project's root (db/start.mjs). */
const at = (...parts: string[]) => path.join(/* turbopackIgnore: true */ process.cwd(), ...parts);

function newest(folder: string): number {
  return Math.max(...fs.readdirSync(folder).map((name) => fs.statSync(path.join(folder, name)).mtimeMs));
}

/**
 * Path of the bundled worker; bundles it where it is missing or older than its sources.
 * @throws Error with the bundler's own words where that fails
 */
export function workerFile(): string {
  const file = at(".build", "assess-worker.mjs");
  const built = fs.existsSync(file) ? fs.statSync(file).mtimeMs : 0;
  if (built > Math.max(newest(at("lib", "engine")), newest(at("lib", "compute")))) return file;
  const run = spawnSync(process.execPath, [at("lib", "compute", "build.mjs")], { cwd: at(), encoding: "utf8" });
  if (run.status !== 0) throw new Error(`The worker for calculations could not be built:\n${run.stdout}${run.stderr}`);
  return file;
}
