import { DrizzleAdapter } from "@auth/drizzle-adapter";
import type { NextAuthOptions } from "next-auth";
import type { Adapter } from "next-auth/adapters";
import { db } from "@/db/client";
import { accounts, sessions, users, verificationTokens } from "@/db/schema";
import { env } from "@/lib/env";
import type { Locale } from "@/lib/i18n/locales";
import { SESSION_HOURS, SIGN_IN_MINUTES, sessionCookieName } from "./constants";
import { normalizeIdentifier } from "./normalize-identifier";
import type { Role } from "./permissions";

declare module "next-auth" {
  interface Session {
    staff?: { id: string; name: string; email: string; role: Role; locale: Locale };
  }
}

/** The library's row types are older than the adapter's; both speak of the same four tables (contract test). */
function adapter(): Adapter {
  const made = DrizzleAdapter(db, { usersTable: users, accountsTable: accounts, sessionsTable: sessions, verificationTokensTable: verificationTokens }) as unknown as Adapter;
  return {
    ...made,
    createUser: () => {
      throw new Error("staff are invited by an administrator; signing in never makes a user");
    },
  };
}

let held: NextAuthOptions | undefined;

/**
 * Sessions live in the database and are read, renewed and ended through the library. Links are asked for and used
 * through our own pages (request-sign-in.ts, confirm-sign-in.ts), because the library's callback acts on GET.
 */
export function authOptions(): NextAuthOptions {
  if (held) return held;
  const settings = env();
  const https = settings.EBBMARK_URL.startsWith("https:");
  held = {
    adapter: adapter(),
    secret: settings.EBBMARK_SECRET,
    session: { strategy: "database", maxAge: SESSION_HOURS * 3600, updateAge: 1800 },
    useSecureCookies: https,
    cookies: { sessionToken: { name: sessionCookieName(https), options: { httpOnly: true, sameSite: "lax", path: "/", secure: https } } },
    pages: { signIn: "/sign-in", signOut: "/sign-in", error: "/sign-in", verifyRequest: "/sign-in/sent" },
    providers: [
      {
        id: "email",
        type: "email",
        name: "Email",
        server: "",
        from: settings.MAIL_FROM,
        maxAge: SIGN_IN_MINUTES * 60,
        options: {},
        normalizeIdentifier: (raw) => {
          const normal = normalizeIdentifier(raw);
          if (normal === null) throw new Error("not an e-mail address");
          return normal;
        },
        sendVerificationRequest: () => {
          throw new Error("links are asked for at /sign-in");
        },
      },
    ],
    callbacks: {
      signIn: () => false,
      redirect: ({ url, baseUrl }) => ownAddress(url, baseUrl),
      session: ({ session, user }) => {
        const row = user as unknown as { id: string; name: string; email: string; role: Role; locale: Locale; status: string };
        if (row.status === "active") session.staff = { id: row.id, name: row.name, email: row.email, role: row.role, locale: row.locale };
        return session;
      },
    },
  };
  return held as NextAuthOptions;
}

/** Only our own staff pages are ever a place to go to. */
export function ownAddress(url: string, baseUrl: string): string {
  try {
    const target = new URL(url, baseUrl);
    return target.origin === new URL(baseUrl).origin && /^\/desk(?:\/|$)/.test(target.pathname) ? target.href : `${baseUrl}/desk`;
  } catch {
    return `${baseUrl}/desk`;
  }
}
