import { lstat, readdir, unlink } from "node:fs/promises";
import path from "node:path";
import { damagedDir, imagePath, reducedDir } from "./paths";
import { syncFolder } from "./write-once";

/** Every file that holds bytes of this image: itself, copies that were put aside as damaged, reduced copies of a photo. */
async function filesOf(dataDir: string, sha256: string): Promise<string[]> {
  const own = imagePath(dataDir, sha256);
  const beside = async (dir: string) => (await readdir(dir).catch(() => [] as string[])).filter((name) => name.startsWith(`${sha256}-`)).map((name) => path.join(dir, name));
  const isThere = await lstat(own).then(() => true, () => false);
  return [...(isThere ? [own] : []), ...(await beside(damagedDir(dataDir))), ...(await beside(reducedDir(dataDir, sha256)))];
}

/** Whether any bytes of it are left in the store. */
export async function liesStill(dataDir: string, sha256: string): Promise<boolean> {
  return (await filesOf(dataDir, sha256)).length > 0;
}

/**
 * Takes an erased image's files out of the store: the one place that does. Whoever calls it holds the image's row and has
 * seen there that it is erased. Calling it again does nothing; what is no plain file is left and throws.
 */
export async function removeImage(dataDir: string, sha256: string): Promise<number> {
  const files = await filesOf(dataDir, sha256);
  for (const file of files) {
    await unlink(file);
    await syncFolder(path.dirname(file));
  }
  return files.length;
}
