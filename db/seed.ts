/** The demonstration: invented people, place, illness, law and texts, written by the commands that the desk uses. */
import { sql } from "drizzle-orm";
import { countUsers } from "../lib/users/queries";
import { closeDb, db } from "./client";
import { as } from "./demo/actor";
import { seedAssessments } from "./demo/assessments";
import { seedBriefings } from "./demo/briefings";
import { seedCatalogue } from "./demo/catalogue";
import { seedOutbreak } from "./demo/outbreak";
import { seedPeople } from "./demo/people";

const LOCAL = /@(?:127\.0\.0\.1|localhost|\[::1\])(?::\d+)?\//;

if (!LOCAL.test(process.env["DATABASE_URL"] ?? "")) {
  console.log("DATABASE_URL: the demonstration is put into a database on this machine only (127.0.0.1 or localhost).");
  process.exit(1);
}
try {
  if ((await countUsers()) === 0) {
    await seedPeople();
    const measureIds = await seedCatalogue(as("adviserOne"));
    const { outbreakId } = await seedOutbreak(as("adviserOne"), measureIds);
    const { frozenId } = await seedAssessments(as("adviserOne"), outbreakId);
    await seedBriefings(frozenId);
    const [entries] = await db.execute(sql`select count(*)::int as n from audit.entry`);
    console.log(`Seeded the demonstration: ${entries?.["n"]} entries in the register.`);
  }
} finally {
  await closeDb();
}
