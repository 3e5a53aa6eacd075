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
    include: ["tests/**/*.test.ts"],
    exclude: ["tests/long/**", "node_modules/**"],
    pool: "forks",
    // database tests share one database: one file after the other
    fileParallelism: false,
    testTimeout: 30_000,
    hookTimeout: 60_000,
  },
});
