/** npm run --silent assess < input.json > result.json: no database, no server, no network. */
import { readFileSync, writeSync } from "node:fs";
import { assess, canonicalJson, EngineError } from "./index";

const UNUSABLE = 2;

function fail(lines: string[]): never {
  writeSync(2, `${lines.join("\n")}\n`);
  process.exit(UNUSABLE);
}

let raw: unknown;
try {
  raw = JSON.parse(readFileSync(0, "utf8"));
} catch (error) {
  fail([`(file): must be one JSON document; ${error instanceof Error ? error.message : error}`]);
}
try {
  // No line end: the SHA-256 of what is written is the one that is frozen with an assessment.
  const text = canonicalJson(assess(raw as never));
  // A pipe takes a long text in pieces; writeSync says how much it took.
  const bytes = Buffer.from(text, "utf8");
  for (let at = 0; at < bytes.length; ) {
    try {
      at += writeSync(1, bytes, at);
    } catch (error) {
      if ((error as NodeJS.ErrnoException).code !== "EAGAIN") throw error;
    }
  }
} catch (error) {
  if (error instanceof EngineError && error.code === "outsideDomain") fail(error.faults.map(({ path, message }) => `${path}: ${message}`));
  throw error;
}
