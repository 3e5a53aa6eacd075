import path from "node:path";
import { defineConfig, type ViteUserConfig } from "vitest/config";
import base from "../../vitest.config";

const config: ViteUserConfig = base;
// these are no part of the projects of `npm test`
const test = { ...config.test, projects: undefined };

export default defineConfig({
  ...config,
  root: path.resolve(import.meta.dirname, "../.."),
  test: { ...test, fileParallelism: false, include: ["tests/long/**/*.test.ts"], exclude: ["node_modules/**"], testTimeout: 30 * 60_000 },
});
