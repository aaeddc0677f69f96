import { describe, expect, test } from "vitest";
import { formatDay, formatTime, monthName } from "@/lib/i18n/dates";
import { LOCALE_CODES } from "@/lib/i18n/locales";
import { negotiateLocale } from "@/lib/i18n/negotiate";

const plain = (text: string) => text.replaceAll("\u00a0", " ");

describe("days in words", () => {
  test.each([
    ["en", "1 March 2027", "1 March"],
    ["es", "1 de marzo de 2027", "1 de marzo"],
    ["fr", "1er mars 2027", "1er mars"],
    ["uk", "1 березня 2027 року", "1 березня"],
    ["vi", "ngày 1 tháng 3 năm 2027", "ngày 1 tháng 3"],
    ["hi", "1 मार्च 2027", "1 मार्च"],
    ["ar", "1 مارس (آذار) 2027", "1 مارس (آذار)"],
  ] as const)("%s: with and without the year", (locale, long, short) => {
    expect(plain(formatDay("2027-03-01", locale))).toBe(long);
    expect(plain(formatDay("2027-03-01", locale, { year: false }))).toBe(short);
  });

  test("Arabic has both names of every month", () => {
    const names = Array.from({ length: 12 }, (_, month) => formatDay(`2027-${String(month + 1).padStart(2, "0")}-15`, "ar"));
    for (const name of names) expect(plain(name)).toMatch(/^15 \p{L}+ \(\p{L}+(?: \p{L}+)?\) 2027$/u);
    expect(new Set(names).size).toBe(12);
  });

  test.each(LOCALE_CODES)("%s: digits are Latin, the month is in letters, day and month stay together", (locale) => {
    for (const iso of ["2027-01-31", "2027-06-07", "2027-12-05"]) {
      const text = formatDay(iso, locale);
      expect(text).not.toMatch(/[\u0660-\u0669\u0966-\u096f]/);
      expect(text).toMatch(/\p{L}/u);
      expect(text).toMatch(/\d\u00a0\p{L}/u);
    }
    expect(monthName("2027-06-01", locale)).toMatch(/\p{L}/u);
  });

  test("a moment counts by its day and hour in UTC", () => {
    expect(plain(formatDay("2027-03-02T23:59:59Z", "en"))).toBe("2 March 2027");
    expect(plain(formatTime("2027-03-02T16:00:00.000Z"))).toBe("16:00 UTC");
  });
});

describe("the reader's language", () => {
  test.each([
    ["ar-EG,ar;q=0.9,en;q=0.8", "ar"],
    ["de-DE,de;q=0.9,fr;q=0.5,en;q=0.4", "fr"],
    ["en;q=0.1, uk;q=0.7", "uk"],
    ["hi;q=0, vi", "vi"],
    ["de", "en"],
    ["", "en"],
    [";;;,q=1", "en"],
    [null, "en"],
    ["constructor, __proto__", "en"],
  ])("%s → %s", (header, locale) => expect(negotiateLocale(header)).toBe(locale));
});
