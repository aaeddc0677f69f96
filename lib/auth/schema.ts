import { z } from "zod";
import { LOCALE_CODES } from "@/lib/i18n/locales";
import { normalizeIdentifier } from "./normalize-identifier";

/** The message is a key of the SignIn namespace: the form speaks seven languages. */
export const emailAddress = z
  .string("emailMissing")
  .max(254, "emailInvalid")
  .transform((raw, context) => {
    const normal = normalizeIdentifier(raw);
    if (normal === null) context.addIssue({ code: "custom", message: "emailInvalid" });
    return normal ?? "";
  });

export const RequestSignInInput = z.object({ email: emailAddress, locale: z.enum(LOCALE_CODES).optional() });
export const ConfirmSignInInput = z.object({ token: z.string().min(20).max(200) });
export const DemonstrationSignInInput = z.object({ userId: z.string().min(1).max(100) });
