import { custodyPath, driveFolder } from "../bundle-layout";
import type { Files } from "./lists";
import type { LogEntry } from "./log";
import type { StepNotes } from "./report";

/** What lies in a drive's folder is told in its own log; photos of the case and of a shelf board stand in others. */
const OF_DRIVE = ["drive", "board", "chip"];
const FROM_SHELF = /\.shelf-\d+\.[a-z]+$/;

const text = (value: unknown) => (typeof value === "string" ? value : "");

/** Each photo that the log tells of is there, but for those that it says were lost or erased, and each that is there is told of. Gives their number. */
export function comparePhotos(files: Files, drive: number, entries: readonly LogEntry[], erased: ReadonlySet<string>, notes: StepNotes): number {
  const kept = new Map<string, string[]>();
  for (const [path, { sha256 }] of files) {
    if (path.startsWith(`${driveFolder(drive)}/photos/`) && !FROM_SHELF.test(path)) kept.set(sha256, [...(kept.get(sha256) ?? []), path]);
  }
  const lost = new Set(entries.filter(({ action }) => action === "image.found-damaged").map(({ facts }) => text(facts.sha256)));
  const told = entries.filter(({ action, facts }) => action === "photo.added" && OF_DRIVE.includes(text((facts.of as { type?: unknown } | null | undefined)?.type)));
  for (const { seq, facts } of told) {
    const sha256 = text(facts.sha256);
    const here = kept.get(sha256);
    if (here?.length) here.pop();
    else if (!lost.has(sha256) && !erased.has(sha256)) notes.fault(`${custodyPath(drive)}.jsonl, entry ${seq}`, "It names a photo, and the bundle does not hold it.", sha256);
  }
  for (const [sha256, paths] of kept) for (const path of paths) notes.fault(path, "The drive's custody log does not name this photo.", undefined, sha256);
  return told.length;
}
