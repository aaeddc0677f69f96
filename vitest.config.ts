import { fileURLToPath } from "node:url";
import { defineConfig } from "vitest/config";

const root = fileURLToPath(new URL(".", import.meta.url));
const alias = { "@": root.replace(/\/$/, "") };
const project = (name: string, extra: Record<string, unknown> = {}) => ({
  resolve: { alias },
  test: { name, include: [`tests/${name}/**/*.test.{ts,tsx}`], setupFiles: ["tests/setup/console.ts"], ...extra },
});

// The browser and integration suites need a database, a mail sink and a build: tests/run.mjs prepares them.
export default defineConfig({
  resolve: { alias },
  test: {
    projects: [
      project("unit", { testTimeout: 120_000 }),
      project("reference", { testTimeout: 120_000 }),
      project("integration", { testTimeout: 60_000, hookTimeout: 60_000 }),
      project("browser", { testTimeout: 240_000, hookTimeout: 120_000, fileParallelism: false }),
      project("long", { testTimeout: 3_600_000, hookTimeout: 120_000, fileParallelism: false }),
    ],
  },
});
