import { readFileSync } from "node:fs";

/** When the process began, in clock ticks since boot (proc(5), field 22): tells a process from a later one with its number. */
export function startTicks(pid) {
  try {
    const stat = readFileSync(`/proc/${pid}/stat`, "utf8");
    return stat.slice(stat.lastIndexOf(")") + 2).split(" ")[19];
  } catch {
    return null;
  }
}

function isZombie(pid) {
  try {
    const stat = readFileSync(`/proc/${pid}/stat`, "utf8");
    return stat.slice(stat.lastIndexOf(")") + 2).startsWith("Z");
  } catch {
    return false;
  }
}

export const ownMark = () => ({ pid: process.pid, ticks: startTicks(process.pid) });

/** True when the very process of the mark still runs. */
export function isAlive(mark) {
  if (!mark || !Number.isInteger(mark.pid) || mark.pid <= 1) return false;
  try {
    process.kill(mark.pid, 0);
  } catch (error) {
    if (error.code !== "EPERM") return false;
  }
  if (isZombie(mark.pid)) return false;
  const ticks = startTicks(mark.pid);
  return !mark.ticks || !ticks || mark.ticks === ticks;
}

export const sleep = (ms) => new Promise((done) => setTimeout(done, ms));

/** Asks the process to end and waits; kills it only when `killAfterMs` is given and has passed. Resolves to whether it ended. */
export async function endProcess(mark, { waitMs, killAfterMs = Infinity }) {
  if (!isAlive(mark)) return true;
  process.kill(mark.pid, "SIGTERM");
  const began = Date.now();
  let killed = false;
  while (Date.now() - began < waitMs) {
    await sleep(50);
    if (!isAlive(mark)) return true;
    if (!killed && Date.now() - began > killAfterMs) {
      process.kill(mark.pid, "SIGKILL");
      killed = true;
    }
  }
  return !isAlive(mark);
}
