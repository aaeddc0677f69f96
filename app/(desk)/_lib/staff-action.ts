import type { SubmissionResult } from "@conform-to/react";
import { parseWithZod } from "@conform-to/zod/v4";
import { headers } from "next/headers";
import { redirect } from "next/navigation";
import { getTranslations } from "next-intl/server";
import type { z } from "zod";
import type { Permission } from "@/lib/auth/permissions";
import { requirePermission } from "@/lib/auth/require-permission";
import type { StaffCtx } from "@/lib/context";
import { env } from "@/lib/env";
import { DomainError } from "@/lib/errors";
import { findStaff, staffCtx } from "./session";

export type ActionState = SubmissionResult<string[]> | undefined;

/** A browser always names its origin on a POST; anything else is refused. */
export async function requireSameOrigin(): Promise<void> {
  const origin = (await headers()).get("origin");
  if (origin !== new URL(env().EBBMARK_URL).origin) throw new DomainError("forbidden", { origin });
}

/**
 * Makes a server action: same origin, session, permission, parse, run, and refusals mapped to the form in one place.
 * `run` ends with `redirect(…)`, or returns nothing to show the form as saved. The command asks for its permission
 * again; here it comes before the input, so that nobody learns from a refused form what a form would accept.
 */
export function staffAction<S extends z.ZodType>(
  permission: Permission,
  schema: S,
  run: (ctx: StaffCtx, input: z.output<S>) => Promise<void>,
): (previous: ActionState, formData: FormData) => Promise<ActionState> {
  return async (_previous, formData) => {
    const submission = parseWithZod(formData, { schema });
    const t = await getTranslations("Errors");
    try {
      await requireSameOrigin();
      const actor = await findStaff();
      if (!actor) redirect("/sign-in");
      requirePermission(actor, permission);
      if (submission.status !== "success") return submission.reply();
      await run(await staffCtx(actor), submission.value as z.output<S>);
      return submission.reply();
    } catch (error) {
      if (!(error instanceof DomainError)) throw error; // redirects and bugs pass through
      const reasons = error.detail.reasons ?? [];
      const briefing = await getTranslations("BriefingReasons");
      const has = (key: string) => t.has(`reasons.${key}` as never);
      return submission.reply({
        formErrors: [
          t(`codes.${error.code}`),
          ...reasons.map((reason) => (has(reason) ? t(`reasons.${reason}` as never, error.detail as never) : briefing.has(reason as never) ? briefing(reason as never) : reason)),
        ],
      });
    }
  };
}
