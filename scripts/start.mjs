import path from "node:path";
import { localUrl } from "./start/app.mjs";
import { demoAccounts } from "./start/demo.mjs";
import { openHouse } from "./start/house.mjs";
import { buildTools } from "./build-tools.mjs";
import { ensureBuilt, ensureInstalled } from "./start/install.mjs";
import { takeLock } from "./start/lock.mjs";
import { endOnce } from "./start/once.mjs";
import { checkNode, DATABASE_PACKAGES, ensurePackages } from "./start/packages.mjs";
import { giveUp, root, say } from "./start/say.mjs";
import { loadEnvFile, loadSettings } from "./start/settings.mjs";

// `npm start`: from an empty machine to a running workshop. Plain JavaScript: it runs before the packages are there.
const dev = process.argv.includes("--dev");
let house = null;
let release = () => {};
let ending = false;
/** settings that came with the command: the next one needs them too */
let typed = "";

async function end(code) {
  if (ending) return;
  ending = true;
  if (house) say("\nStopping.");
  endOnce();
  await house?.stop();
  release();
  process.exit(process.exitCode ?? code);
}

for (const signal of ["SIGINT", "SIGTERM", "SIGHUP"]) process.on(signal, () => void end(0));
for (const event of ["uncaughtException", "unhandledRejection"]) {
  process.on(event, (error) => {
    process.stderr.write(`${error?.stack ?? error}\n`);
    void end(1);
  });
}

async function start() {
  checkNode();
  typed = ["DEMO", "TWINREAD_DATA"].filter((name) => process.env[name]).map((name) => `${name}=${/^[\w./:-]+$/.test(process.env[name]) ? process.env[name] : `'${process.env[name]}'`} `).join("");
  loadEnvFile();
  release = takeLock(path.join(root, ".data/checkout.lock"), (holder) =>
    `Twinread already runs from this checkout (process ${holder.pid}). Stop it there with Ctrl-C first; a second copy needs a checkout of its own.`);
  if (!process.env.DATABASE_URL) await ensurePackages(DATABASE_PACKAGES);
  await ensureInstalled();
  const settings = await loadSettings();
  const opening = openHouse(settings, () => void end(1));
  house = opening;
  await opening.prepare(settings.demo ? "demo" : "live");
  await opening.checkAppPort();
  // the engine's worker is plain JavaScript also where the pages are not built
  await (dev ? buildTools() : ensureBuilt());
  await opening.database();
  await opening.migrate();
  await opening.seed();
  await opening.mail();
  await opening.app({ dev });
  return settings;
}

function welcome(settings) {
  say(`\nTwinread is up at ${settings.publicUrl}${settings.publicUrl === localUrl(settings) ? "" : ` (on this machine: ${localUrl(settings)})`}`);
  say(`Data: ${settings.dataDir}`);
  if (settings.smtp.fake) say(`Mail stays on this machine: ${path.join(settings.dataDir, "mail-fake")}`);
  const accounts = settings.demo ? demoAccounts(settings.dataDir) : [];
  if (accounts.length > 0) say(`\nDemo accounts, e-mail and first password:\n${accounts.map((line) => `  ${line}`).join("\n")}`);
  if (!settings.demo) say(`\nThe first account is made in another terminal, in this folder:\n  ${typed}npm run admin -- you@your-workshop.example\nIt prints a password that works once. Sign in with it at ${settings.publicUrl}`);
  say("\nCtrl-C stops it.");
}

try {
  const settings = await start();
  if (!ending) welcome(settings);
} catch (error) {
  if (!ending) {
    ending = true;
    await house?.stop();
    release();
    giveUp(error);
  }
}
