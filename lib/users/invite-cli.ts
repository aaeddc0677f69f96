/** npm run user:invite -- name@example.org "Name" administrator: the first person of a new installation. */
import { eq } from "drizzle-orm";
import { closeDb, db } from "@/db/client";
import { users } from "@/db/schema";
import { audit } from "@/lib/audit/audit";
import { systemCtx } from "@/lib/context";
import { env } from "@/lib/env";
import { enqueueMail } from "@/lib/jobs/enqueue";
import { InviteUserInput } from "./schema";

const [email, name, role] = process.argv.slice(2);
const parsed = InviteUserInput.safeParse({ email, name, role, locale: "en" });
if (!parsed.success) {
  for (const { path, message } of parsed.error.issues) console.log(`${path.join(".")}: ${message}`);
  console.log('Use: npm run user:invite -- name@example.org "Name" administrator');
  process.exit(2);
}
const invited = parsed.data;
const ctx = systemCtx("command line");
await db.transaction(async (tx) => {
  const [known] = await tx.select({ id: users.id }).from(users).where(eq(users.email, invited.email));
  if (known) {
    console.log("This address works here already.");
    return;
  }
  const [row] = await tx.insert(users).values(invited).returning({ id: users.id });
  await enqueueMail(tx, { kind: "invitation", recipient: invited.email, locale: invited.locale, payload: { link: `${env().EBBMARK_URL}/sign-in`, inviter: env().AUTHORITY_NAME, role: invited.role } });
  await audit(tx, ctx, { action: "user.invite", subject: `user/${row?.id}`, facts: { role: invited.role } });
  console.log("Invited. The worker sends the mail.");
});
await closeDb();
