import path from "node:path";
import { defineConfig } from "vitest/config";

const root = import.meta.dirname;

export default defineConfig({
  resolve: {
    alias: [
      { find: "server-only", replacement: path.join(root, "tests/support/empty.ts") },
      { find: /^@\//, replacement: `${root}/` },
    ],
  },
  test: {
    environment: "node",
    globalSetup: ["tests/support/build-worker.ts"],
    pool: "forks",
    testTimeout: 60_000,
    hookTimeout: 60_000,
    projects: [
      { extends: true, test: { name: "rules", include: ["tests/{core,components,scripts}/**/*.test.ts"], sequence: { groupOrder: 0 } } },
      // these share one database: one file after the other
      { extends: true, test: { name: "database", include: ["tests/database/**/*.test.ts"], fileParallelism: false, sequence: { groupOrder: 1 } } },
    ],
  },
});
