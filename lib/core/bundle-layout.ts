import { countOf } from "./quantity";
import type { BoardRole, Stage } from "./words";

/** Names and plain texts of the case bundle: a BagIt bag, RFC 8493 (CUSTODY.md). Paths are relative to the bag. */

export function bagName(ref: string): string {
  return `twinread-${ref}`;
}

export const MANIFEST = "manifest-sha256.txt";
export const TAG_MANIFEST = "tagmanifest-sha256.txt";
/** raw Ed25519 signature by the log key over the tag manifest's bytes */
export const TAG_SIGNATURE = "tagmanifest-sha256.sig";
export const CASE_JSON = "data/case.json";
export const REPORT_PDF = "data/report.pdf";
export const WORKSHOP_KEYS = "data/workshop-keys";
export const LOG_KEY = "data/seal/log-key.pem";
/** the seal that was made when the bundle was started: its text, its raw Ed25519 signature, the key that signed it */
export const SEAL_TEXT = "data/seal/seal.txt";
export const SEAL_SIGNATURE = "data/seal/seal.sig";
export const SEAL_KEY = "data/seal/seal-key.pem";
/** canonical JSON of lib/core/seal.ts SealProof, one proof a drive in the order of their numbers, no newline at its end */
export const SEAL_PROOF = "data/seal/proof.json";

/** `n` counts the case's drives from 1. */
export function driveFolder(n: number): string {
  return `data/drives/${n}`;
}

/** Without its ending: ".jsonl" holds the entries, ".sig" their signatures. */
export function custodyPath(n: number): string {
  return `${driveFolder(n)}/custody`;
}

/** A line of custody.sig: key id, space, signature in base64. */
export function signatureLine(keyId: string, base64: string): string {
  return `${keyId} ${base64}\n`;
}

/**
 * Letters, digits and hyphens stay; every other character becomes its code between underscores, so that "U/3" and
 * "U 3" never share a folder. Never fed with an uploader's file name.
 */
export function safeName(text: string): string {
  return text.replace(/[^A-Za-z0-9-]/gu, (character) => `_${(character.codePointAt(0) ?? 0).toString(16)}_`) || "_";
}

/** A drive has one original board; its donors are counted in the order in which they were recorded, from 1. */
export function boardLabel(role: BoardRole, number: number): string {
  return role === "original" ? "original" : `donor-${number}`;
}

export interface ChipPlace {
  /** counts the case's drives from 1 */
  drive: number;
  /** "original", or the donor board's label such as "donor-1" */
  board: BoardRole | string;
  designator: string;
}

export function chipFolder({ drive, board, designator }: ChipPlace): string {
  return `${driveFolder(drive)}/${safeName(board)}-${safeName(designator)}`;
}

export interface ImagePlace extends ChipPlace {
  stage: Stage;
  number: number;
}

/** "data/drives/1/original-U3/before-1.bin" */
export function imagePath(place: ImagePlace): string {
  return `${chipFolder(place)}/${place.stage}-${place.number}.bin`;
}

/** Photos and documents of the case itself: "data/photos/case-1.jpg". */
export function casePhotoPath(number: number, ending: string): string {
  return `data/photos/case-${number}.${ending}`;
}

/** "data/drives/1/photos/drive-1.jpg", "…/original-2.png", "…/original.U12-1.jpg": `place` leads from the drive to the thing. */
export function drivePhotoPath(drive: number, place: readonly string[], number: number, ending: string): string {
  return `${driveFolder(drive)}/photos/${place.map(safeName).join(".")}-${number}.${ending}`;
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
  /** paths of images that are composites */
  composites: readonly string[];
  /** number of the seal that was made when the bundle was started */
  seal: number;
  /** how many files of the case were erased before: images of reads and what is kept beside them, photos */
  erased?: number;
}

/** What lies beside the image of a composite: who voted what. Instead of the image's ".bin". */
export const VOTES_ENDING = "-votes.json";
/** the same for programs that speak the W3C's PROV-JSON: what the composite was made from */
export const PROVENANCE_ENDING = "-prov.json";

/** The composites among a bundle's paths: an image with votes beside it. */
export function compositePaths(paths: readonly string[]): string[] {
  return paths.filter((path) => path.endsWith(VOTES_ENDING)).map((path) => `${path.slice(0, -VOTES_ENDING.length)}.bin`);
}

function compositeText(paths: readonly string[]): string {
  if (paths.length === 0) return "";
  return `
COMPOSITES
${paths.length === 1 ? "One image here was never read as a whole" : `${paths.length} images here were never read as a whole`}:
${paths.map((path) => `  ${path}`).join("\n")}
${paths.length === 1 ? "It was" : "Each was"} put together from several reads that differed: each bit is what most of
them say. The file beside it that ends in ${VOTES_ENDING} tells who voted what for each
byte, the one that ends in ${PROVENANCE_ENDING} what it was made from (W3C PROV-JSON); the log says who made it, who approved it and why. A majority shows what
repeats, not what is true.
`;
}

