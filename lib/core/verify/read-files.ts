import { joined } from "../bytes";
import { toHex } from "../digest";
import { type BagEntry, EntryFault } from "./bag";
import { NotVerified, type StepNotes } from "./report";
import type { VerifyTools } from "./tools";

/** A file that was read once, whole. */
export interface ReadFile {
  sha256: string;
  sizeBytes: number;
  /** the small files that the check looks into; null for images and all that only has a digest */
  bytes: Uint8Array | null;
}

export interface Reading {
  doneBytes: number;
  totalBytes: number;
  /** what is being read */
  path: string;
}

/** Lists and logs are held whole; above this a bundle is not one of ours. Bytes. */
const MOST_LOG_BYTES = 64 * 1_048_576;
const MOST_HELD_BYTES = 512 * 1_048_576;
const MOST_SMALL_BYTES = 32 * 1_048_576;

const LOOKED_INTO = /^([^/]+|data\/case\.json|data\/workshop-keys\.(jsonl|sig)|data\/drives\/[^/]+\/custody\.(jsonl|sig)|data\/seal\/[^/]+)$/;

function mostBytes(path: string): number {
  return path.endsWith("custody.jsonl") || path.endsWith("custody.sig") ? MOST_LOG_BYTES : MOST_SMALL_BYTES;
}

/** Reads every file once, in constant memory but for what the check looks into. Throws NotVerified, or what `signal` says. */
export async function readFiles(
  files: ReadonlyMap<string, BagEntry>, tools: VerifyTools, notes: StepNotes, onRead: (reading: Reading) => void, signal?: AbortSignal,
): Promise<Map<string, ReadFile>> {
  const totalBytes = [...files.values()].reduce((sum, entry) => sum + entry.sizeBytes, 0);
  const read = new Map<string, ReadFile>();
  let [doneBytes, held] = [0, 0];
  for (const [path, entry] of files) {
    const hash = tools.createSha256();
    const chunks: Uint8Array[] | null = LOOKED_INTO.test(path) ? [] : null;
    let sizeBytes = 0;
    try {
      for await (const chunk of entry.open()) {
        signal?.throwIfAborted();
        hash.update(chunk);
        sizeBytes += chunk.length;
        doneBytes += chunk.length;
        if (sizeBytes > entry.sizeBytes) throw new EntryFault("It is longer than it says of itself.");
        if (chunks) {
          held += chunk.length;
          if (sizeBytes > mostBytes(path) || held > MOST_HELD_BYTES) throw new NotVerified(`${path} is larger than this check can hold. Unpack the bundle and run its check.sh.`);
          chunks.push(chunk.slice());
        }
        onRead({ doneBytes, totalBytes, path });
      }
    } catch (error) {
      signal?.throwIfAborted();
      if (!(error instanceof EntryFault)) throw error;
      notes.fault(path, error.message);
    }
    read.set(path, { sha256: toHex(hash.digest()), sizeBytes, bytes: chunks && joined(chunks) });
  }
  return read;
}

/** UTF-8 to the letter; null for a file that isn't there or isn't text. */
export function textOf(files: ReadonlyMap<string, ReadFile>, path: string): string | null {
  const bytes = files.get(path)?.bytes;
  if (!bytes) return null;
  try {
    return new TextDecoder("utf-8", { fatal: true, ignoreBOM: true }).decode(bytes);
  } catch {
    return null;
  }
}
