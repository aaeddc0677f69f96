/** npm run register:verify: exit 0 whole, 1 broken (prints the first bad entry), 2 could not run. */
import { createHash } from "node:crypto";
import postgres from "postgres";
import { type ChainEntry, entryFault, GENESIS } from "./verify";

const url = process.env["DATABASE_VERIFIER_URL"] ?? process.env["DATABASE_URL"];
if (!url) {
  console.log("DATABASE_VERIFIER_URL: missing. Give the address of the database with the name and password of ebbmark_verifier.");
  process.exit(2);
}
const sql = postgres(url, { max: 1, connect_timeout: 5, onnotice: () => {} });

function broken(seq: number | string, fault: string): never {
  console.log(`Entry ${seq} ${fault}.`);
  process.exit(1);
}

try {
  let previous: Uint8Array = GENESIS;
  let expected = 1;
  for await (const rows of sql<ChainEntry[]>`select seq::int as seq, at, actor, action, subject, canonical, prev_hash as "prevHash", hash from audit.entry order by seq`.cursor(500)) {
    for (const entry of rows) {
      if (entry.seq !== expected) broken(expected, "is missing");
      const fault = entryFault(entry, previous);
      if (fault) broken(entry.seq, fault);
      previous = entry.hash;
      expected++;
    }
  }
  const [head] = await sql`select seq::int as seq, hash from audit.head`;
  if (head?.["seq"] !== expected - 1 || !Buffer.from(head["hash"]).equals(Buffer.from(previous))) broken(expected, "is missing, or the head was changed");
  const sha = (text: string) => createHash("sha256").update(text, "utf8").digest("hex");
  let frozen = 0;
  for await (const rows of sql`select assessment_id, input, input_hash, result, result_hash, context, context_hash from frozen_assessments`.cursor(20)) {
    for (const row of rows) {
      frozen++;
      for (const part of ["input", "result", "context"]) if (sha(row[part]) !== row[`${part}_hash`]) broken(`assessment ${row["assessment_id"]}`, `has another ${part} than its fingerprint`);
    }
  }
  console.log(`The register is whole: ${expected - 1} entries, ${frozen} frozen assessments with the content that was frozen.`);
  await sql.end();
} catch (error) {
  console.log(`Could not run: ${error instanceof Error ? error.message : error}`);
  process.exit(2);
}
