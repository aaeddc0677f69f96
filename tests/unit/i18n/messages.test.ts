import { readFileSync } from "node:fs";
import path from "node:path";
import { describe, expect, test } from "vitest";
import { LOCALE_CODES, SOURCE_LOCALE } from "@/lib/i18n/locales";
import { argumentsOf } from "./icu";

/** Namespaces that residents, recipients of mail and people at sign-in meet: complete in every language. */
const EVERYWHERE = ["Article", "Caution", "Figures", "Locale", "Mail", "Public", "SignIn", "Subscribe"];

type Tree = { [key: string]: string | Tree };
const root = path.resolve(import.meta.dirname, "../../..");
const catalogue = (locale: string) => JSON.parse(readFileSync(path.join(root, "messages", `${locale}.json`), "utf8")) as Tree;
const flat = (tree: Tree, before = ""): [key: string, message: string][] =>
  Object.entries(tree).flatMap(([key, value]) => (typeof value === "string" ? [[before + key, value] as [string, string]] : flat(value, `${before + key}.`)));
const namespaceOf = (locale: string, name: string): Map<string, string> => {
  const part = catalogue(locale)[name];
  return new Map(part === undefined || typeof part === "string" ? [] : flat(part));
};
const names = (message: string) => [...new Set(argumentsOf(message).map(({ name }) => name))].sort();

/** Words that are the same in both languages. */
const SAME_AS_ENGLISH = new Set([
  "fr Article.version",
  "fr Article.versions.title",
  "fr Article.versions.item",
  "fr Article.facts.questions",
  "fr Public.nav.corrections",
  "fr Public.corrections.title",
]);

const others = LOCALE_CODES.filter((locale) => locale !== SOURCE_LOCALE);

describe.each(EVERYWHERE)("namespace %s", (namespace) => {
  const source = namespaceOf(SOURCE_LOCALE, namespace);

  test("exists in English", () => expect(source.size).toBeGreaterThan(0));

  test.each(others)("%s has the same keys", (locale) => {
    expect([...namespaceOf(locale, namespace).keys()].sort()).toEqual([...source.keys()].sort());
  });

  test.each(others)("%s has the same arguments in every message", (locale) => {
    const differing = [...namespaceOf(locale, namespace)].filter(([key, message]) => names(message).join() !== names(source.get(key) ?? "").join());
    expect(differing.map(([key]) => key)).toEqual([]);
  });

  test.each(LOCALE_CODES)("%s has every plural form of its language", (locale) => {
    const wanted = new Intl.PluralRules(locale).resolvedOptions().pluralCategories;
    const lacking = [...namespaceOf(locale, namespace)].flatMap(([key, message]) =>
      argumentsOf(message)
        .filter(({ kind }) => kind === "plural")
        .flatMap(({ name, cases }) => wanted.filter((form) => !cases.includes(form)).map((form) => `${key} {${name}} ${form}`)),
    );
    expect(lacking).toEqual([]);
  });

  test.each(others)("%s is translated", (locale) => {
    const untouched = [...namespaceOf(locale, namespace)].filter(([key, message]) => /\p{L}/u.test(message.replace(/\{[^{}]*\}/g, "")) && message === source.get(key));
    expect(untouched.map(([key]) => `${locale} ${namespace}.${key}`).filter((key) => !SAME_AS_ENGLISH.has(key))).toEqual([]);
  });
});

describe("every catalogue", () => {
  test.each(LOCALE_CODES)("%s reads as ICU and has no empty message", (locale) => {
    const all = flat(catalogue(locale));
    expect(all.filter(([, message]) => message.trim() === "").map(([key]) => key)).toEqual([]);
    for (const [key, message] of all) expect(() => argumentsOf(message), key).not.toThrow();
  });

  test.each(others)("%s has no namespace that English lacks", (locale) => {
    const source = Object.keys(catalogue(SOURCE_LOCALE));
    expect(Object.keys(catalogue(locale)).filter((name) => !source.includes(name))).toEqual([]);
  });
});

describe("the reader of ICU messages", () => {
  test("finds arguments inside cases", () => {
    expect(argumentsOf("{count, plural, one {# of {what}} other {# of {what}}} in {place}")).toEqual([
      { name: "count", kind: "plural", cases: ["one", "other"] },
      { name: "what", kind: "simple", cases: [] },
      { name: "what", kind: "simple", cases: [] },
      { name: "place", kind: "simple", cases: [] },
    ]);
  });

  test.each(["{open", "closed}", "{count, plural}", "{count, plural, one}", "{}"])("refuses %s", (message) => {
    expect(() => argumentsOf(message)).toThrow();
  });
});
