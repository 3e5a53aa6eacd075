import { configure, type Entry, type Reader, ZipReader } from "@zip.js/zip.js/lib/zip-core-custom.js";
import { type DirectoryEntry, headerFault, type ReadAt } from "./archive-headers";
import { type BagEntry, EntryFault } from "./bag";
import type { Fault } from "./report";

// nothing is loaded from elsewhere: no worker, no WebAssembly; deflated entries take the platform's own streams
configure({ useWebWorkers: false, chunkSize: 256 * 1024 });

/** What the archive's reader says, in words. */
const SENTENCE: Record<string, string> = {
  "Invalid CRC-32": "Its bytes are not those that were packed: its CRC-32 differs.",
  "Invalid uncompressed size": "It is not as large as the archive says.",
  "Local file header not found": "The archive's directory points to it, and it does not begin there.",
  "Entry data out of bounds": "The archive ends before it does.",
  "Overlapping entry found": "It lies over another file in the archive.",
  "Ambiguous archive": "The archive can be read in two ways: its directory and its files do not say the same.",
  "Compression method not supported": "It is packed in a way that this check doesn't know.",
  "Invalid compressed data": "Its packed bytes can't be unpacked.",
  "End of central directory not found": "It has no directory: it was cut short, or it is no ZIP archive.",
  "Central directory header not found": "Its directory can't be read.",
  "File format is not recognized": "It has no directory: it was cut short, or it is no ZIP archive.",
  "Split zip file": "It is one part of several.",
};

function wordsOf(error: unknown): string {
  const message = error instanceof Error ? error.message : String(error);
  return SENTENCE[message] ?? `It can't be read (${message}).`;
}

function reasonOf(error: unknown): string | undefined {
  const reason = error instanceof Error && "reason" in error ? (error.reason as { reason?: unknown } | string) : undefined;
  return typeof reason === "string" ? reason : typeof reason?.reason === "string" ? reason.reason : undefined;
}

async function* contentOf(entry: Entry, readAt: ReadAt): AsyncGenerator<Uint8Array> {
  if (entry.directory) return;
  const { readable, writable } = new TransformStream<Uint8Array, Uint8Array>();
  const whole = entry.getData(writable, { checkSignature: true, checkAmbiguity: true, checkOverlappingEntry: true }).then(() => null, (error: unknown) => ({ error }));
  // what goes wrong before the first byte never reaches the stream: it would be waited for without end
  const broken = whole.then((found) => found ?? new Promise<never>(() => {}));
  const reader = readable.getReader();
  try {
    for (;;) {
      const step = await Promise.race([reader.read(), broken]);
      if ("error" in step) throw step.error;
      if (step.done) break;
      yield step.value;
    }
    const late = await whole;
    if (late) throw late.error;
    const fault = await headerFault(directoryEntry(entry), readAt);
    if (fault !== null) throw new EntryFault(fault);
  } catch (error) {
    throw error instanceof EntryFault ? error : new EntryFault(wordsOf(error));
  } finally {
    reader.cancel().catch(() => {});
  }
}

function directoryEntry(entry: Entry): DirectoryEntry {
  return {
    offset: entry.offset ?? 0, rawBitFlag: entry.rawBitFlag ?? 0, crc32: entry.signature ?? 0, packedBytes: entry.compressedSize, sizeBytes: entry.uncompressedSize, zip64: entry.zip64 === true,
  };
}

function kindOf(entry: Entry): BagEntry["kind"] {
  const type = (entry.externalFileAttributes >>> 16) & 0xf000;
  if (type === 0xa000) return "link";
  if (entry.directory) return "folder";
  return type === 0 || type === 0x8000 ? "file" : "other";
}

/**
 * The entries of a ZIP archive, none of them opened yet. Whatever is off with the archive itself is a fault; an archive
 * that can't be read at all has no entries. Never throws on damaged bytes.
 */
export async function openArchive<T>(reader: Reader<T>): Promise<{ entries: BagEntry[]; faults: Fault[] }> {
  const faults: Fault[] = [];
  const readAt: ReadAt = (offset, length) => reader.readUint8Array(offset, length);
  for (const strictness of ["strict", "tolerant"] as const) {
    try {
      const found = await new ZipReader(reader, { strictness, filenameValidation: "tolerant", useWebWorkers: false }).getEntries();
      return { faults, entries: found.map((entry) => ({
        path: entry.filename, sizeBytes: entry.uncompressedSize, kind: kindOf(entry), encrypted: entry.encrypted, open: () => contentOf(entry, readAt),
      })) };
    } catch (error) {
      const reason = reasonOf(error);
      if (faults.length === 0) faults.push({ place: "The archive", sentence: wordsOf(error), ...(reason === undefined ? {} : { found: reason }) });
    }
  }
  return { entries: [], faults };
}
