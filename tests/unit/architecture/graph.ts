import { existsSync, readdirSync, readFileSync, statSync } from "node:fs";
import path from "node:path";
import ts from "typescript";

export const root = path.resolve(import.meta.dirname, "../../..");
const TOPS = ["app", "components", "lib", "db"];

export type Import = { from: string; to: string; typeOnly: boolean };
export type Module = { file: string; text: string; imports: Import[]; directive: "client" | "server" | null };

function* walk(dir: string): Generator<string> {
  for (const name of readdirSync(dir)) {
    const full = path.join(dir, name);
    if (statSync(full).isDirectory()) yield* walk(full);
    else if (/\.tsx?$/.test(name) && !name.endsWith(".d.ts")) yield full;
  }
}

function resolve(from: string, specifier: string): string {
  const base = specifier.startsWith("@/")
    ? path.join(root, specifier.slice(2))
    : specifier.startsWith(".")
      ? path.resolve(path.dirname(from), specifier)
      : null;
  if (base === null) return specifier;
  for (const candidate of [base, `${base}.ts`, `${base}.tsx`, `${base}/index.ts`, `${base}/index.tsx`]) {
    if (existsSync(candidate) && statSync(candidate).isFile()) return path.relative(root, candidate);
  }
  return path.relative(root, base);
}

/** Every module of ours with its imports, read with the compiler's own parser. Paths are relative to the root. */
export function readModules(): Module[] {
  return TOPS.flatMap((top) => [...walk(path.join(root, top))]).map((full) => {
    const text = readFileSync(full, "utf8");
    const file = path.relative(root, full);
    const source = ts.createSourceFile(file, text, ts.ScriptTarget.Latest, true, full.endsWith("x") ? ts.ScriptKind.TSX : ts.ScriptKind.TS);
    const imports: Import[] = [];
    const visit = (node: ts.Node): void => {
      if ((ts.isImportDeclaration(node) || ts.isExportDeclaration(node)) && node.moduleSpecifier && ts.isStringLiteral(node.moduleSpecifier)) {
        const clause = ts.isImportDeclaration(node) ? node.importClause : undefined;
        const typeOnly = ts.isExportDeclaration(node) ? node.isTypeOnly : (clause?.isTypeOnly ?? false);
        imports.push({ from: file, to: resolve(full, node.moduleSpecifier.text), typeOnly });
      } else if (ts.isCallExpression(node) && node.expression.kind === ts.SyntaxKind.ImportKeyword) {
        const [argument] = node.arguments;
        if (argument && ts.isStringLiteral(argument)) imports.push({ from: file, to: resolve(full, argument.text), typeOnly: false });
      }
      ts.forEachChild(node, visit);
    };
    visit(source);
    const first = source.statements[0];
    const word = first && ts.isExpressionStatement(first) && ts.isStringLiteral(first.expression) ? first.expression.text : "";
    return { file, text, imports, directive: word === "use client" ? "client" : word === "use server" ? "server" : null };
  });
}
