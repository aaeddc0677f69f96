import { and, eq, sql } from "drizzle-orm";
import postgres from "postgres";
import { afterAll, describe, expect, test } from "vitest";
import { closeDb, db } from "@/db/client";
import { deliveries, sessions, users, verificationTokens } from "@/db/schema";
import { entryFault, firstFault, GENESIS } from "@/lib/audit/verify";
import { readChain } from "@/lib/audit/queries";
import { confirmSignIn } from "@/lib/auth/confirm-sign-in";
import { LINKS_PER_ADDRESS, SIGN_IN_MINUTES } from "@/lib/auth/constants";
import { findSignIn } from "@/lib/auth/find-sign-in";
import { authOptions } from "@/lib/auth/options";
import { requestSignIn } from "@/lib/auth/request-sign-in";
import type { Ctx } from "@/lib/context";
import { changeRole } from "@/lib/users/change-role";
import { deactivateUser } from "@/lib/users/deactivate-user";
import { inviteUser } from "@/lib/users/invite-user";
import { asStaff } from "../fixtures/assessments";

afterAll(() => closeDb());

const visitor = (now = new Date()): Ctx => ({ actor: { kind: "visitor" }, now, requestId: crypto.randomUUID() });
const browser = () => ({ network: crypto.randomUUID(), key: crypto.randomUUID() });

async function askFor(email: string, from = browser(), now = new Date()): Promise<{ token: string; key: string }> {
  await requestSignIn(visitor(now), { email }, from);
  const [mail] = await db.select({ payload: deliveries.payload }).from(deliveries).where(and(eq(deliveries.recipient, email), eq(deliveries.kind, "signIn"))).orderBy(sql`created_at desc`).limit(1);
  return { token: new URL(mail?.payload["link"] ?? "http://x/?token=").searchParams.get("token") ?? "", key: from.key };
}

describe("a link", () => {
  test("works once, in the browser that asked, and ends that browser's older session", async () => {
    const { actor } = await asStaff("adviser");
    const { token, key } = await askFor(actor.email);
    await expect(confirmSignIn(visitor(), { token }, { key: crypto.randomUUID(), oldSession: undefined })).rejects.toMatchObject({ code: "expired" });
    const first = await confirmSignIn(visitor(), { token }, { key, oldSession: undefined });
    await expect(confirmSignIn(visitor(), { token }, { key, oldSession: undefined })).rejects.toMatchObject({ code: "expired" });
    const again = await askFor(actor.email);
    const second = await confirmSignIn(visitor(), { token: again.token }, { key: again.key, oldSession: first.token });
    const left = await db.select({ token: sessions.sessionToken }).from(sessions).where(eq(sessions.userId, actor.id));
    expect(left).toEqual([{ token: second.token }]);
  });
  test("is dead after ten minutes, and looking at it uses nothing up", async () => {
    const { actor } = await asStaff("legal");
    const asked = new Date();
    const { token, key } = await askFor(actor.email, browser(), asked);
    const at = (minutes: number) => new Date(asked.getTime() + minutes * 60_000);
    for (let i = 0; i < 3; i++) expect(await findSignIn(token, key, at(1))).toBe(actor.email.replace(/^(.).*@/, "$1…@"));
    await expect(confirmSignIn(visitor(at(SIGN_IN_MINUTES + 0.1)), { token }, { key, oldSession: undefined })).rejects.toMatchObject({ code: "expired" });
    await expect(confirmSignIn(visitor(at(SIGN_IN_MINUTES - 0.1)), { token }, { key, oldSession: undefined })).resolves.toBeDefined();
  });
  test("is not stored as it was sent", async () => {
    const { actor } = await asStaff("adviser");
    const { token } = await askFor(actor.email);
    const [row] = await db.select().from(verificationTokens).where(eq(verificationTokens.identifier, actor.email));
    expect(row?.token).not.toContain(token);
  });
  test("a stranger gets the same answer; no user, no token, no mail is written", async () => {
    const email = `stranger-${crypto.randomUUID()}@example.org`;
    await requestSignIn(visitor(), { email }, browser());
    expect(await db.select().from(users).where(eq(users.email, email))).toEqual([]);
    expect(await db.select().from(verificationTokens).where(eq(verificationTokens.identifier, email))).toEqual([]);
    expect(await db.select().from(deliveries).where(eq(deliveries.recipient, email))).toEqual([]);
  });
  test("asking too often is limited per network, and doesn't lock out the person elsewhere", async () => {
    const { actor } = await asStaff("adviser");
    const from = browser();
    for (let i = 0; i < LINKS_PER_ADDRESS; i++) await requestSignIn(visitor(), { email: actor.email }, from);
    await expect(requestSignIn(visitor(), { email: actor.email }, from)).rejects.toMatchObject({ code: "tooMany" });
    await expect(requestSignIn(visitor(), { email: actor.email }, browser())).resolves.toBeUndefined();
  });
});

