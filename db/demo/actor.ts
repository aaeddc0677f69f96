import type { StaffCtx } from "../../lib/context";
import { PEOPLE, type PersonKey } from "./people";

/** Context in which an invented person runs a real command. */
export function as(person: PersonKey, now = new Date()): StaffCtx {
  const { id, name, email, role } = PEOPLE[person];
  return { actor: { kind: "staff", id, name, email, role, locale: "en" }, now, requestId: crypto.randomUUID() };
}
