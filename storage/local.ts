import { createHash } from "node:crypto";
import { createReadStream } from "node:fs";
import { open, readdir, rm, stat, statfs } from "node:fs/promises";
import path from "node:path";
import { Readable } from "node:stream";
import { imagePath, incomingDir } from "./paths";

const CHUNK = 1024 * 1024;

export type ImageState = "sound" | "damaged" | "missing";

/** The image's bytes in chunks of 1 MiB, unchecked: for judging and comparing right after `checkImage` or an upload. */
export async function* imageChunks(dataDir: string, sha256: string): AsyncGenerator<Buffer> {
  const file = await open(imagePath(dataDir, sha256), "r");
  try {
    for (;;) {
      const buffer = Buffer.allocUnsafe(CHUNK);
      let filled = 0;
      while (filled < CHUNK) {
        const { bytesRead } = await file.read(buffer, filled, CHUNK - filled);
        if (bytesRead === 0) break;
        filled += bytesRead;
      }
      if (filled > 0) yield buffer.subarray(0, filled);
      if (filled < CHUNK) return;
    }
  } finally {
    await file.close();
  }
}

/** At most `length` bytes from `offset`. */
export async function imageWindow(dataDir: string, sha256: string, offset: number, length: number): Promise<Buffer> {
  const file = await open(imagePath(dataDir, sha256), "r");
  try {
    const buffer = Buffer.alloc(length);
    const { bytesRead } = await file.read(buffer, 0, length, offset);
    return buffer.subarray(0, bytesRead);
  } finally {
    await file.close();
  }
}

/** Reads the whole stored image and compares it with its name. It reports; it never repairs. */
export async function checkImage(dataDir: string, sha256: string, sizeBytes: number): Promise<ImageState> {
  const file = imagePath(dataDir, sha256);
  try {
    const found = await stat(file);
    if (!found.isFile()) return "missing";
    if (found.size !== sizeBytes) return "damaged";
    const sha = createHash("sha256");
    for await (const chunk of createReadStream(file, { highWaterMark: CHUNK })) sha.update(chunk as Buffer);
    return sha.digest("hex") === sha256 ? "sound" : "damaged";
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code === "ENOENT") return "missing";
    return "damaged";
  }
}

/**
 * The image as a stream that is checked while it flows: on a mismatch the stream breaks with an error before its end,
 * so that the receiver never sees a whole wrong file.
 */
export function verifiedStream(dataDir: string, sha256: string): Readable {
  async function* flow(): AsyncGenerator<Buffer> {
    const sha = createHash("sha256");
    let held: Buffer | null = null;
    for await (const chunk of createReadStream(imagePath(dataDir, sha256), { highWaterMark: 256 * 1024 })) {
      sha.update(chunk as Buffer);
      // the last chunk is held back until the digest is known
      if (held) yield held;
      held = chunk as Buffer;
    }
    if (sha.digest("hex") !== sha256) throw new Error(`stored image ${sha256} does not match its digest`);
    if (held) yield held;
  }
  return Readable.from(flow(), { objectMode: false });
}

/** Bytes free on the disk that holds the images. */
export async function freeBytes(dataDir: string): Promise<number> {
  const stats = await statfs(dataDir);
  return stats.bavail * stats.bsize;
}

/** Removes what uploads left behind when the server died; only files that no living upload can still be writing. */
export async function clearIncoming(dataDir: string, olderThanMs: number): Promise<number> {
  const dir = incomingDir(dataDir);
  let removed = 0;
  for (const name of await readdir(dir).catch(() => [] as string[])) {
    const file = path.join(dir, name);
    const found = await stat(file).catch(() => null);
    if (found && Date.now() - found.mtimeMs > olderThanMs) {
      await rm(file, { force: true });
      removed += 1;
    }
  }
  return removed;
}
