import type { LogEntry } from "./log";

/** Digests of the images that the log says were erased, where that is its last word on them: one was stored again since, and has to be there. */
export function erasedIn(entries: readonly LogEntry[]): Set<string> {
  const erased = new Set<string>();
  for (const { action, facts } of entries) {
    if (typeof facts.sha256 !== "string") continue;
    if (action === "image.erased") erased.add(facts.sha256);
    else if (action === "image.found-sound") erased.delete(facts.sha256);
  }
  return erased;
}
