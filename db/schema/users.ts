import { sql } from "drizzle-orm";
import { check, integer, pgTable, primaryKey, text } from "drizzle-orm/pg-core";
import type { Role } from "../../lib/auth/permissions";
import type { Locale } from "../../lib/i18n/locales";
import { at, createdAt } from "./columns";

export const users = pgTable(
  "users",
  {
    id: text("id")
      .primaryKey()
      .$defaultFn(() => crypto.randomUUID()),
    name: text("name").notNull(),
    email: text("email").notNull().unique(),
    emailVerified: at("email_verified"),
    image: text("image"),
    role: text("role").$type<Role>().notNull(),
    /** invited: no sign-in yet; active; left: may not sign in, signatures stay. */
    status: text("status").$type<"invited" | "active" | "left">().notNull().default("invited"),
    locale: text("locale").$type<Locale>().notNull().default("en"),
    invitedBy: text("invited_by"),
    createdAt: createdAt(),
  },
  (t) => [
    check("users_role", sql`${t.role} in ('adviser','communications','legal','administrator')`),
    check("users_status", sql`${t.status} in ('invited','active','left')`),
    check("users_email", sql`${t.email} = lower(${t.email}) and length(${t.email}) <= 254`),
  ],
);

/** Unused by e-mail sign-in; the adapter's contract asks for it. */
export const accounts = pgTable(
  "accounts",
  {
    userId: text("user_id")
      .notNull()
      .references(() => users.id, { onDelete: "cascade" }),
    type: text("type").$type<"oauth" | "oidc" | "email" | "webauthn">().notNull(),
    provider: text("provider").notNull(),
    providerAccountId: text("provider_account_id").notNull(),
    refresh_token: text("refresh_token"),
    access_token: text("access_token"),
    expires_at: integer("expires_at"),
    token_type: text("token_type"),
    scope: text("scope"),
    id_token: text("id_token"),
    session_state: text("session_state"),
  },
  (t) => [primaryKey({ columns: [t.provider, t.providerAccountId] })],
);

export const sessions = pgTable("sessions", {
  sessionToken: text("session_token").primaryKey(),
  userId: text("user_id")
    .notNull()
    .references(() => users.id, { onDelete: "cascade" }),
  expires: at("expires").notNull(),
  createdAt: createdAt(),
});

/** One-time sign-in tokens, stored as SHA-256 with the secret; ten minutes. */
export const verificationTokens = pgTable(
  "verification_tokens",
  {
    identifier: text("identifier").notNull(),
    token: text("token").notNull(),
    expires: at("expires").notNull(),
    createdAt: createdAt(),
  },
  (t) => [primaryKey({ columns: [t.identifier, t.token] })],
);
