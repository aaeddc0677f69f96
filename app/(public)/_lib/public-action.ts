import type { SubmissionResult } from "@conform-to/react";
import { parseWithZod } from "@conform-to/zod/v4";
import { headers } from "next/headers";
import type { z } from "zod";
import type { Ctx } from "@/lib/context";
import { env } from "@/lib/env";
import { DomainError } from "@/lib/errors";
import { takePoint } from "@/lib/rate-limits";
import { HOUR_MS } from "@/lib/subscribers/constants";
import { networkOf } from "@/lib/subscribers/network";
import { counterKey } from "@/lib/subscribers/token";

export type PublicState = SubmissionResult<string[]> | undefined;
type Visitor = Ctx<{ kind: "visitor" }>;

/** Context of a command that a visitor runs. */
export async function visitorCtx(): Promise<Visitor> {
  return { actor: { kind: "visitor" }, now: new Date(), requestId: (await headers()).get("x-request-id") ?? crypto.randomUUID() };
}

/**
 * Makes a server action for visitors: same origin, limit per network, parse, run. Errors stay keys of the namespace
 * Subscribe; the form says them in the page's language. `run` ends with `redirect(…)`.
 */
export function publicAction<S extends z.ZodType>(
  schema: S,
  { name, perHour }: { name: string; perHour: number },
  run: (ctx: Visitor, input: z.output<S>) => Promise<void>,
): (previous: PublicState, formData: FormData) => Promise<PublicState> {
  return async (_previous, formData) => {
    const submission = parseWithZod(formData, { schema });
    try {
      const head = await headers();
      if (head.get("origin") !== new URL(env().EBBMARK_URL).origin) throw new DomainError("forbidden");
      if (submission.status !== "success") return submission.reply();
      const ctx = await visitorCtx();
      const key = counterKey(name, networkOf(head.get("x-forwarded-for")));
      if (!(await takePoint(key, { limit: perHour, windowMs: HOUR_MS, now: ctx.now }))) throw new DomainError("tooMany");
      await run(ctx, submission.value as z.output<S>);
      return submission.reply();
    } catch (error) {
      if (!(error instanceof DomainError)) throw error; // redirects and bugs pass through
      return submission.reply({ formErrors: [error.code] });
    }
  };
}
