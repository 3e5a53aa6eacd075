import { createReadStream, lstatSync, readdirSync, type Stats } from "node:fs";
import { type FileHandle, open } from "node:fs/promises";
import path from "node:path";
import { Reader } from "@zip.js/zip.js/lib/zip-core-custom.js";
import { openArchive } from "@/lib/core/verify/archive";
import { type BagEntry, EntryFault, MOST_ENTRIES } from "@/lib/core/verify/bag";
import { type Fault, NotVerified } from "@/lib/core/verify/report";

export interface BundleSource {
  source: "archive" | "folder";
  entries: BagEntry[];
  archiveFaults: Fault[];
  close(): Promise<void>;
}

/** A file read in pieces, where the archive's reader asks for them. */
class FileReader extends Reader<FileHandle> {
  constructor(private readonly file: FileHandle, public override size: number) {
    super(file);
  }

  override async readUint8Array(index: number, length: number): Promise<Uint8Array> {
    const bytes = new Uint8Array(Math.max(0, Math.min(length, this.size - index)));
    const { bytesRead } = await this.file.read(bytes, 0, bytes.length, index);
    return bytes.subarray(0, bytesRead);
  }
}

const REASON: Record<string, string> = { ENOENT: "there is no such file", EACCES: "it may not be read by you", ENOTDIR: "there is no such file" };

/** Throws NotVerified where there is nothing to read. */
function factsOf(name: string): Stats {
  try {
    return lstatSync(name);
  } catch (error) {
    const code = error instanceof Error && "code" in error ? String(error.code) : String(error);
    throw new NotVerified(`${name}: ${REASON[code] ?? `it can't be read (${code})`}. Check the name and try again.`);
  }
}

export async function openBundle(name: string): Promise<BundleSource> {
  const facts = factsOf(name);
  if (facts.isDirectory()) return { source: "folder", entries: entriesBelow(name), archiveFaults: [], close: () => Promise.resolve() };
  if (!facts.isFile()) throw new NotVerified(`${name}: it is neither file nor folder. Name the bundle's .zip or the folder it was unpacked to.`);
  const file = await open(name, "r").catch((error: NodeJS.ErrnoException) => {
    throw new NotVerified(`${name}: ${REASON[error.code ?? ""] ?? error.message}. Check the name and try again.`);
  });
  const head = new Uint8Array(4);
  await file.read(head, 0, 4, 0);
  const { entries, faults } = await openArchive(new FileReader(file, facts.size));
  // with neither a first header nor a directory it was never an archive
  if (entries.length === 0 && !(head[0] === 0x50 && head[1] === 0x4b)) {
    await file.close();
    throw new NotVerified(`${name}: it is no ZIP archive. Name the bundle's .zip or the folder it was unpacked to.`);
  }
  return { source: "archive", entries, archiveFaults: faults, close: () => file.close() };
}

/** Whatever the folder is called, the check sees one folder around everything. */
const FOLDER = "bundle";

function entriesBelow(root: string): BagEntry[] {
  const entries: BagEntry[] = [];
  const walk = (below: string): void => {
    for (const one of readdirSync(path.join(root, below), { withFileTypes: true })) {
      const inside = below === "" ? one.name : `${below}/${one.name}`;
      if (entries.length > MOST_ENTRIES) throw new NotVerified(`${root}: it holds more than ${MOST_ENTRIES} files, more than any bundle.`);
      const kind = one.isFile() ? "file" : one.isDirectory() ? "folder" : one.isSymbolicLink() ? "link" : "other";
      const file = path.join(root, inside);
      entries.push({ path: `${FOLDER}/${inside}`, sizeBytes: kind === "file" ? lstatSync(file).size : 0, kind, open: () => bytesOf(file) });
      if (kind === "folder") walk(inside);
    }
  };
  walk("");
  return entries.sort((a, b) => (a.path < b.path ? -1 : 1));
}

async function* bytesOf(file: string): AsyncGenerator<Uint8Array> {
  try {
    for await (const chunk of createReadStream(file, { highWaterMark: 1_048_576 })) yield chunk as Buffer;
  } catch (error) {
    throw new EntryFault(`It can't be read (${error instanceof Error ? error.message : String(error)}).`);
  }
}
