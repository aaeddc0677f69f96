import type { SubmissionResult } from "@conform-to/react";
import { parseWithZod } from "@conform-to/zod/v4";
import { headers } from "next/headers";
import { getTranslations } from "next-intl/server";
import type { z } from "zod";
import type { Ctx } from "@/lib/context";
import { env } from "@/lib/env";
import { DomainError } from "@/lib/errors";
import { accessLocale } from "./locale";

export type AccessState = SubmissionResult<string[]> | undefined;
type Run<S extends z.ZodType> = (ctx: Ctx, input: z.output<S>) => Promise<void>;

/** Makes an action for people who are not signed in: same origin, parse, run; every refusal in their own language. */
export function accessAction<S extends z.ZodType>(schema: S, run: Run<S>): (previous: AccessState, formData: FormData) => Promise<AccessState> {
  return async (_previous, formData) => {
    const given = await headers();
    const t = await getTranslations({ locale: await accessLocale(), namespace: "SignIn" });
    const submission = parseWithZod(formData, { schema });
    const say = (key: string) => (t.has(key as never) ? t(key as never) : key);
    if (given.get("origin") !== new URL(env().EBBMARK_URL).origin) return submission.reply({ formErrors: [t("forbidden")] });
    if (submission.status !== "success") {
      const reply = submission.reply();
      return { ...reply, error: Object.fromEntries(Object.entries(reply.error ?? {}).map(([field, keys]) => [field, keys?.map(say) ?? null])) };
    }
    try {
      await run({ actor: { kind: "visitor" }, now: new Date(), requestId: given.get("x-request-id") ?? crypto.randomUUID() }, submission.value as z.output<S>);
      return submission.reply();
    } catch (error) {
      if (!(error instanceof DomainError)) throw error; // redirects and bugs pass through
      return submission.reply({ formErrors: [error.code === "tooMany" ? t("tooMany") : t("deadText")] });
    }
  };
}
