import { createHash } from "node:crypto";
import { readFileSync } from "node:fs";
import path from "node:path";
import { expect, test } from "vitest";
import { LOCALE_CODES } from "@/lib/i18n/locales";
import { CONSENT_TEXT_VERSION } from "@/lib/subscribers/constants";

const messages = path.resolve(import.meta.dirname, "../../../messages");

// The consent record names the version of the words that were shown: other words need another version, and a new hash.
test("the words beside the sign-up form are those of their version", () => {
  const shown = LOCALE_CODES.map((locale) => {
    const { lead, button, consent } = JSON.parse(readFileSync(path.join(messages, `${locale}.json`), "utf8")).Subscribe;
    return [locale, lead, button, consent].join("\n");
  }).join("\n\n");
  const hash = createHash("sha256").update(shown).digest("hex").slice(0, 16);
  expect({ version: CONSENT_TEXT_VERSION, hash }).toEqual({ version: "2027-1", hash: "80d4468e529edb63" });
});
