// Bundles the worker thread into .build/assess-worker.mjs, so that the same file runs behind the built site, the
// development server, tsx and the tests. `npm run build:compute`, or the pool where the file is older than its sources.
import fs from "node:fs";
import path from "node:path";
import { fileURLToPath } from "node:url";
import { build } from "esbuild";

const root = fileURLToPath(new URL("../..", import.meta.url));
const out = path.join(root, ".build", "assess-worker.mjs");
const own = `${out}.${process.pid}`;

await build({
  entryPoints: [path.join(root, "lib/compute/worker.ts")],
  outfile: own,
  bundle: true,
  platform: "node",
  format: "esm",
  target: "node20",
  logLevel: "error",
  // CommonJS packages inside an ES module ask for node's own modules by require.
  banner: { js: 'import { createRequire } from "node:module"; const require = createRequire(import.meta.url);' },
});
// Two processes may build at once: each writes its own file and the last whole one stays.
fs.renameSync(own, out);
