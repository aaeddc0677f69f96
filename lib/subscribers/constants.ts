/** Raised whenever the words beside the sign-up form change; the consent record names it. A test pins the words to it. */
export const CONSENT_TEXT_VERSION = "2027-1";
export const CONFIRM_WITHIN_HOURS = 48;
/** After leaving, the address stays this long so that it can be undone; then it is erased. */
export const UNDO_WITHIN_MINUTES = 60;
/** A request that nobody confirmed is erased after this. */
export const FORGET_UNCONFIRMED_DAYS = 7;

/** Sign-ups of one network, and confirmation mails to one address, in an hour. */
export const REQUESTS_PER_NETWORK = 30;
export const MAILS_PER_ADDRESS = 3;
/** Tries with links (confirm, change, leave) of one network in an hour. */
export const TRIES_PER_NETWORK = 120;
export const HOUR_MS = 3_600_000;
