import { countOf } from "./quantity";
import type { BoardRole, Stage } from "./words";

/** Names and plain texts of the case bundle: a BagIt bag, RFC 8493 (CUSTODY.md). Paths are relative to the bag. */

export function bagName(ref: string): string {
  return `twinread-${ref}`;
}

/** `n` counts the case's drives from 1. */
export function driveFolder(n: number): string {
  return `data/drives/${n}`;
}

/**
 * Letters, digits and hyphens stay; every other character becomes its code between underscores, so that "U/3" and
 * "U 3" never share a folder. Never fed with an uploader's file name.
 */
export function safeName(text: string): string {
  return text.replace(/[^A-Za-z0-9-]/gu, (character) => `_${(character.codePointAt(0) ?? 0).toString(16)}_`) || "_";
}

export interface ImagePlace {
  /** counts the case's drives from 1 */
  drive: number;
  /** "original", or the donor board's label such as "donor-1" */
  board: BoardRole | string;
  designator: string;
  stage: Stage;
  number: number;
}

/** "data/drives/1/original-U3/before-1.bin" */
export function imagePath({ drive, board, designator, stage, number }: ImagePlace): string {
  return `${driveFolder(drive)}/${safeName(board)}-${safeName(designator)}/${stage}-${number}.bin`;
}

export function bagitTxt(): string {
  return "BagIt-Version: 1.0\nTag-File-Character-Encoding: UTF-8\n";
}

/** `date` is YYYY-MM-DD; octets and files count the payload. */
export function bagInfoTxt({ date, ref, octets, files }: { date: string; ref: string; octets: number; files: number }): string {
  return `Bagging-Date: ${date}\nExternal-Identifier: ${ref}\nPayload-Oxum: ${octets}.${files}\n`;
}

/** Two spaces between digest and path: `sha256sum -c` reads the line as it is. Refuses a path that isn't ours. */
export function manifestLine(sha256: string, path: string): string {
  if (!/^[0-9a-f]{64}$/.test(sha256)) throw new RangeError("A manifest line needs 64 lower-case hex digits.");
  const parts = path.split("/");
  if (!/^[A-Za-z0-9._/-]+$/.test(path) || parts.some((part) => part === "" || part === "." || part === "..")) {
    throw new RangeError(`Not a path of this bundle: ${JSON.stringify(path)}`);
  }
  return `${sha256}  ${path}\n`;
}

export interface ReadmeFacts {
  ref: string;
  workshop: string;
  /** RFC 3339 UTC */
  madeAt: string;
  drives: number;
  images: number;
  twoPersonRule: boolean;
}

export function readmeTxt({ ref, workshop, madeAt, drives, images, twoPersonRule }: ReadmeFacts): string {
  return `Case ${ref}, ${workshop}
Made ${madeAt}

WHAT THIS IS
Everything that was kept of one case: ${countOf(images, "chip image")} of ${countOf(drives, "drive")}, as they
were read, the custody log of each drive, and what is needed to check both without
the program that made them. The folder is a BagIt bag (RFC 8493).

  data/case.json                the case as recorded
  data/report.pdf               the same for people
  data/drives/N/custody.jsonl   the custody log, one entry a line
  data/drives/N/custody.sig     for each line: key id, space, signature in base64
  data/drives/N/...             the images: before = of the original chip,
                                donor = the donor chip's own content,
                                after = read back after the write
  data/workshop-keys.jsonl      the entries that introduce the log's keys
  data/seal/                    where every log stood when this was made, signed

HOW TO CHECK IT
  sha256sum -c manifest-sha256.txt       each file is as it was packed
  sha256sum -c tagmanifest-sha256.txt    so are the lists themselves
  sh check.sh                            both, the logs, signatures and the seal
  sh check.sh KEY-FINGERPRINT            the same, and compares the key
Needed: a POSIX shell, sha256sum and OpenSSL 3. check.sh ends with 0 when all is in
order, 1 when something is not, 2 when it could not check. Take the key's fingerprint
from somewhere else than this bundle: a seal mail or the summary on paper.

THE LOG
Each line is one entry in canonical JSON (RFC 8785). "prev" is the SHA-256 of the line
before without its newline, 64 zeros in the first; "seq" counts up by one. Each entry
is signed with Ed25519 (RFC 8032) over "twinread-custody/1", a newline and the line.

WHAT IT DOES NOT SHOW
Equal reads show that the chip gave the same bytes each time, not that those bytes
are sound. Entries say what people recorded, and when it was recorded.
${twoPersonRule ? "Whoever took a read of a chip could not approve its image." : "The two-person rule was switched off: one person could read and approve."}
`;
}
