import { and, eq, ne } from "drizzle-orm";
import { users } from "@/db/schema";
import type { Tx } from "@/lib/context";
import { DomainError } from "@/lib/errors";

/** Refuses a change that takes away the last active administrator. Locks the others, so that two can't go at once. */
export async function keepAnAdministrator(tx: Tx, leaving: string): Promise<void> {
  const [user] = await tx.select({ role: users.role }).from(users).where(eq(users.id, leaving));
  if (user?.role !== "administrator") return;
  const others = await tx
    .select({ id: users.id })
    .from(users)
    .where(and(eq(users.role, "administrator"), eq(users.status, "active"), ne(users.id, leaving)))
    .for("update");
  if (others.length === 0) throw new DomainError("notReady", { reasons: ["lastAdministrator"] });
}
