import { readFileSync } from "node:fs";
import path from "node:path";
import { expect, test } from "vitest";

const root = path.resolve(import.meta.dirname, "../../..");
/** Values of each custom property, in the order in which they stand: light first, then dark. */
function values(file: string): Map<string, string[]> {
  const found = new Map<string, string[]>();
  for (const [, name = "", value = ""] of readFileSync(path.join(root, file), "utf8").matchAll(/(--[\w-]+):\s*([^;]+);/g)) found.set(name, [...(found.get(name) ?? []), value.trim()]);
  return found;
}

test("the one-click page has the colours of every other page", () => {
  const tokens = values("app/tokens.css");
  const plain = values("public/plain.css");
  expect(plain.size).toBeGreaterThan(3);
  for (const [name, [light, dark]] of plain) expect([name, light, dark]).toEqual([name, tokens.get(name)?.[0], tokens.get(name)?.[1]]);
});
