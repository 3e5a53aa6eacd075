import { randomUUID } from "node:crypto";
import { mkdir, readFile, rename, rm, writeFile } from "node:fs/promises";
import path from "node:path";

const DIGEST = /^[0-9a-f]{64}$/;

/**
 * Copies of photos made for the screen: `reduced/ab/<digest of the original>-<edge>.jpg`. They are never evidence: made
 * again from the original whenever they are not there, so the whole folder may be deleted at any time.
 */
function reducedPath(dataDir: string, sha256: string, edge: number): string {
  if (!DIGEST.test(sha256)) throw new Error("not a SHA-256 in lower-case hex");
  return path.join(dataDir, "reduced", sha256.slice(0, 2), `${sha256}-${Math.trunc(edge)}.jpg`);
}

const JPEG_END = Buffer.from([0xff, 0xd9]);

/** The copy's bytes; null where there is none or only part of one. */
export async function readReduced(dataDir: string, sha256: string, edge: number): Promise<Buffer | null> {
  const bytes = await readFile(reducedPath(dataDir, sha256, edge)).catch(() => null);
  return bytes && bytes.length > 2 && bytes.subarray(-2).equals(JPEG_END) ? bytes : null;
}

/** Keeps a copy. Whether that works out decides nothing: the next one who asks makes it again. */
export async function writeReduced(dataDir: string, sha256: string, edge: number, bytes: Buffer): Promise<void> {
  const target = reducedPath(dataDir, sha256, edge);
  const next = `${target}.${randomUUID()}.part`;
  try {
    await mkdir(path.dirname(target), { recursive: true, mode: 0o700 });
    await writeFile(next, bytes, { mode: 0o600 });
    await rename(next, target);
  } catch {
    await rm(next, { force: true }).catch(() => undefined);
  }
}
