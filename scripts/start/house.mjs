import path from "node:path";
import { keepApp } from "./app.mjs";
import { endLeftovers } from "./child.mjs";
import { keepDatabase } from "./database.mjs";
import { clearHalfMadeDemo, seedDemo } from "./demo.mjs";
import { emptyFolder, prepareFolder } from "./folder.mjs";
import { takeLock } from "./lock.mjs";
import { keepMailFake } from "./mail.mjs";
import { endOnce, once } from "./once.mjs";
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
  const stops = [];
  let stopping = null;
  const house = {
    /** Data folder with its secrets, locked for this process, nothing of an earlier start left running. */
    async prepare(kind) {
      stops.push(takeLock(path.join(settings.dataDir, "lock"), inUse(settings.dataDir)));
      prepareFolder(settings.dataDir, kind);
      await endLeftovers(settings.dataDir);
    },
    /** The same for a test's folder, emptied first. A folder of another kind is refused, not emptied. */
    async prepareEmpty() {
      await house.prepare("test");
      emptyFolder(settings.dataDir, ["lock", "kind"]);
      prepareFolder(settings.dataDir, "test");
    },
    checkAppPort: () => checkPort(settings.host, settings.port, "PORT", "the app"),
    async database() {
      if (!isEmbedded(settings)) return;
      clearHalfMadeDemo(settings);
      await add(keepDatabase({ dataDir: settings.dataDir, port: settings.dbPort, onGiveUp, mostRestarts }));
    },
    migrate: () => progress("Bringing the tables up to date", () => once(process.execPath, tsArgs("scripts/migrate.ts"), { env: adminVariables(settings) })),
    seed: () => seedDemo(settings),
    async mail() {
      if (settings.smtp.fake) await add(keepMailFake({ settings, onGiveUp, mostRestarts }));
    },
    app: (options) => add(keepApp({ settings, onGiveUp, mostRestarts, ...options })),
    stop: () => (stopping ??= stopAll()),
    /** Lets go of the folder and leaves what was started running. */
    leaveRunning: () => stops[0]?.(),
  };

  async function add(kept) {
    const thing = await kept;
    stops.push(() => thing.stop());
    // a stop asked for while this was starting has passed it by
    if (stopping) await thing.stop();
    return thing;
  }

  async function stopAll() {
    endOnce();
    while (stops.length > 0) {
      try {
        await stops.pop()();
      } catch (error) {
        say(error.message);
        process.exitCode = 1;
      }
    }
  }
  return house;
}
