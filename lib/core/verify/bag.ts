import { MANIFEST } from "../bundle-layout";
import type { StepNotes } from "./report";

/** One thing in an archive or folder, as it calls itself. Hostile input. */
export interface BagEntry {
  /** as written, with the folder around everything */
  path: string;
  sizeBytes: number;
  kind: "file" | "folder" | "link" | "other";
  encrypted?: boolean;
  /** Throws an EntryFault where the bytes are not those that were packed. */
  open(): AsyncIterable<Uint8Array>;
}

/** Why an entry's bytes can't be believed; the message is a sentence. */
export class EntryFault extends Error {
  override name = "EntryFault";
}

export const MOST_ENTRIES = 100_000;
const MOST_PATH = 512;
const FETCH = "fetch.txt";

/** Why a path can't be one of a bundle's; null when it can. */
export function pathFault(path: string): string | null {
  if (path.includes("\\")) return "Its name holds a backslash, which some machines take for a folder.";
  if (path.startsWith("/") || /^[A-Za-z]:/.test(path)) return "Its name begins at the root of a disk: unpacking could write there.";
  const parts = path.split("/");
  if (parts.includes("..")) return "Its name leads out of the bundle.";
  if (parts.includes(".") || parts.includes("")) return "Its name has an empty part or a dot in place of a folder.";
  if (path.length > MOST_PATH) return "Its name is longer than any in a bundle.";
  if (!/^[A-Za-z0-9._/-]+$/.test(path)) return "Its name holds a character that no name in a bundle has.";
  if (parts.some((part) => part.endsWith("."))) return "A part of its name ends in a dot, which some machines leave out.";
  return null;
}

/** The bundle's files by their path below its one folder; what has no place there is noted and never opened. */
export function layOut(entries: readonly BagEntry[], notes: StepNotes): { folder: string; files: Map<string, BagEntry> } {
  const files = new Map<string, BagEntry>();
  const folder = folderOf(entries);
  const below = (path: string) => (path.startsWith(`${folder}/`) ? path.slice(folder.length + 1) : path);
  const spelled = new Map<string, string>();
  for (const entry of entries) {
    const path = entry.kind === "folder" ? entry.path.replace(/\/$/, "") : entry.path;
    const wrong = pathFault(path);
    if (wrong !== null) {
      notes.fault(below(entry.path), wrong);
      continue;
    }
    if (path !== folder && !path.startsWith(`${folder}/`)) {
      notes.fault(path, "It lies outside the bundle's folder.", `something in ${folder}`);
      continue;
    }
    const twin = spelled.get(path.toLowerCase());
    if (twin !== undefined) {
      notes.fault(below(path), twin === path ? "It is there twice: which one is read depends on the program." : "Two names differ only in capitals: on some machines one replaces the other.", "one of each name", below(twin));
      if (twin === path) continue;
    }
    spelled.set(path.toLowerCase(), path);
    if (entry.kind === "link") notes.fault(below(path), "It is a link and not a file.");
    else if (entry.kind === "other") notes.fault(below(path), "It is neither file nor folder.");
    else if (entry.kind === "folder") continue;
    else if (path === folder) notes.fault(path, "It is a file where the bundle's folder should be.");
    else if (entry.encrypted) notes.fault(below(path), "It is locked with a password, so it can't be checked.");
    else if (path === `${folder}/${FETCH}`) notes.fault(below(path), "The bundle is not self-contained: this list names files that lie elsewhere.");
    else files.set(path.slice(folder.length + 1), entry);
  }
  if (!files.has("bagit.txt") && !files.has(MANIFEST)) notes.fault("The whole", "It is no case bundle: neither bagit.txt nor a list of files is in it.");
  return { folder, files };
}

/** The folder that holds bagit.txt, else the one that comes first. */
function folderOf(entries: readonly BagEntry[]): string {
  const named = entries.find((entry) => /^[^/\\]+\/bagit\.txt$/.test(entry.path)) ?? entries.find((entry) => /^[^/\\]+\//.test(entry.path));
  return named?.path.split("/")[0] ?? "";
}
