import { defineConfig } from "@playwright/test";

// The app under test is started and stopped by scripts/test.mjs, which also says where its data folder is.
const port = process.env.E2E_PORT ?? "3210";
const report = process.env.E2E_REPORT;

const PAGES = ["access.spec.ts", "help-api.spec.ts", "print.spec.ts", "request.spec.ts", "verify.spec.ts"];
const ALONE = ["faults-*.spec.ts", "api-looking.spec.ts"];

export default defineConfig({
  testDir: "tests/e2e",
  outputDir: "test-results",
  workers: 2,
  retries: 0,
  timeout: 60_000,
  expect: { timeout: 10_000 },
  forbidOnly: true,
  // Two lines of about the same length, one test at a time each: one looks at pages, the other does the bench's work. What
  // stops the app, damages the store or counts every row of the database comes when nobody else is there.
  projects: [
    { name: "work", testIgnore: [...PAGES, ...ALONE], workers: 1 },
    { name: "pages", testMatch: PAGES, workers: 1 },
    { name: "alone", testMatch: ALONE, workers: 1, dependencies: ["work", "pages"] },
  ],
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
