import { createHash } from "node:crypto";
import { readFileSync } from "node:fs";
import { fileURLToPath } from "node:url";
import { drizzle } from "drizzle-orm/postgres-js";
import { migrate } from "drizzle-orm/postgres-js/migrator";
import postgres from "postgres";

const folder = fileURLToPath(new URL("../drizzle", import.meta.url));
/** Any constant that no other program on the server uses. */
const MIGRATION_LOCK = 7_321_560_011;

type Journal = { entries: { tag: string; when: number }[] };

/**
 * Applies what is missing under an advisory lock, then checks that every migration file really is in the database:
 * the migrator compares only the newest timestamp and skips an older one that was merged later.
 */
export async function migrateDatabase(url: string): Promise<void> {
  const sql = postgres(url, { max: 1, onnotice: () => {}, connection: { lock_timeout: 60_000, TimeZone: "UTC" } });
  try {
    await sql`select pg_advisory_lock(${MIGRATION_LOCK})`;
    await migrate(drizzle(sql), { migrationsFolder: folder });
    const journal = JSON.parse(readFileSync(`${folder}/meta/_journal.json`, "utf8")) as Journal;
    const applied = new Set((await sql`select hash from drizzle.__drizzle_migrations`).map((row) => row["hash"]));
    const missing = journal.entries.filter(
      ({ tag }) => !applied.has(createHash("sha256").update(readFileSync(`${folder}/${tag}.sql`)).digest("hex")),
    );
    if (missing.length > 0) throw new Error(`Migrations not applied: ${missing.map(({ tag }) => tag).join(", ")}`);
  } finally {
    await sql.end();
  }
}

if (process.argv[1] && fileURLToPath(import.meta.url) === process.argv[1]) {
  const url = process.env["DATABASE_OWNER_URL"] ?? process.env["DATABASE_URL"];
  if (!url) {
    console.log("DATABASE_OWNER_URL: missing. Give the address of the database with its owner's name and password.");
    process.exit(1);
  }
  await migrateDatabase(url);
  console.log("The database is up to date.");
}
