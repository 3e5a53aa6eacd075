import path from "node:path";

const DIGEST = /^[0-9a-f]{64}$/;

/** `images/sha256/ab/<64 hex digits>`: the name comes from the bytes alone, never from whoever sent them. */
export function imagePath(dataDir: string, sha256: string): string {
  if (!DIGEST.test(sha256)) throw new Error("not a SHA-256 in lower-case hex");
  return path.join(dataDir, "images", "sha256", sha256.slice(0, 2), sha256);
}

/** Where uploads grow; on the same file system as the images, so that a link moves them. */
export function incomingDir(dataDir: string): string {
  return path.join(dataDir, "images", "incoming");
}

/** What all images lie in. */
export function imagesDir(dataDir: string): string {
  return path.join(dataDir, "images", "sha256");
}

/** Where a damaged image goes when its right bytes take its place: put aside, never deleted. */
export function damagedDir(dataDir: string): string {
  return path.join(dataDir, "images", "damaged");
}

/** Where the copies of a photo lie, with those of others whose digest begins alike. */
export function reducedDir(dataDir: string, sha256: string): string {
  if (!DIGEST.test(sha256)) throw new Error("not a SHA-256 in lower-case hex");
  return path.join(dataDir, "reduced", sha256.slice(0, 2));
}
