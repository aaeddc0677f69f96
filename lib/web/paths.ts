import { LOCALE_CODES } from "../i18n/locales";

const PUBLIC = new RegExp(`^/(?:$|u/|(?:${LOCALE_CODES.join("|")})(?:/|$))`);
const FORM_PAGE = /^\/(?:u\/|[a-z]{2}\/(?:subscribe|confirm|subscription)(?:\/|$))/;

/** Pages that residents read: no script, no session. */
export const isPublicPath = (path: string): boolean => PUBLIC.test(path);

/** `Cache-Control` of an HTML answer. */
export function cacheControl(path: string): string {
  return isPublicPath(path) && !FORM_PAGE.test(path) ? "public, max-age=60, must-revalidate" : "no-store";
}

/** One-click unsubscribe comes from mail programs and names no origin. */
export const needsOrigin = (path: string): boolean => !path.startsWith("/u/") && path !== "/api/internal/revalidate";