describe("people", () => {
  test("somebody invited becomes active by signing in; somebody who left is out at once", async () => {
    const administrator = await asStaff("administrator");
    await asStaff("administrator");
    const email = `new-${crypto.randomUUID()}@example.org`;
    const { id } = await inviteUser(administrator, { name: "New Person", email, role: "legal", locale: "fr" });
    const { token, key } = await askFor(email);
    await confirmSignIn(visitor(), { token }, { key, oldSession: undefined });
    expect((await db.select({ status: users.status }).from(users).where(eq(users.id, id)))[0]?.status).toBe("active");
    await deactivateUser(administrator, { userId: id, confirmed: "yes" });
    expect(await db.select().from(sessions).where(eq(sessions.userId, id))).toEqual([]);
    await requestSignIn(visitor(), { email }, browser());
    expect(await db.select().from(verificationTokens).where(eq(verificationTokens.identifier, email))).toEqual([]);
  });
  test("only an administrator invites, and nobody takes away the last administrator", async () => {
    await expect(inviteUser(await asStaff("adviser"), { name: "X", email: "x@example.org", role: "adviser", locale: "en" })).rejects.toMatchObject({ code: "forbidden" });
    await db.execute(sql`update users set role = 'adviser' where role = 'administrator'`);
    const last = await asStaff("administrator");
    await expect(changeRole(last, { userId: last.actor.id, role: "adviser" })).rejects.toMatchObject({ detail: { reasons: ["lastAdministrator"] } });
    await expect(deactivateUser(last, { userId: last.actor.id, confirmed: "yes" })).rejects.toMatchObject({ detail: { reasons: ["lastAdministrator"] } });
  });
  test("the adapter reads sessions with the person's role, and never makes a user", async () => {
    const { actor } = await asStaff("communications");
    const token = crypto.randomUUID();
    await db.insert(sessions).values({ sessionToken: token, userId: actor.id, expires: new Date(Date.now() + 60_000) });
    const { adapter } = authOptions();
    expect((await adapter?.getSessionAndUser?.(token))?.user).toMatchObject({ id: actor.id, role: "communications" });
    expect(() => adapter?.createUser?.({ email: "x@example.org", emailVerified: null } as never)).toThrow(/invited/);
  });
});

describe("the register", () => {
  test("is one unbroken chain from its beginning", async () => {
    await askFor((await asStaff("adviser")).actor.email);
    const chain = await readChain(1, Number.MAX_SAFE_INTEGER);
    expect(chain.length).toBeGreaterThan(0);
    expect(firstFault(chain, GENESIS)).toBeNull();
    const [last] = chain.slice(-1);
    if (!last) throw new Error("the register is empty");
    expect(entryFault({ ...last, actor: "somebody else" }, null)).toBe("has another actor than its content");
    expect(entryFault({ ...last, canonical: last.canonical.replace(/"at":"\d/, '"at":"9') }, null)).toBe("has another content than its fingerprint");
    expect(firstFault(chain.filter((_, index) => index !== 1), GENESIS)).toEqual({ seq: 2, fault: "is missing" });
  });
  test.each(["DATABASE_URL", "DATABASE_OWNER_URL", "DATABASE_SUPER_URL"])("refuses change, removal and truncation by %s", async (name) => {
    const client = postgres(process.env[name] ?? "", { max: 1, onnotice: () => {} });
    for (const text of ["update audit.entry set actor = 'x'", "delete from audit.entry", "truncate audit.entry"]) await expect(client.unsafe(text)).rejects.toThrow(/append-only|permission denied/);
    await client.end();
  });
});
