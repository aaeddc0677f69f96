import { domainToASCII } from "node:url";

/**
 * One spelling per address: NFKC, lower case, exactly one @, a plain ASCII local part, an IDNA domain with a dot.
 * @returns null where it is no such address; quoted local parts and look-alike @ signs are among those
 */
export function normalizeIdentifier(raw: string): string | null {
  const text = raw.normalize("NFKC").trim().toLowerCase();
  const parts = text.split("@");
  if (parts.length !== 2 || text.length > 254) return null;
  const [local, domain] = parts as [string, string];
  if (!/^[a-z0-9!#$%&'*+/=?^_`{|}~-]+(?:\.[a-z0-9!#$%&'*+/=?^_`{|}~-]+)*$/.test(local) || local.length > 64) return null;
  const ascii = domainToASCII(domain);
  if (!/^(?:[a-z0-9](?:[a-z0-9-]{0,61}[a-z0-9])?\.)+[a-z0-9](?:[a-z0-9-]{0,61}[a-z0-9])?$/.test(ascii)) return null;
  return `${local}@${ascii}`;
}

/** "m…@example.org": enough to recognise one's own address, too little to learn somebody else's. */
export const maskAddress = (email: string): string => email.replace(/^(.).*@/, "$1…@");
