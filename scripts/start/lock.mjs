import { linkSync, mkdirSync, readFileSync, renameSync, rmSync, writeFileSync } from "node:fs";
import path from "node:path";
import { isAlive, ownMark } from "./process-id.mjs";
import { Refusal } from "./say.mjs";

/** Who holds the lock, or null when nobody living does. */
export function lockHolder(file) {
  try {
    const mark = JSON.parse(readFileSync(file, "utf8"));
    return isAlive(mark) ? mark : null;
  } catch {
    return null;
  }
}

/**
 * Takes a lock file for this process; throws a Refusal with `sentence(holder)` when a living process has it.
 * A file left by a process that is gone is taken over. Gives back the function that releases the lock.
 */
export function takeLock(file, sentence) {
  mkdirSync(path.dirname(file), { recursive: true });
  const draft = `${file}.${process.pid}`;
  writeFileSync(draft, JSON.stringify(ownMark()), { mode: 0o600 });
  try {
    for (let attempt = 0; attempt < 5; attempt += 1) {
      try {
        // a link never replaces a file, so only one process can win
        linkSync(draft, file);
        return () => release(file);
      } catch (error) {
        if (error.code !== "EEXIST") throw error;
      }
      const holder = lockHolder(file);
      if (holder) throw new Refusal(sentence(holder));
      clearStale(file);
    }
    throw new Refusal(`${file} keeps changing hands. Wait until the other start is over, then try again.`);
  } finally {
    rmSync(draft, { force: true });
  }
}

/** Moves the stale lock away first: if a living process took it in between, it gets it back. */
function clearStale(file) {
  const away = `${file}.${process.pid}.stale`;
  try {
    renameSync(file, away);
  } catch {
    return;
  }
  if (lockHolder(away)) {
    try {
      linkSync(away, file);
    } catch {
      // a third process has it by now: the next attempt sees it
    }
  }
  rmSync(away, { force: true });
}

function release(file) {
  if (lockHolder(file)?.pid === process.pid) rmSync(file, { force: true });
}