function erasedText(erased: number): string {
  if (erased === 0) return "";
  return `
ERASED
${erased === 1 ? "One file of this case was" : `${erased} files of this case were`} erased before this bundle was made: no longer stored, so
not here. The log says of each when, by whom and why (image.erased), data/case.json
names ${erased === 1 ? "it" : "them"} with size and digest, and check.sh misses none that the log does not tell of.
`;
}

export function readmeTxt({ ref, workshop, madeAt, drives, images, twoPersonRule, composites, seal, erased = 0 }: ReadmeFacts): string {
  return `Case ${ref}, ${workshop}
Made ${madeAt}

WHAT THIS IS
Everything that was kept of one case: ${countOf(images, "chip image")} of ${countOf(drives, "drive")}, as they
were read, the custody log of each drive, and what is needed to check both without
the program that made them. The folder is a BagIt bag (RFC 8493).
${compositeText(composites)}${erasedText(erased)}
  data/case.json                the case as recorded, original file names included
  data/report.pdf               the case for reading: people, boards, chips, every read
                                with digests and findings, approvals, transfers, log
  data/drives/N/custody.jsonl   the custody log, one entry a line
  data/drives/N/custody.sig     for each line: key id, space, signature in base64
  data/drives/N/...             the images: before = of the original chip,
                                donor = the donor chip's own content,
                                after = read back after the transfer
  data/drives/N/photos/         photos and documents of the drive, its boards and chips,
                                as they came; data/photos/ holds those of the case
  data/workshop-keys.jsonl      the entries that introduce the log's keys
  data/workshop-keys.sig        their signatures
  data/seal/log-key.pem         the public key that signs the log and this bundle
  data/seal/seal.txt, seal.sig  seal ${seal} and its signature; seal-key.pem is its key
  data/seal/proof.json          the way from each drive's log to the root in the seal

HOW TO CHECK IT
  sh check.sh                    everything below, and prints what it checked
  sh check.sh KEY-FINGERPRINT    the same, and compares the log's or the seal's key
It needs a POSIX shell, sha256sum, OpenSSL 3 and standard tools, and ends with 0 when
all is in order, 1 when something is not, 2 when it could not check. Take the
fingerprint from somewhere else than this bundle: the mail with the summary has it.
The page /verify of any Twinread checks the same in your browser and sends nothing.
A forger could change check.sh as well; by hand, without it:
  sha256sum -c manifest-sha256.txt       each file of the case is as it was packed
  sha256sum -c tagmanifest-sha256.txt    so are the lists and this page
  openssl pkeyutl -verify -pubin -inkey data/seal/log-key.pem -rawin \\
    -in tagmanifest-sha256.txt -sigfile tagmanifest-sha256.sig
  openssl pkey -pubin -in data/seal/log-key.pem -outform DER | sha256sum
  openssl pkeyutl -verify -pubin -inkey data/seal/seal-key.pem -rawin \\
    -in data/seal/seal.txt -sigfile data/seal/seal.sig
The one with "sha256sum" at its end prints the key's fingerprint, which is also its
key id; with seal-key.pem it prints that of the seal's key.

THE LOG
Each line is one entry in canonical JSON (RFC 8785). "prev" is the SHA-256 of the line
before without its newline, 64 zeros in the first; "seq" counts up by one. Each entry
is signed with Ed25519 (RFC 8032) over "twinread-custody/1", a newline and the line.
It ends with the entry that says that this bundle was started. Compare its last number
and hash with those in the mail: an earlier head must stand further up in the log.

THE SEAL
A signed statement of where all logs of the workshop stood when this bundle was
started: number, time, number of logs, Merkle root (RFC 9162), SHA-256 of the seal
before. A leaf of the tree is the SHA-256 of a zero byte and {"drive","head","seq"} in
canonical JSON, a node that of a byte 1 and the two below it. "head" and "seq" are
the SHA-256 and number of the last line of custody.jsonl; "path" in proof.json leads
from there to the root. Later seals and mails name this one: a workshop that rewrites
a log would have to take back every seal that has left the house.

WHAT IT DOES NOT SHOW
Equal reads show that the chip gave the same bytes each time, not that those bytes
are sound. Entries say what people recorded, and when it was recorded.
${twoPersonRule ? "Whoever took a read of a chip could not approve its image." : "The two-person rule was switched off: one person could read and approve."}
`;
}
