import { customType, integer, text, timestamp, uuid } from "drizzle-orm/pg-core";

export const id = () => uuid("id").primaryKey().defaultRandom();
export const at = (name: string) => timestamp(name, { withTimezone: true, mode: "date" });
export const createdAt = () => at("created_at").notNull().defaultNow();
export const updatedAt = () => at("updated_at").notNull().defaultNow();
/** Optimistic lock: every update says `where version = …` and adds one. */
export const version = () => integer("version").notNull().default(1);
/** SHA-256, hex. */
export const sha256 = (name: string) => text(name);
export const bytea = customType<{ data: Uint8Array }>({ dataType: () => "bytea" });
