/** Limits of what the desk computes while a person waits; the command line goes up to the engine's own. */
export const PACKAGES_MAX = 8;
export const DRAWS_MIN = 100;
export const DRAWS_MAX = 100_000;
export const DRAWS_DEFAULT = 2_000;
export const SEED_MAX = 9_007_199_254_740_991;
export const HORIZON_DAYS_MIN = 30;
export const HORIZON_DAYS_MAX = 3_650;
export const HORIZON_DAYS_DEFAULT = 365;
export const TITLE_MAX = 120;
export const REASON_MIN = 10;
export const REASON_MAX = 1_000;
/** Last day a schedule may name, counted from day 0. */
export const SCHEDULE_DAYS_MAX = 3_650;
/** How far a whole package may be moved at once. */
export const SHIFT_DAYS_MAX = 365;

export const PACKAGE_LETTERS = ["A", "B", "C", "D", "E", "F", "G", "H"] as const;

/** Version of the context that is frozen beside the two files. */
export const SNAPSHOT_VERSION = 1;
