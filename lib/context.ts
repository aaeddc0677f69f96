import { db } from "@/db/client";
import type { Locale } from "./i18n/locales";
import type { Role } from "./auth/permissions";

/** A signed-in member of staff. */
export type Actor = { kind: "staff"; id: string; name: string; email: string; role: Role; locale: Locale };
/** Visitors and the system act too, and say so in the register. */
export type AnyActor = Actor | { kind: "visitor" } | { kind: "system"; process: string };

export type Tx = Parameters<Parameters<typeof db.transaction>[0]>[0];
/** Everything a command needs from outside: who acts, when, and in which transaction. */
export type Ctx<A extends AnyActor = AnyActor> = { actor: A; now: Date; requestId: string; tx?: Tx };
export type StaffCtx = Ctx<Actor>;

/** Runs `run` in the caller's transaction, or in one of its own. Never nest a second connection inside. */
export async function inTransaction<T>(ctx: Ctx, run: (tx: Tx) => Promise<T>): Promise<T> {
  return ctx.tx ? run(ctx.tx) : db.transaction(run);
}

export const systemCtx = (process: string): Ctx<{ kind: "system"; process: string }> => ({
  actor: { kind: "system", process },
  now: new Date(),
  requestId: crypto.randomUUID(),
});
