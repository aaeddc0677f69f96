import { z } from "zod";
import { normalizeIdentifier } from "@/lib/auth/normalize-identifier";
import { ROLES } from "@/lib/auth/permissions";
import { LOCALE_CODES } from "@/lib/i18n/locales";

const role = z.enum(ROLES, `Role must be one of ${ROLES.join(", ")}.`);

export const InviteUserInput = z.object({
  name: z.string("Name is missing. Give 1 to 100 characters.").trim().min(1, "Name is missing. Give 1 to 100 characters.").max(100, "Name must have at most 100 characters."),
  email: z.string("E-mail is missing.").transform((raw, context) => {
    const normal = normalizeIdentifier(raw);
    if (normal === null) context.addIssue({ code: "custom", message: "E-mail must have the form name@example.org, with plain letters before the @ and at most 254 characters." });
    return normal ?? "";
  }),
  role,
  locale: z.enum(LOCALE_CODES, `Language must be one of ${LOCALE_CODES.join(", ")}.`),
});
export const ChangeRoleInput = z.object({ userId: z.string().min(1), role });
export const DeactivateUserInput = z.object({ userId: z.string().min(1), confirmed: z.literal("yes", "Tick the box to confirm: this ends the person's sessions at once.") });
export const EndSessionsInput = z.object({ scope: z.literal("others") });
