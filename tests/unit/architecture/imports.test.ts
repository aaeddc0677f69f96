import { describe, expect, test } from "vitest";
import { type Import, type Module, readModules } from "./graph";

const modules = readModules();
const byFile = new Map(modules.map((module) => [module.file, module]));
const imports = modules.flatMap((module) => module.imports);
const ours = (to: string) => /^(app|components|lib|db)\//.test(to);

/** Who may not import what (house.md, section 4). `from` and `not` are matched against paths; types count only where said. */
const RULES: { name: string; from: RegExp; not: (edge: Import) => boolean; types?: boolean }[] = [
  {
    name: "the engine imports itself and numerical packages",
    from: /^lib\/engine\/(?!cli\.ts)/,
    not: ({ to }) => (ours(to) ? !to.startsWith("lib/engine/") : !["odex", "pure-rand", "zod", "@noble/hashes"].some((p) => to === p || to.startsWith(`${p}/`))),
    types: true,
  },
  {
    name: "charts and figures know no React, database or catalogue",
    from: /^lib\/(charts|figures)\//,
    not: ({ to }) => /^(react|next|next-intl|drizzle-orm)(\/|$)/.test(to) || /^(db|app|components)\//.test(to) || /queries/.test(to),
  },
  {
    name: "pure domain files know no database, React or Next.js",
    from: /^lib\/[a-z-]+\/(constants|schema|rules|workflow|permissions|locales|finding|rendered)\.ts$/,
    not: ({ to }) => /^(react|next|drizzle-orm|postgres)(\/|$)/.test(to) || /^(db|app|components)\//.test(to) || /\/queries\.ts$/.test(to),
  },
  {
    name: "the database knows tables and pure constants only",
    from: /^db\/(client|migrate|schema\/.*)\.ts$/,
    not: ({ to, typeOnly }) => !typeOnly && /^(app|components)\/|^lib\/(?!env\.ts|errors\.ts|i18n\/locales\.ts|.*\/constants\.ts)/.test(to),
    types: true,
  },
  {
    name: "lib never imports Next.js, but for i18n, auth and the web process",
    from: /^lib\/(?!i18n\/|auth\/|web\/)/,
    not: ({ to }) => /^next(\/|$)/.test(to) || /^(app|components)\//.test(to),
  },
  { name: "mail templates never reach the database", from: /^lib\/mail\/templates\//, not: ({ to }) => /^(db|app)\//.test(to) || /^drizzle-orm/.test(to) },
  {
    name: "components take data as props",
    from: /^components\//,
    not: ({ to, typeOnly }) => !typeOnly && (/^(db|app)\//.test(to) || /^lib\/(jobs|mail|audit)\//.test(to) || /\/queries\.ts$/.test(to)),
  },
  {
    name: "desk pages never import the public side or the tables",
    from: /^app\/\(desk\)\/desk\//,
    not: ({ to }) => /^app\/\(public\)/.test(to) || /^db\//.test(to),
  },
  {
    name: "public pages read publications and subscribers only",
    from: /^app\/(\(public\)|u)\//,
    not: ({ to, typeOnly }) =>
      /^db\//.test(to) ||
      /^app\/\(desk\)/.test(to) ||
      (!typeOnly && /^lib\/(auth|users|outbreaks|measures|packages|assessments|engine|jobs|mail)\//.test(to)),
  },
];

describe("who may import whom", () => {
  test.each(RULES)("$name", ({ from, not, types }) => {
    const edges = imports.filter((edge) => from.test(edge.from) && (types || !edge.typeOnly));
    expect(edges.length, "the rule meets no import: its pattern is out of date").toBeGreaterThan(0);
    expect(edges.filter(not).map(({ from: a, to }) => `${a} → ${to}`)).toEqual([]);
  });

  test("nothing that runs in the browser reaches the database", () => {
    const reaches = (module: Module, seen: Set<string>): string[] => {
      if (seen.has(module.file)) return [];
      seen.add(module.file);
      return module.imports.flatMap((edge) => {
        if (edge.typeOnly) return [];
        if (edge.to.startsWith("db/") || /^(drizzle-orm|postgres)(\/|$)/.test(edge.to)) return [`${module.file} → ${edge.to}`];
        const next = byFile.get(edge.to);
        return next && next.directive !== "server" ? reaches(next, seen) : [];
      });
    };
    const clients = modules.filter((module) => module.directive === "client");
    expect(clients.length).toBeGreaterThan(0);
    expect(clients.flatMap((module) => reaches(module, new Set()))).toEqual([]);
  });

  test("no import cycles", () => {
    const done = new Set<string>();
    const cycles: string[] = [];
    const visit = (file: string, path: string[]): void => {
      const at = path.indexOf(file);
      if (at >= 0) {
        cycles.push([...path.slice(at), file].join(" → "));
        return;
      }
      if (done.has(file)) return;
      for (const edge of byFile.get(file)?.imports ?? []) if (!edge.typeOnly && byFile.has(edge.to)) visit(edge.to, [...path, file]);
      done.add(file);
    };
    for (const { file } of modules) visit(file, []);
    expect(cycles).toEqual([]);
  });
});
