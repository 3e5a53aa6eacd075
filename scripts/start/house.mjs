import { rmSync } from "node:fs";
import path from "node:path";
import { keepApp } from "./app.mjs";
import { endLeftovers, newControl, stopLaunched } from "./child.mjs";
import { keepDatabase } from "./database.mjs";
import { clearHalfMadeDemo, seedDemo } from "./demo.mjs";
import { emptyFolder, prepareFolder } from "./folder.mjs";
import { takeLock } from "./lock.mjs";
import { keepMailFake } from "./mail.mjs";
import { once } from "./once.mjs";
import { checkPort } from "./ports.mjs";
import { progress, say } from "./say.mjs";
import { adminVariables, isEmbedded, tsArgs } from "./settings.mjs";

const inUse = (dataDir) => (holder) =>
  `${dataDir} is in use by another Twinread process (${holder.pid}). Stop that one first, or set TWINREAD_DATA to another folder.`;

/**
 * Everything that runs for one data folder, and how to stop it again in order: last started, first stopped. `onGiveUp` is
 * called when a program keeps ending, more than `mostRestarts` times within two minutes.
 */
export function openHouse(settings, onGiveUp, { mostRestarts = 5 } = {}) {
  const { dataDir } = settings;
  const control = newControl();
  const kept = { onGiveUp, mostRestarts, control };
  let release = () => {};
  let stopped = null;
  const house = {
    /** Data folder with its secrets, locked for this process, nothing of an earlier start left running. */
    async prepare(kind) {
      release = takeLock(path.join(dataDir, "lock"), inUse(dataDir));
      prepareFolder(dataDir, kind);
      await endLeftovers(dataDir);
    },
    /** The same for a test's folder, emptied first. A folder of another kind is refused, not emptied. */
    async prepareEmpty() {
      await house.prepare("test");
      emptyFolder(dataDir, ["lock", "kind"]);
      prepareFolder(dataDir, "test");
    },
    checkAppPort: () => checkPort(settings.host, settings.port, "PORT", "the app"),
    async database() {
      if (!isEmbedded(settings)) return;
      clearHalfMadeDemo(settings);
      await keepDatabase({ dataDir, port: settings.dbPort, ...kept });
    },
    migrate: () => progress("Bringing the tables up to date", () => once(process.execPath, tsArgs("scripts/migrate.ts"), { env: adminVariables(settings) })),
    seed: () => seedDemo(settings),
    async mail() {
      if (settings.smtp.fake) await keepMailFake({ settings, ...kept });
    },
    app: (options) => keepApp({ settings, ...kept, ...options }),
    stop: () => (stopped ??= stopAll()),
    /** Lets go of the folder and leaves what was started running. */
    leaveRunning: () => release(),
  };

  async function stopAll() {
    try {
      await stopLaunched(dataDir, control);
    } catch (error) {
      say(error.message);
      process.exitCode = 1;
    }
    // a start that was cut short may have left it, with the passwords in it
    rmSync(path.join(dataDir, "run/init.sql"), { force: true });
    release();
  }
  return house;
}
