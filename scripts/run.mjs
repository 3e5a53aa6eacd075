import { existsSync, readFileSync } from "node:fs";
import path from "node:path";
import { runningMark } from "./start/child.mjs";
import { openHouse } from "./start/house.mjs";
import { lockHolder } from "./start/lock.mjs";
import { endOnce, once } from "./start/once.mjs";
import { checkNode } from "./start/packages.mjs";
import { giveUp, Refusal, root, sayOnStandardError } from "./start/say.mjs";
import { adminVariables, appVariables, isEmbedded, loadEnvFile, loadSettings, tsArgs } from "./start/settings.mjs";

// Runs a TypeScript script with the environment of the data folder: `node scripts/run.mjs scripts/check-store.ts --json`.
// The built-in database is started for it when it is not running, and stopped again.
const [script, ...args] = process.argv.slice(2);
let house = null;

async function main() {
  sayOnStandardError();
  checkNode();
  if (!script || !existsSync(path.join(root, script))) throw new Refusal(`There is no script ${script ?? "given"}. Write it like: node scripts/run.mjs scripts/check-store.ts`);
  if (!existsSync(path.join(root, "node_modules/tsx"))) throw new Refusal("The packages are not there yet. Run npm start once, then this again.");
  loadEnvFile();
  const settings = await loadSettings();
  const port = await databasePort(settings);
  // only the migrations get to see the user that can change tables
  const variables = script === "scripts/migrate.ts" ? adminVariables(settings, port) : appVariables(settings, port);
  return once(process.execPath, tsArgs(script, args), { env: variables, show: "code", stdin: "inherit" });
}

/** Port of the built-in database, which runs afterwards. */
async function databasePort(settings) {
  const { dataDir } = settings;
  const kind = path.join(dataDir, "kind");
  if (!existsSync(kind)) throw new Refusal(`There is no data in ${dataDir} yet. Run npm start once${settings.demo ? "" : " with DEMO=0"}, then this again.`);
  const running = runningMark(dataDir, "database");
  if (running || !isEmbedded(settings)) return running?.port ?? settings.dbPort;
  if (lockHolder(path.join(dataDir, "lock"))) throw new Refusal("Twinread is starting or stopping on this data folder. Wait a moment, then try again.");
  house = openHouse(settings, () => void end(1));
  await house.prepare(readFileSync(kind, "utf8").trim() === "test" ? "test" : settings.demo ? "demo" : "live");
  await house.database();
  return settings.dbPort;
}

async function end(code) {
  endOnce();
  await house?.stop();
  process.exit(code);
}

for (const signal of ["SIGINT", "SIGTERM", "SIGHUP"]) process.on(signal, () => void end(130));

try {
  await end(await main());
} catch (error) {
  await house?.stop();
  // 2 for "could not be run": check-store's 1 means damage
  giveUp(error, 2);
}
