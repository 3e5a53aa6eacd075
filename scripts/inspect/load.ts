import { createHash } from "node:crypto";
import { closeSync, fstatSync, openSync, readFileSync } from "node:fs";
import path from "node:path";
import { crc32 } from "node:zlib";
import { crc32Hex } from "@/lib/core/digest";
import { countOf, listText, sizeText } from "@/lib/core/quantity";
import { addressesOf, FormatError, MAX_EXPANDED_BYTES, toImage } from "@/lib/core/text-format";
import { NotInspected, type Asked } from "./arguments";

export interface LoadedRead {
  /** as named by the command */
  file: string;
  fileName: string;
  modifiedAt: string;
  /** of the image, also where it came as a text */
  bytes: Uint8Array;
  sha256: string;
  crc32: string;
  /** how a text became an image; null for a raw one */
  converted: string | null;
}

/** Hexadecimal digits take two, and a line of 16 bytes some 45 characters. */
const MAX_TEXT_BYTES = 6 * MAX_EXPANDED_BYTES;

const REASON: Record<string, string> = {
  ENOENT: "there is no such file", EACCES: "it may not be read by you", EISDIR: "it is a folder", ENOTDIR: "there is no such file",
};

function contentOf(file: string, most: number): { content: Uint8Array; modifiedAt: string } {
  let handle: number | null = null;
  try {
    handle = openSync(file, "r");
    const facts = fstatSync(handle);
    if (!facts.isFile()) throw new NotInspected(`${file}: it is no file. Name the image's file itself.`);
    if (facts.size > most) throw new NotInspected(`${file}: ${countOf(facts.size, "byte")}, more than any chip's image here (${sizeText(MAX_EXPANDED_BYTES)}). Check that it is a read of one chip.`);
    return { content: readFileSync(handle), modifiedAt: facts.mtime.toISOString() };
  } catch (error) {
    if (error instanceof NotInspected || !(error instanceof Error)) throw error;
    const code = "code" in error ? String(error.code) : error.message;
    throw new NotInspected(`${file}: ${REASON[code] ?? `it can't be read (${code})`}. Check the name and try again.`);
  } finally {
    if (handle !== null) closeSync(handle);
  }
}

function imageOf(file: string, content: Uint8Array, { format, base, fill, size }: Asked): { bytes: Uint8Array; converted: string | null } {
  if (format === "raw") return { bytes: content, converted: null };
  try {
    const span = addressesOf(format, content);
    if (span === null) throw new NotInspected(`${file}: the text gives no byte at all. Save it again.`);
    const { bytes, records, gapBytes, repeats } = toImage(format, content, { base, fill, size: size ?? span.last + 1 - base });
    const parts = [`${countOf(records, "record")} of ${format}`, `base 0x${base.toString(16).toUpperCase()}`, `${countOf(gapBytes, "byte")} left out and taken as ${fill.toString(16).toUpperCase().padStart(2, "0")}`];
    if (repeats > 0) parts.push(`${countOf(repeats, "byte")} given twice`);
    return { bytes, converted: listText(parts) };
  } catch (error) {
    if (!(error instanceof FormatError)) throw error;
    throw new NotInspected(`${file}: ${error.message}`);
  }
}

/** Files one by one; equal images share their bytes. Throws NotInspected. */
export function loadReads(asked: Asked): LoadedRead[] {
  const seen = new Map<string, Uint8Array>();
  return asked.files.map((file) => {
    const { content, modifiedAt } = contentOf(file, asked.format === "raw" ? MAX_EXPANDED_BYTES : MAX_TEXT_BYTES);
    if (content.length === 0) throw new NotInspected(`${file}: it is empty. Read the chip again.`);
    const { bytes, converted } = imageOf(file, content, asked);
    const sha256 = createHash("sha256").update(bytes).digest("hex");
    const known = seen.get(sha256) ?? bytes;
    seen.set(sha256, known);
    return { file, fileName: path.basename(file), modifiedAt, bytes: known, sha256, crc32: crc32Hex(crc32(bytes)), converted };
  });
}
