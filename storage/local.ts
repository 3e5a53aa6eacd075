import { createHash } from "node:crypto";
import { constants, createReadStream, type Stats } from "node:fs";
import { lstat, open, readdir, rm, stat, statfs } from "node:fs/promises";
import path from "node:path";
import { Readable } from "node:stream";
import { imagePath, imagesDir, incomingDir } from "./paths";

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
  return (await lookAtImage(dataDir, sha256, sizeBytes)).state;
}

/** What a whole reading of a stored image showed. */
export interface Look {
  state: ImageState;
  /** what is wrong, as the end of a sentence that begins with "It"; null when sound or missing */
  why: string | null;
  /** which file it was, at what time of its life: the same mark later means the same file, untouched in between */
  mark: string;
}

/** Faults of the machine, not of the image: nothing is known of it then. */
const NOT_THE_IMAGE = new Set(["EMFILE", "ENFILE", "ENOMEM", "EAGAIN"]);
const NOTHING_THERE = "none";

/**
 * The same with the reason. What stands in the image's place and is no plain file (a folder, a link) is damage; so is a
 * file that can't be read (EIO, EACCES). `passed` is told of each chunk's bytes and may hold the reading back.
 */
export async function lookAtImage(dataDir: string, sha256: string, sizeBytes: number, passed?: (bytes: number) => Promise<void>): Promise<Look> {
  const file = imagePath(dataDir, sha256);
  let mark = NOTHING_THERE;
  try {
    const found = await lstat(file);
    mark = markOf(found);
    if (!found.isFile()) return { state: "damaged", why: `is a ${found.isDirectory() ? "folder" : found.isSymbolicLink() ? "link to somewhere else" : "thing of another kind"}, not a file`, mark };
    if (found.size !== sizeBytes) return { state: "damaged", why: `is ${found.size.toLocaleString("en")} bytes long and should be ${sizeBytes.toLocaleString("en")}`, mark };
    return { ...(await digestLook(file, sha256, passed)), mark };
  } catch (error) {
    const { code } = error as NodeJS.ErrnoException;
    if (code === undefined || NOT_THE_IMAGE.has(code)) throw error;
    if (code === "ENOENT" || code === "ENOTDIR") return { state: "missing", why: null, mark };
    return { state: "damaged", why: `could not be read (${code})`, mark };
  }
}

async function digestLook(file: string, sha256: string, passed?: (bytes: number) => Promise<void>): Promise<Pick<Look, "state" | "why">> {
  const handle = await open(file, constants.O_RDONLY | constants.O_NOFOLLOW);
  const sha = createHash("sha256");
  try {
    for await (const chunk of handle.createReadStream({ highWaterMark: CHUNK, autoClose: false })) {
      sha.update(chunk as Buffer);
      await passed?.((chunk as Buffer).length);
    }
  } finally {
    await handle.close();
  }
  const digest = sha.digest("hex");
  return digest === sha256 ? { state: "sound", why: null } : { state: "damaged", why: `has the SHA-256 ${digest} now: its bytes were changed` };
}

const markOf = (found: Stats) => [found.dev, found.ino, found.size, found.mtimeMs, found.ctimeMs].join(":");

/** The mark of what lies under the image's name now; to be compared with the one of a look. */
export async function markOfImage(dataDir: string, sha256: string): Promise<string> {
  return lstat(imagePath(dataDir, sha256)).then(markOf, () => NOTHING_THERE);
}

const REMEMBERED_MS = 10_000;
/** a look at 64 MiB on a busy machine takes seconds: it holds so many times as long as it took */
const REMEMBERED_TIMES = 50;
const REMEMBERED = 500;
const remembered = new Map<string, { mark: string; until: number }>();
const looking = new Map<string, Promise<ImageState>>();

/**
 * Whether the image is sound now, for whoever opens it many times in a row: a look that found it sound holds for ten
 * seconds while the file stays untouched. What was read then is what the system holds in memory and gives out. Who asks
 * while it is being looked at waits for that look.
 */
export async function stateNow(dataDir: string, sha256: string, sizeBytes: number): Promise<ImageState> {
  const known = remembered.get(sha256);
  if (known && known.until > performance.now() && known.mark === (await markOfImage(dataDir, sha256))) return "sound";
  const begun = looking.get(sha256);
  if (begun) return begun;
  const look = lookAndRemember(dataDir, sha256, sizeBytes).finally(() => looking.delete(sha256));
  looking.set(sha256, look);
  return look;
}

async function lookAndRemember(dataDir: string, sha256: string, sizeBytes: number): Promise<ImageState> {
  const from = performance.now();
  const { state, mark } = await lookAtImage(dataDir, sha256, sizeBytes);
  remembered.delete(sha256);
  if (state !== "sound") return state;
  const now = performance.now();
  remembered.set(sha256, { mark, until: now + Math.max(REMEMBERED_MS, REMEMBERED_TIMES * (now - from)) });
  if (remembered.size > REMEMBERED) remembered.delete(remembered.keys().next().value!);
  return state;
}

/** False when the images as a whole are away (a disk that is not mounted): then no single image is to blame. */
export async function storeIsThere(dataDir: string): Promise<boolean> {
  const names = await readdir(imagesDir(dataDir)).catch(() => [] as string[]);
  return names.length > 0;
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
