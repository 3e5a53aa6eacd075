import path from "node:path";
import { root } from "../start/say.mjs";

/** Settings of a person's own must not leak into the tests. */
const OWN = [
  "PORT", "HOST", "PUBLIC_URL", "DEMO", "TWINREAD_DATA", "DB_PORT", "MAIL_PORT", "DATABASE_URL", "DATABASE_ADMIN_URL",
  "WORKSHOP_NAME", "WORKSHOP_TIME_ZONE", "SCRUB_DAYS", "SCRUB_MEBIBYTES_A_SECOND", "SMTP_URL", "SMTP_HOST", "SMTP_PORT", "SMTP_USER", "SMTP_PASSWORD", "SMTP_FROM", "WITNESS_FILE",
];

/** The data folders and ports of the tests; TEST_DATA, TEST_DB_PORT and E2E_PORT move them, for two runs side by side. */
const folder = path.resolve(root, process.env.TEST_DATA || ".data/test");
const firstPort = Number(process.env.TEST_DB_PORT || 33406);
const appPort = Number(process.env.E2E_PORT || 3210);

export function forgetOwnSettings() {
  for (const name of OWN) process.env[name] = "";
  process.env.NEXT_TELEMETRY_DISABLED = "1";
}

/** For vitest: a database and a data folder without any row or image. */
export const unitVariables = () => ({
  PORT: String(appPort), TWINREAD_DATA: path.join(folder, "unit"), DB_PORT: String(firstPort), MAIL_PORT: String(firstPort + 1),
  WORKSHOP_TIME_ZONE: "UTC",
});

/** For the browser tests: the demo workshop behind a running app. */
export const browserVariables = () => ({
  PORT: String(appPort), TWINREAD_DATA: path.join(folder, "browser"), DB_PORT: String(firstPort + 10), MAIL_PORT: String(firstPort + 11),
  WORKSHOP_TIME_ZONE: "UTC",
});

export const reportFile = (name) => path.join(folder, `${name}.json`);
