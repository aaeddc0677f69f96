import { asc, count, desc, eq, inArray, isNull, sql } from "drizzle-orm";
import { db } from "@/db/client";
import { assessments, briefings, briefingTexts, frozenAssessments, outbreaks, packages, users } from "@/db/schema";
import { can } from "@/lib/auth/permissions";
import type { StaffCtx } from "@/lib/context";

export type Task =
  | { kind: "profile" | "package" | "assess"; name: string; href: string }
  | { kind: "freeze" | "brief" | "write" | "returned" | "review" | "publish" | "correct"; number: number; href: string }
  | { kind: "invited"; count: number; href: string };

/** What this person's role can do next, oldest first. */
export async function listTasks({ actor }: StaffCtx): Promise<Task[]> {
  const may = (permission: Parameters<typeof can>[1]) => can(actor.role, permission);
  const tasks: Task[] = [];
  if (may("outbreak:write")) {
    const rows = await db
      .select({
        id: outbreaks.id, name: outbreaks.name, hasProfile: sql<boolean>`${outbreaks.profile} is not null`,
        packages: sql<number>`(select count(*)::int from ${packages} p where p.outbreak_id = "outbreaks"."id")`,
        assessments: sql<number>`(select count(*)::int from ${assessments} a where a.outbreak_id = "outbreaks"."id")`,
      })
      .from(outbreaks)
      .orderBy(asc(outbreaks.createdAt));
    for (const { id, name, hasProfile, packages: own, assessments: made } of rows) {
      if (!hasProfile) tasks.push({ kind: "profile", name, href: `/desk/outbreaks/${id}` });
      else if (own === 0) tasks.push({ kind: "package", name, href: `/desk/outbreaks/${id}/packages` });
      else if (made === 0) tasks.push({ kind: "assess", name, href: `/desk/assessments/new?outbreak=${id}` });
    }
  }
  if (may("assessment:freeze")) {
    const rows = await db
      .select({ id: assessments.id, number: assessments.number })
      .from(assessments)
      .leftJoin(frozenAssessments, eq(frozenAssessments.assessmentId, assessments.id))
      .where(isNull(frozenAssessments.assessmentId))
      .orderBy(asc(assessments.number));
    tasks.push(...rows.map(({ id, number }): Task => ({ kind: "freeze", number, href: `/desk/assessments/${id}` })));
  }
  if (may("briefing:write")) {
    const rows = await db
      .select({ id: assessments.id, number: assessments.number })
      .from(frozenAssessments)
      .innerJoin(assessments, eq(assessments.id, frozenAssessments.assessmentId))
      .leftJoin(briefings, eq(briefings.assessmentId, frozenAssessments.assessmentId))
      .where(isNull(briefings.id))
      .orderBy(asc(assessments.number));
    tasks.push(...rows.map(({ id, number }): Task => ({ kind: "brief", number, href: `/desk/briefings/new?assessment=${id}` })));
  }
  const steps = {
    draft: may("briefing:write") ? ("write" as const) : null,
    changesAsked: may("briefing:write") ? ("returned" as const) : null,
    underCorrection: may("briefing:write") ? ("correct" as const) : null,
    legalReview: may("briefing:review") ? ("review" as const) : null,
    approved: may("briefing:publish") ? ("publish" as const) : null,
  };
  const states = (Object.keys(steps) as (keyof typeof steps)[]).filter((state) => steps[state] !== null);
  if (states.length > 0) {
    const rows = await db.select({ id: briefings.id, number: briefings.number, state: briefings.state }).from(briefings).where(inArray(briefings.state, states)).orderBy(asc(briefings.updatedAt));
    for (const { id, number, state } of rows) {
      const kind = steps[state as keyof typeof steps];
      const rest = kind === "review" ? "/review" : kind === "publish" ? "/publication" : "";
      if (kind) tasks.push({ kind, number, href: `/desk/briefings/${id}${rest}` });
    }
  }
  if (may("user:manage")) {
    const [invited] = await db.select({ n: count() }).from(users).where(eq(users.status, "invited"));
    if (invited && invited.n > 0) tasks.push({ kind: "invited", count: invited.n, href: "/desk/settings" });
  }
  return tasks;
}

/** The newest briefings, for the home page. */
export const listNewest = () =>
  db
    .select({ id: briefings.id, number: briefings.number, state: briefings.state, title: briefingTexts.title, assessmentNumber: assessments.number })
    .from(briefings)
    .innerJoin(assessments, eq(assessments.id, briefings.assessmentId))
    .innerJoin(briefingTexts, sql`${briefingTexts.briefingId} = ${briefings.id} and ${briefingTexts.locale} = ${briefings.sourceLocale}`)
    .orderBy(desc(briefings.number))
    .limit(8);
