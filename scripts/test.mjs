import path from "node:path";
import { ensureInstalled, needsBuild, needsInstall } from "./start/install.mjs";
import { lockHolder, takeLock } from "./start/lock.mjs";
import { endOnce } from "./start/once.mjs";
import { checkNode, DATABASE_PACKAGES, ensurePackages, TEST_PACKAGES } from "./start/packages.mjs";
import { giveUp, Refusal, root, say } from "./start/say.mjs";
import { sum } from "./test/counts.mjs";
import { forgetOwnSettings } from "./test/variables.mjs";

// `npm test`: everything from an empty machine to the line "N passed, N failed". Plain JavaScript: it runs before the
// packages are there. --only=<path> runs some vitest files (with --long, of the long ones), --browser=<path> some browser
// tests, --long the long ones, --keep leaves a test database running and --stop ends it.
const option = (name) => process.argv.find((word) => word.startsWith(`--${name}=`))?.slice(name.length + 3) ?? null;
const flag = (name) => process.argv.includes(`--${name}`);
const LOCK = path.join(root, ".data/checkout.lock");
let release = () => {};
let steps = null;
let ended = false;

async function end(code) {
  if (ended) return;
  ended = true;
  endOnce();
  await steps?.stopAll();
  release();
  process.exit(code);
}
for (const signal of ["SIGINT", "SIGTERM", "SIGHUP"]) process.on(signal, () => void end(130));

/** Packages and build must not change under an app that runs from this checkout. */
function lockCheckout() {
  const holder = lockHolder(LOCK);
  const why = (other) => `Twinread runs from this checkout (process ${other.pid}), and packages or sources have changed since. Stop it, then run the tests again.`;
  if (holder && (needsInstall() || needsBuild())) throw new Refusal(why(holder));
  if (!holder) release = takeLock(LOCK, why);
}

/** What was asked for, one step after the other; each gives its counts. */
async function run() {
  if (flag("keep")) return steps.keepDatabaseRunning();
  if (flag("stop")) return steps.stopKeptDatabase();
  const only = option("only");
  if (only !== null) return [await steps.vitest({ filter: only, long: flag("long") })];
  if (flag("long")) {
    if (steps.hasLongTests()) return [await steps.vitest({ long: true })];
    say("There are no long tests in tests/long yet.");
    return [];
  }
  const results = [];
  const browserOnly = option("browser");
  let built = null;
  if (browserOnly === null) {
    // the tests on one database leave a core free for types, lint and build
    const beside = async () => [await steps.typeCheck(), await steps.lint(), (built = await steps.build())];
    results.push(...(await Promise.all([steps.vitest(), beside()])).flat());
  } else results.push((built = await steps.build()));
  if (built.failed === 0) results.push(await steps.browser({ filter: browserOnly }));
  else {
    say("The browser tests need the build: they were not run, and count as one that did not pass.");
    results.push({ passed: 0, failed: 1 });
  }
  return results;
}

try {
  checkNode();
  forgetOwnSettings();
  const light = option("only") !== null || flag("keep") || flag("stop");
  if (!light) lockCheckout();
  await ensurePackages(light || flag("long") ? DATABASE_PACKAGES : TEST_PACKAGES);
  if (!light) await ensureInstalled();
  steps = await import("./test/steps.mjs");
  const results = await run();
  if (!results) await leave(0);
  const { passed, failed } = sum(results);
  say(`\n${passed} passed, ${failed} failed`);
  await leave(failed === 0 ? 0 : 1);
} catch (error) {
  await steps?.stopAll();
  release();
  giveUp(error);
}

async function leave(code) {
  if (flag("keep")) process.exit(code);
  await end(code);
}
