import { spawn } from "node:child_process";
import { closeSync, mkdirSync, openSync, readFileSync, renameSync, rmSync, statSync, writeFileSync } from "node:fs";
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

/** What the parts of one house share: whether it is being stopped, and what it has launched. */
export const newControl = () => ({ stopping: false, launched: new Set() });

/**
 * Starts a program in a process group of its own, so that Ctrl-C reaches only the starting process, which then stops
 * everything in order. Leaves a mark in the data folder, by which a later start finds what a killed one left behind.
 */
export function launch({ control, dataDir, name, command, args, env, port = null, inherit = false }) {
  if (control.stopping) throw new Refusal("Stopping: nothing new is started.");
  const log = inherit ? null : openLog(dataDir, name);
  const child = spawn(command, args, { cwd: root, detached: true, env, stdio: ["ignore", log ?? "inherit", log ?? "inherit"] });
  if (log !== null) closeSync(log);
  control.launched.add(name);
  const state = { ended: null };
  const exited = new Promise((done) => {
    child.on("error", (error) => done((state.ended = error.message)));
    child.on("exit", (code, signal) => done((state.ended = signal ?? `code ${code}`)));
  });
  const mark = { pid: child.pid ?? 0, ticks: child.pid ? startTicks(child.pid) : null, port };
  writeFileSync(markFile(dataDir, name), JSON.stringify(mark), { mode: 0o600 });
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

// The order of stopping: whoever uses another stops before it. The database is never killed, however long it takes.
const PATIENCE = { app: { waitMs: 30_000, killAfterMs: 12_000 }, mail: { waitMs: 10_000, killAfterMs: 3_000 }, database: { waitMs: 120_000 } };

/** Ends what an earlier start left running when it was killed. The caller holds the folder's lock. */
export async function endLeftovers(dataDir) {
  for (const name of Object.keys(PATIENCE)) {
    const mark = runningMark(dataDir, name);
    if (!mark) continue;
    say(`Ending what an earlier start left running: ${name} (process ${mark.pid}).`);
    await stopMarked(dataDir, name, mark);
  }
}

/** Stops in order whatever the house has launched, also what is only just starting. */
export async function stopLaunched(dataDir, control) {
  control.stopping = true;
  for (const name of Object.keys(PATIENCE).filter((known) => control.launched.has(known))) {
    const mark = runningMark(dataDir, name);
    if (mark) await stopMarked(dataDir, name, mark);
    else rmSync(markFile(dataDir, name), { force: true });
  }
}

export async function stopMarked(dataDir, name, mark) {
  const ended = await progress(`Stopping: ${name}`, () => endProcess(mark, PATIENCE[name]));
  if (!ended) throw new Refusal(`The ${name} (process ${mark.pid}) does not end. Look at ${logFile(dataDir, name)}, end it by hand, then start again.`);
  rmSync(markFile(dataDir, name), { force: true });
}

const WINDOW_MS = 120_000;
const LONGEST_PAUSE_MS = 4000;

/**
 * Keeps a program running: `start` launches it and resolves to its handle once it answers. When it ends by itself it is
 * started again, with growing pauses; after `mostRestarts` times in two minutes `onGiveUp` is called instead.
 */
export async function keep({ control, dataDir, name, label, start, onGiveUp, mostRestarts }) {
  const handle = await start();
  restartWhenEnded({ control, dataDir, name, label, start, onGiveUp, mostRestarts }, handle).catch((error) => {
    say(error.stack);
    onGiveUp();
  });
}

async function restartWhenEnded({ control, dataDir, name, label, start, onGiveUp, mostRestarts }, first) {
  let handle = first;
  let recent = [];
  for (;;) {
    const how = await handle.exited;
    if (control.stopping) return;
    recent = [...recent, Date.now()].filter((time) => Date.now() - time < WINDOW_MS);
    if (recent.length > mostRestarts) {
      say(`${label} ended ${recent.length} times within two minutes. Its last lines, from ${logFile(dataDir, name)}:\n${lastLines(dataDir, name)}`);
      return onGiveUp();
    }
    say(`${label} ended by itself (${how}). Starting it again.`);
    await sleep(Math.min(LONGEST_PAUSE_MS, 250 * 2 ** (recent.length - 1)));
    if (control.stopping) return;
    try {
      handle = await start();
    } catch (error) {
      if (control.stopping) return;
      say(error.message);
      handle = { exited: Promise.resolve("it did not start") };
    }
  }
}
