import path from "node:path";
import { defineConfig, type ViteUserConfig } from "vitest/config";
import base from "../../vitest.config";

const config: ViteUserConfig = base;

export default defineConfig({
  ...config,
  root: path.resolve(import.meta.dirname, "../.."),
  test: { ...config.test, include: ["tests/long/**/*.test.ts"], exclude: ["node_modules/**"], testTimeout: 30 * 60_000 },
});
