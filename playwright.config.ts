import { defineConfig } from "@playwright/test";

// The app under test is started and stopped by scripts/test.mjs, which also says where its data folder is.
const port = process.env.E2E_PORT ?? "3210";
const report = process.env.E2E_REPORT;

export default defineConfig({
  testDir: "tests/e2e",
  outputDir: "test-results",
  workers: 1,
  retries: 0,
  timeout: 60_000,
  expect: { timeout: 10_000 },
  forbidOnly: true,
  reporter: report ? [["list"], ["json", { outputFile: report }]] : [["list"]],
  use: {
    baseURL: `http://127.0.0.1:${port}`,
    locale: "en-GB",
    timezoneId: "UTC",
    trace: "off",
    screenshot: "only-on-failure",
    launchOptions: {
      executablePath: process.env.CHROMIUM ?? "/usr/bin/chromium",
      args: [
        "--no-sandbox", "--disable-gpu", "--disable-quic", "--no-first-run", "--disable-background-networking",
        "--disable-component-update", "--disable-sync", "--disable-dev-shm-usage",
      ],
    },
  },
});
