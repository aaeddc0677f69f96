import { z } from "zod";

const url = (protocols: string[]) =>
  z.string().refine((value) => {
    try {
      return protocols.includes(new URL(value).protocol);
    } catch {
      return false;
    }
  }, `must be an address that begins with ${protocols.join(" or ")}`);

const Env = z.object({
  /** Connection of the web process (role ebbmark_web). */
  DATABASE_URL: url(["postgres:", "postgresql:"]),
  /** Connection that may only read publications (role ebbmark_portal). Default: DATABASE_URL. */
  DATABASE_PORTAL_URL: url(["postgres:", "postgresql:"]).optional(),
  /** Connection of the worker (role ebbmark_worker). Default: DATABASE_URL. */
  DATABASE_WORKER_URL: url(["postgres:", "postgresql:"]).optional(),
  /** Owner of the schema; only migrations and the demonstration seed use it. */
  DATABASE_OWNER_URL: url(["postgres:", "postgresql:"]).optional(),
  /** Public address, without a slash at the end. Links in mail are made from it. */
  EBBMARK_URL: url(["http:", "https:"]).transform((value) => value.replace(/\/+$/, "")),
  /** Signs manage and unsubscribe links and hashes tokens; 32 characters or more. */
  EBBMARK_SECRET: z.string().min(32, "must have 32 characters or more"),
  SMTP_URL: url(["smtp:", "smtps:"]),
  MAIL_FROM: z.string().min(3).default("Kelmaren District Health Office <updates@news.example.org>"),
  /** Domain of List-Id and Message-ID. */
  MAIL_DOMAIN: z.string().min(3).default("news.example.org"),
  AUTHORITY_NAME: z.string().min(1).default("Kelmaren District Health Office"),
  AUTHORITY_CONTACT: z.string().min(3).default("ask@example.org"),
  /** Connections to the mail server at once; twice as many mails can be in doubt after a crash. */
  MAIL_CONNECTIONS: z.coerce.number().int().min(1).max(50).default(5),
  /** A mail that was claimed and not finished within this is taken back; more than all time limits of one attempt. */
  MAIL_LEASE_SECONDS: z.coerce.number().int().min(1).max(3600).default(300),
  /** DKIM selector, domain and PEM file; mail goes out unsigned without them. */
  DKIM_SELECTOR: z.string().optional(),
  DKIM_DOMAIN: z.string().optional(),
  DKIM_KEY_FILE: z.string().optional(),
  /** "1" shows one-click sign-in on loopback and says on every screen that place and illness are invented. */
  EBBMARK_DEMO: z.enum(["0", "1"]).default("0"),
  /** Where the local mail sink shows what it got; only for the demonstration. */
  MAIL_SINK_URL: url(["http:"]).optional(),
  MAIL_HOLD_MINUTES: z.coerce.number().int().min(0).max(1440).default(10),
});

export type Env = z.infer<typeof Env> & { demo: boolean };

let parsed: Env | undefined;

/** The environment, checked once. Throws one sentence per fault, naming the variable. */
export function env(): Env {
  if (parsed) return parsed;
  const result = Env.safeParse(Object.fromEntries(Object.entries(process.env).filter(([, value]) => value !== "")));
  if (!result.success) {
    const faults = result.error.issues.map((issue) => `${issue.path.join(".")}: ${issue.message}`);
    throw new Error(`The environment is not usable:\n  ${faults.join("\n  ")}\nSee .env.example.`);
  }
  parsed = { ...result.data, demo: result.data.EBBMARK_DEMO === "1" };
  return parsed;
}
