import ts from "typescript";
import { describe, expect, test } from "vitest";
import { readModules } from "./graph";

const modules = readModules();

/** Commands that no member of staff runs: a visitor or the system acts. */
const WITHOUT_PERMISSION = /^lib\/(subscribers|auth|jobs)\//;

/** Asking for a link is no act: for strangers nothing may be written at all, and the sign-in itself is recorded. */
const WITHOUT_ENTRY = new Set(["lib/auth/request-sign-in.ts"]);

describe("every command has its beats", () => {
  const commands = modules.filter(({ file, text }) => file.startsWith("lib/") && /\binTransaction\(/.test(text) && file !== "lib/context.ts");

  test("there are commands", () => expect(commands.length).toBeGreaterThan(10));

  test.each(commands.map(({ file, text }) => ({ file, text })))("$file", ({ file, text }) => {
    expect(/\baudit\(/.test(text), "writes to the register").toBe(!WITHOUT_ENTRY.has(file));
    if (!WITHOUT_PERMISSION.test(file)) expect(/\brequirePermission\(/.test(text), "asks for a permission").toBe(true);
  });
});

describe("every server action goes through a wrapper", () => {
  const files = modules.filter(({ directive }) => directive === "server");

  test("there are actions", () => expect(files.length).toBeGreaterThan(5));

  test.each(files.map(({ file, text }) => ({ file, text })))("$file", ({ file, text }) => {
    const source = ts.createSourceFile(file, text, ts.ScriptTarget.Latest, true);
    const strangers: string[] = [];
    for (const statement of source.statements) {
      if (!ts.canHaveModifiers(statement) || !ts.getModifiers(statement)?.some((m) => m.kind === ts.SyntaxKind.ExportKeyword)) continue;
      if (ts.isTypeAliasDeclaration(statement) || ts.isInterfaceDeclaration(statement)) continue;
      if (ts.isVariableStatement(statement)) {
        for (const { name, initializer } of statement.declarationList.declarations) {
          const made = initializer && ts.isCallExpression(initializer) ? initializer.expression.getText(source) : "";
          if (!/^(staffAction|publicAction|accessAction)$/.test(made)) strangers.push(name.getText(source));
        }
      } else strangers.push(statement.getText(source).slice(0, 60));
    }
    expect(strangers, "exports that are endpoints without a guard").toEqual([]);
  });
});
