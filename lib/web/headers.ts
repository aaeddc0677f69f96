import { createHash } from "node:crypto";

/** Response headers of every page and file. */
export function securityHeaders(https: boolean): Record<string, string> {
  return {
    "X-Content-Type-Options": "nosniff",
    "X-Frame-Options": "DENY",
    // "no-referrer" would make browsers send "Origin: null" with plain forms, which the actions refuse.
    "Referrer-Policy": "same-origin",
    "Permissions-Policy": "camera=(), geolocation=(), microphone=(), payment=(), usb=()",
    "Cross-Origin-Opener-Policy": "same-origin",
    "Cross-Origin-Resource-Policy": "same-origin",
    ...(https ? { "Strict-Transport-Security": "max-age=63072000; includeSubDomains" } : {}),
  };
}

const COMMON = "default-src 'none'; img-src 'self' data:; font-src 'self'; style-src 'self'; form-action 'self'; base-uri 'none'; frame-ancestors 'none'";

/** Public pages run no script at all. */
export const PUBLIC_POLICY = `${COMMON}; script-src 'none'`;

/** Staff pages: our own files, and exactly the inline scripts that this answer holds. */
export function deskPolicy(html: string): string {
  const hashes = inlineScripts(html).map((script) => `'sha256-${createHash("sha256").update(script).digest("base64")}'`);
  return `${COMMON}; connect-src 'self'; manifest-src 'self'; script-src 'self'${[...new Set(hashes)].map((h) => ` ${h}`).join("")}`;
}

function inlineScripts(html: string): string[] {
  const found: string[] = [];
  for (const match of html.matchAll(/<script(?<attributes>[^>]*)>(?<body>[\s\S]*?)<\/script>/g)) {
    if (!/\ssrc=/.test(match.groups?.["attributes"] ?? "")) found.push(match.groups?.["body"] ?? "");
  }
  return found;
}

/** Takes scripts and their preloads out of a finished page: what residents get works without any. */
export function withoutScripts(html: string): string {
  return html
    .replace(/<script\b[^>]*>[\s\S]*?<\/script>/g, "")
    .replace(/<link\b[^>]*\bas="script"[^>]*>/g, "")
    .replace(/<link\b[^>]*\brel="modulepreload"[^>]*>/g, "");
}
