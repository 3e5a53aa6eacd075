import { spawn } from "node:child_process";
import { closeSync, mkdirSync, openSync, readdirSync, readFileSync, renameSync, rmSync, statSync, writeFileSync } from "node:fs";
import path from "node:path";
import { endProcess, isAlive, sleep, startTicks } from "./process-id.mjs";
import { progress, Refusal, root, say } from "./say.mjs";

const BIG_LOG = 10 * 1024 * 1024;
const logFile = (dataDir, name) => path.join(dataDir, "logs", `${name}.log`);
const markFile = (dataDir, name) => path.join(dataDir, "run", `${name}.json`);

/** Opens a log for appending; one that grew big is set aside first. */
export function openLog(dataDir, name) {
  const file = logFile(dataDir, name);
  mkdirSync(path.dirname(file), { recursive: true, mode: 0o700 });
  if ((statSync(file, { throwIfNoEntry: false })?.size ?? 0) > BIG_LOG) renameSync(file, `${file}.1`);
  return openSync(file, "a", 0o600);
}

export function lastLines(dataDir, name, count = 20) {
  return readFileSync(logFile(dataDir, name), "utf8").trimEnd().split("\n").slice(-count).join("\n");
}

/**
 * Starts a program in a process group of its own, so that Ctrl-C reaches only the starting process, which then stops
 * everything in order. Leaves a mark in the data folder, by which a later start finds what a killed one left behind.
 */
export function launch({ dataDir, name, command, args, env, port = null, inherit = false }) {
  const log = inherit ? null : openLog(dataDir, name);
  const child = spawn(command, args, { cwd: root, detached: true, env, stdio: ["ignore", log ?? "inherit", log ?? "inherit"] });
  if (log !== null) closeSync(log);
  const state = { ended: null };
  const exited = new Promise((done) => {
    child.on("error", (error) => done((state.ended = error.message)));
    child.on("exit", (code, signal) => done((state.ended = signal ?? `code ${code}`)));
  });
  const mark = { pid: child.pid ?? 0, ticks: child.pid ? startTicks(child.pid) : null, port };
  writeFileSync(markFile(dataDir, name), JSON.stringify(mark), { mode: 0o600 });
  exited.then(() => {
    if (runningMark(dataDir, name) === null) rmSync(markFile(dataDir, name), { force: true });
  });
  return { mark, exited, hasEnded: () => state.ended };
}

/** The mark of a program of this data folder that runs now, or null. */
export function runningMark(dataDir, name) {
  try {
    const mark = JSON.parse(readFileSync(markFile(dataDir, name), "utf8"));
    return isAlive(mark) ? mark : null;
  } catch {
    return null;
  }
}

const PATIENCE = { app: { waitMs: 30_000, killAfterMs: 12_000 }, mail: { waitMs: 10_000, killAfterMs: 3_000 }, database: { waitMs: 120_000 } };

/** Ends what an earlier start left running when it was killed. The caller holds the folder's lock. */
export async function endLeftovers(dataDir) {
  const names = readdirSync(path.join(dataDir, "run")).map((file) => file.replace(/\.json$/, ""));
  for (const name of ["app", "mail", "database"].filter((known) => names.includes(known))) {
    const mark = runningMark(dataDir, name);
    if (!mark) continue;
    say(`Ending what an earlier start left running: ${name} (process ${mark.pid}).`);
    await stopMarked(dataDir, name, mark);
  }
}

export async function stopMarked(dataDir, name, mark) {
  const ended = await progress(`Stopping: ${name}`, () => endProcess(mark, PATIENCE[name]));
  if (!ended) throw new Refusal(`The ${name} (process ${mark.pid}) does not end. Look at ${logFile(dataDir, name)}, end it by hand, then start again.`);
  rmSync(markFile(dataDir, name), { force: true });
}

const WINDOW_MS = 120_000;

/**
 * Keeps a program running: `start` launches it and resolves to its handle once it answers. When it ends by itself it is
 * started again, with growing pauses; after `mostRestarts` times in two minutes `onGiveUp` is called instead.
 */
export async function keep({ dataDir, name, label, start, onGiveUp, mostRestarts }) {
  let handle = await start();
  let stopping = false;
  const recent = [];
  const watch = (async () => {
    for (;;) {
      const how = await handle.exited;
      if (stopping) return;
      const now = Date.now();
      while (recent.length > 0 && now - recent[0] > WINDOW_MS) recent.shift();
      recent.push(now);
      if (recent.length > mostRestarts) {
        say(`${label} ended ${recent.length} times within two minutes. Its last lines, from ${logFile(dataDir, name)}:\n${lastLines(dataDir, name)}`);
        return onGiveUp();
      }
      say(`${label} ended by itself (${how}). Starting it again.`);
      await sleep(Math.min(4000, 250 * 2 ** (recent.length - 1)));
      if (stopping) return;
      try {
        handle = await start();
      } catch (error) {
        say(error.message);
        handle = { exited: Promise.resolve("did not start"), mark: null };
      }
    }
  })();
  watch.catch((error) => {
    say(error.stack);
    onGiveUp();
  });
  return {
    pid: () => handle.mark?.pid ?? null,
    async stop() {
      stopping = true;
      // a restart under way has its own mark, newer than the handle
      const mark = runningMark(dataDir, name) ?? handle.mark;
      if (mark) await stopMarked(dataDir, name, mark);
    },
  };
}
