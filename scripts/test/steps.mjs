import { existsSync, mkdirSync, readdirSync, rmSync, writeFileSync } from "node:fs";
import path from "node:path";
import { runningMark } from "../start/child.mjs";
import { makeSecrets } from "../start/folder.mjs";
import { openHouse } from "../start/house.mjs";
import { ensureBuilt } from "../start/install.mjs";
import { once } from "../start/once.mjs";
import { Refusal, root, say } from "../start/say.mjs";
import { adminVariables, loadSettings } from "../start/settings.mjs";
import { oneCheck, playwrightCounts, vitestCounts } from "./counts.mjs";
import { browserVariables, reportFile, unitVariables } from "./variables.mjs";

const houses = new Set();
const node = (args, env = process.env) => once(process.execPath, args, { env, show: "code" });
const heading = (text) => say(`\n== ${text}`);

/** Stops whatever the tests still have running. */
export async function stopAll() {
  for (const house of houses) await house.stop();
}

async function openFor(variables) {
  const settings = await loadSettings({ ...process.env, ...variables });
  const house = openHouse(settings, () => say("A program that the tests need keeps ending; the tests that need it will say so."), { mostRestarts: 1000 });
  houses.add(house);
  return { settings, house };
}

export async function typeCheck() {
  heading("Types");
  // a fresh clone has no route types yet
  const made = await node(["node_modules/next/dist/bin/next", "typegen"]);
  return oneCheck(made || (await node(["node_modules/typescript/bin/tsc", "--noEmit"])));
}

export async function lint() {
  heading("Lint");
  return oneCheck(await node(["node_modules/eslint/bin/eslint.js", "."]));
}

/** Runs `work` with the environment of a migrated, empty database; a database left running by --keep is used as it is. */
async function withDatabase(mayUseKept, work) {
  const { settings, house } = await openFor(unitVariables());
  const kept = mayUseKept && runningMark(settings.dataDir, "database") !== null;
  try {
    if (!kept) {
      await house.prepareEmpty();
      await house.database();
    }
    // a kept folder may be older than the newest key
    if (kept) makeSecrets(settings.dataDir);
    await house.migrate();
    return await work({ ...adminVariables(settings), NODE_ENV: "test" }, house, settings);
  } finally {
    await house.stop();
  }
}

/** A step that could not be taken counts as one that did not pass; the sentence says why. */
async function orFailed(work) {
  try {
    return await work();
  } catch (error) {
    if (!(error instanceof Refusal)) throw error;
    say(error.message);
    if (error.message.includes("DB_PORT") || error.message.includes("MAIL_PORT")) say("For the tests: TEST_DB_PORT moves the database ports, E2E_PORT the app's, TEST_DATA the folder.");
    return oneCheck(1);
  }
}

export function vitest({ filter = null, long = false } = {}) {
  heading(long ? "Long tests" : "Unit and database tests");
  const config = long ? "tests/long/vitest.config.ts" : "vitest.config.ts";
  return orFailed(() => withDatabase(filter !== null, async (env) => {
    const file = reportFile("vitest");
    mkdirSync(path.dirname(file), { recursive: true });
    rmSync(file, { force: true });
    const code = await node([
      "node_modules/vitest/vitest.mjs", "run", "--config", config, "--reporter=default", "--reporter=json", `--outputFile.json=${file}`, ...(filter ? [filter] : []),
    ], env);
    return vitestCounts(file, code);
  }));
}

export function build() {
  heading("Build");
  return orFailed(async () => {
    await ensureBuilt();
    return oneCheck(0);
  });
}

export function browser({ filter = null } = {}) {
  heading("Browser tests");
  return orFailed(async () => {
    const { settings, house } = await openFor(browserVariables());
    const file = reportFile("playwright");
    rmSync(file, { force: true });
    try {
      await house.prepareEmpty();
      await house.checkAppPort();
      await house.database();
      await house.migrate();
      await house.seed();
      await house.mail();
      await house.app({});
      const env = { ...adminVariables(settings), E2E_PORT: String(settings.port), E2E_REPORT: file };
      const code = await node(["node_modules/@playwright/test/cli.js", "test", ...(filter ? [filter] : [])], env);
      return playwrightCounts(file, code);
    } finally {
      await house.stop();
    }
  });
}

export const hasLongTests = () => existsSync(path.join(root, "tests/long")) && readdirSync(path.join(root, "tests/long"), { recursive: true }).some((name) => name.endsWith(".test.ts"));

/** `--keep`: a database for working on tests, left running; its environment goes into a file that a shell can read. */
export async function keepDatabaseRunning() {
  const { settings, house } = await openFor(unitVariables());
  if (runningMark(settings.dataDir, "database") === null) {
    await house.prepareEmpty();
    await house.database();
  }
  await house.migrate();
  const file = path.join(settings.dataDir, "env");
  const variables = adminVariables(settings);
  const names = ["TWINREAD_DATA", "DB_PORT", "MAIL_PORT", "DEMO", "DATABASE_URL", "DATABASE_ADMIN_URL", "NEXTAUTH_SECRET", "NEXTAUTH_URL", "PORT", "HOST", "PUBLIC_URL"];
  writeFileSync(file, names.map((name) => `${name}='${variables[name]}'\n`).join(""), { mode: 0o600 });
  house.leaveRunning();
  say(`The test database runs on port ${settings.dbPort}. Its environment: set -a; . ${path.relative(root, file)}; set +a`);
  say("Run tests against it with: node scripts/test.mjs --only=<path>. End it with: node scripts/test.mjs --stop");
}

/** `--stop`: ends what --keep left running. */
export async function stopKeptDatabase() {
  const { house } = await openFor(unitVariables());
  await house.prepare("test");
  await house.stop();
}
