import type { Actor, AnyActor } from "@/lib/context";
import { DomainError } from "@/lib/errors";
import { can, type Permission } from "./permissions";

/** First beat of every command. */
export function requirePermission(actor: AnyActor, permission: Permission): asserts actor is Actor {
  if (actor.kind !== "staff") throw new DomainError("signedOut");
  if (!can(actor.role, permission)) throw new DomainError("forbidden", { permission });
}
