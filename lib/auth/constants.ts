export const SESSION_HOURS = 8;
export const SIGN_IN_MINUTES = 10;
/** Links asked for per address and per network within a quarter of an hour. */
export const LINKS_PER_ADDRESS = 5;
export const LINKS_PER_NETWORK = 30;
export const LINKS_WINDOW_MS = 15 * 60_000;

/** `__Host-` keeps other hosts from planting the cookie; browsers take that prefix over https only. */
export const sessionCookieName = (https: boolean): string => (https ? "__Host-ebbmark.session" : "ebbmark.session");
/** Ties a sign-in link to the browser that asked for it. */
export const askedCookieName = (https: boolean): string => (https ? "__Host-ebbmark.asked" : "ebbmark.asked");
