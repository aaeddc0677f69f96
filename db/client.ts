import { drizzle, type PostgresJsDatabase } from "drizzle-orm/postgres-js";
import postgres from "postgres";
import { env } from "../lib/env";
import * as schema from "./schema/index";

type Kind = "app" | "portal";
type Pool = { sql: postgres.Sql; db: PostgresJsDatabase<typeof schema> };
const held = globalThis as { ebbmarkPools?: Partial<Record<Kind, Pool>> };

function open(kind: Kind): Pool {
  const settings = env();
  const worker = process.env["EBBMARK_PROCESS"] === "worker";
  const url =
    kind === "portal"
      ? (settings.DATABASE_PORTAL_URL ?? settings.DATABASE_URL)
      : worker
        ? (settings.DATABASE_WORKER_URL ?? settings.DATABASE_URL)
        : settings.DATABASE_URL;
  const sql = postgres(url, {
    max: kind === "portal" || worker ? 4 : 8,
    idle_timeout: 20,
    connect_timeout: 5,
    connection: {
      application_name: `ebbmark-${worker ? "worker" : kind}`,
      statement_timeout: 15_000,
      idle_in_transaction_session_timeout: 15_000,
      lock_timeout: 5_000,
      TimeZone: "UTC",
    },
    onnotice: () => {},
  });
  return { sql, db: drizzle(sql, { schema }) };
}

// Kept on globalThis so that hot reload doesn't open one pool per save; opened at first use so that a build that
// renders no page needs no database.
function pool(kind: Kind): Pool {
  held.ebbmarkPools ??= {};
  held.ebbmarkPools[kind] ??= open(kind);
  return held.ebbmarkPools[kind];
}

const lazily = (kind: Kind) =>
  new Proxy({} as Pool["db"], {
    // Libraries ask what kind of database this is by its prototype.
    getPrototypeOf: () => Object.getPrototypeOf(pool(kind).db),
    get: (_, property) => {
      const target = pool(kind).db;
      const value = Reflect.get(target, property, target);
      return typeof value === "function" ? value.bind(target) : value;
    },
  });

/** Staff, subscriptions and the worker. */
export const db = lazily("app");
/** May read publications and nothing else (role ebbmark_portal): every public page reads through it. */
export const portalDb = lazily("portal");

/** Ends both pools; for processes that stop by themselves. */
export async function closeDb(): Promise<void> {
  const pools = Object.values(held.ebbmarkPools ?? {});
  held.ebbmarkPools = {};
  await Promise.all(pools.map((each) => each?.sql.end({ timeout: 5 })));
}
