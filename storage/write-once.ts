import { createHash, randomUUID } from "node:crypto";
import { constants } from "node:fs";
import { link, mkdir, open, rename, rm } from "node:fs/promises";
import path from "node:path";
import type { Readable } from "node:stream";
import CRC32 from "crc-32";
import { AppError } from "@/lib/errors";
import { checkImage } from "./local";
import { damagedDir, imagePath, incomingDir } from "./paths";

/** A file that has arrived whole but is not an image of the store yet. `sha256` lower-case hex, `crc32` unsigned. */
export interface Arrived {
  path: string;
  sizeBytes: number;
  sha256: string;
  crc32: number;
}

let arriving = 0;

/** How many files are on their way into the store. */
export function filesArriving(): number {
  return arriving;
}

/** Writes the stream to a new file and computes both digests on the way. On any error the file is removed. */
export async function receive(dataDir: string, stream: Readable): Promise<Arrived> {
  const dir = incomingDir(dataDir);
  await mkdir(dir, { recursive: true, mode: 0o700 });
  const target = path.join(dir, `${randomUUID()}.part`);
  const file = await open(target, constants.O_CREAT | constants.O_EXCL | constants.O_WRONLY, 0o440);
  const sha = createHash("sha256");
  let crc = 0;
  let sizeBytes = 0;
  arriving += 1;
  try {
    for await (const chunk of stream as AsyncIterable<Buffer>) {
      sha.update(chunk);
      crc = CRC32.buf(chunk, crc);
      sizeBytes += chunk.length;
      for (let at = 0; at < chunk.length;) at += (await file.write(chunk, at)).bytesWritten;
    }
    // A fault here means the kernel may have dropped what it promised: the file is thrown away, never retried.
    await file.sync();
    await file.close();
  } catch (error) {
    await file.close().catch(() => {});
    await rm(target, { force: true });
    throw noRoom(error);
  } finally {
    arriving -= 1;
  }
  return { path: target, sizeBytes, sha256: sha.digest("hex"), crc32: crc >>> 0 };
}

/**
 * Makes an arrived file an image of the store: linked under its digest without overwriting, folder synced, then the
 * row may follow. When the image is there already the stored bytes are checked, not trusted: damaged ones are put aside
 * and the arrived ones take their place. `damaged` is told before that happens.
 */
export async function keep(dataDir: string, arrived: Arrived, damaged?: () => Promise<void>): Promise<void> {
  const target = imagePath(dataDir, arrived.sha256);
  const dir = path.dirname(target);
  if (await mkdir(dir, { recursive: true, mode: 0o700 })) await syncFolder(path.dirname(dir));
  try {
    await link(arrived.path, target);
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code !== "EEXIST") throw noRoom(error);
    if ((await checkImage(dataDir, arrived.sha256, arrived.sizeBytes)) !== "sound") {
      await damaged?.();
      await takePlace(dataDir, arrived, target);
    }
  }
  await syncFolder(dir);
  await discard(arrived);
}

/** In this order the name is never without a file for longer than a rename takes, and nothing is ever deleted. */
async function takePlace(dataDir: string, arrived: Arrived, target: string): Promise<void> {
  const aside = damagedDir(dataDir);
  await mkdir(aside, { recursive: true, mode: 0o700 });
  const away = path.join(aside, `${arrived.sha256}-${new Date().toISOString().replace(/[:.]/g, "-")}-${randomUUID().slice(0, 8)}`);
  const next = path.join(incomingDir(dataDir), `${randomUUID()}.part`);
  try {
    await link(arrived.path, next);
    // a folder can't be linked; what is a link itself is linked, not followed
    await link(target, away).catch((error: NodeJS.ErrnoException) => (error.code === "ENOENT" ? undefined : rename(target, away)));
    await rename(next, target);
  } catch (error) {
    throw noRoom(error);
  } finally {
    await rm(next, { force: true });
  }
  await syncFolder(aside);
}

export async function discard(arrived: Pick<Arrived, "path">): Promise<void> {
  await rm(arrived.path, { force: true });
}

export async function syncFolder(dir: string): Promise<void> {
  const handle = await open(dir, "r");
  try {
    await handle.sync();
  } finally {
    await handle.close();
  }
}

function noRoom(error: unknown): unknown {
  const code = (error as NodeJS.ErrnoException).code;
  if (code === "ENOSPC" || code === "EDQUOT") {
    return new AppError("no-room", "The disk that holds the images is full. Nothing was stored; free some space and send again.");
  }
  return error;
}

