const DAY_MS = 86_400_000;
const utc = (iso: string) => Date.parse(`${iso}T00:00:00Z`);

/** Whole days from day 0 to a calendar date; negative before it. ISO dates. */
export const dayOf = (dayZero: string, date: string): number => Math.round((utc(date) - utc(dayZero)) / DAY_MS);

/** Calendar date of a day, ISO; a fraction of a day belongs to the day that it falls in. */
export const dateOf = (dayZero: string, day: number): string => new Date(utc(dayZero) + Math.floor(day) * DAY_MS).toISOString().slice(0, 10);
