import { z } from "zod";
import { LOCALE_CODES } from "../i18n/locales";

/** Longest address that SMTP carries, and longest part before the @. */
export const EMAIL_MAX = 254;
const LOCAL_MAX = 64;

/** Errors are keys of the namespace Subscribe, so that every language says them in its own words. */
const email = z
  .string({ error: "emailMissing" })
  .transform((typed) => tidyAddress(typed))
  .superRefine((address, refinement) => {
    const fault = addressFault(address);
    if (fault) refinement.addIssue({ code: "custom", message: fault });
  });

const locale = z.enum(LOCALE_CODES, { error: "languageMissing" });

export const RequestSubscriptionInput = z.object({ email, locale, page: locale });
export const LinkInput = z.object({ token: z.string({ error: "link" }).max(200, "link"), page: locale });
export const ChangeSubscriptionInput = LinkInput.extend({ locale });

/** Without blanks around it, composed, in small letters; a domain in other scripts in its ASCII form. */
function tidyAddress(typed: string): string {
  const text = typed.trim().normalize("NFC").toLowerCase();
  const at = text.lastIndexOf("@");
  // Only a domain in another script is rewritten; the address parser would silently drop line breaks and tabs.
  if (at < 0 || !/\P{ASCII}/u.test(text.slice(at)) || /[\s\p{Cc}]/u.test(text)) return text;
  try {
    return `${text.slice(0, at)}@${new URL(`http://${text.slice(at + 1)}`).hostname}`;
  } catch {
    return text;
  }
}

type Fault = "emailMissing" | "emailLong" | "emailAt" | "emailBefore" | "emailAfter";

/** What is wrong with an address, or null. */
export function addressFault(address: string): Fault | null {
  if (address === "") return "emailMissing";
  if (address.length > EMAIL_MAX) return "emailLong";
  const [before = "", after = "", ...more] = address.split("@");
  if (after === "" || more.length > 0) return "emailAt";
  const atoms = /^[a-z0-9!#$%&'*+/=?^_`{|}~-]+(?:\.[a-z0-9!#$%&'*+/=?^_`{|}~-]+)*$/;
  if (before.length > LOCAL_MAX || !atoms.test(before)) return "emailBefore";
  const labels = after.split(".");
  const label = /^[a-z0-9](?:[a-z0-9-]{0,61}[a-z0-9])?$/;
  if (labels.length < 2 || !labels.every((each) => label.test(each)) || !/[a-z]/.test(labels.at(-1) ?? "")) return "emailAfter";
  return null;
}
