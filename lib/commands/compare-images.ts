import { turnCause } from "@/lib/core/diagnose-pair";
import { ENGINE_VERSION } from "@/lib/core/engine-version";
import { engine } from "@/lib/engine/pool";
import type { Compared } from "@/lib/engine/worker";
import { ComparisonRow, type Transaction } from "@/models";
import { pathOfImage } from "@/storage";
import { ImageNotSound, requireSoundNow } from "./require-sound-now";

export type { Compared } from "@/lib/engine/worker";

export interface ImageRef {
  sha256: string;
  sizeBytes: number;
}

/**
 * Byte by byte from `a` to `b` with one primary cause; computed once per pair of digests and engine version, then kept.
 * The cause of different lengths hangs on the chip's size as well. Inside a transaction `tx` must be given: who holds a
 * chain's lock and asks for a second connection waits for those who wait for the lock.
 */
export async function compareImages(a: ImageRef, b: ImageRef, tx?: Transaction, chipBytes = Math.max(a.sizeBytes, b.sizeBytes)): Promise<Compared> {
  // one result serves both directions; of two sizes each direction is kept for itself, its counts can't be turned
  if (isTurned(a, b)) return turned(await compareImages(b, a, tx, chipBytes));
  const known = await comparisonOnRecord(a, b, tx, chipBytes);
  if (known) return known;
  await requireSoundNow([a, b], "comparison", tx);
  const made = await engine("compare", { fileA: pathOfImage(a.sha256), fileB: pathOfImage(b.sha256), chipBytes });
  await ComparisonRow.bulkCreate([{ ...keyOf(a, b, chipBytes), result: JSON.stringify(made) }], { ignoreDuplicates: true, transaction: tx });
  return made;
}

const isTurned = (a: ImageRef, b: ImageRef) => a.sizeBytes === b.sizeBytes && a.sha256 > b.sha256;

function keyOf(a: ImageRef, b: ImageRef, chipBytes: number) {
  const engineVersion = a.sizeBytes === b.sizeBytes ? ENGINE_VERSION : `${ENGINE_VERSION}:${chipBytes}`;
  return { sha256A: Buffer.from(a.sha256, "hex"), sha256B: Buffer.from(b.sha256, "hex"), engineVersion };
}

/** A comparison that was made before, or null: nothing is computed and no image is opened. */
export async function comparisonOnRecord(a: ImageRef, b: ImageRef, tx?: Transaction, chipBytes = Math.max(a.sizeBytes, b.sizeBytes)): Promise<Compared | null> {
  if (isTurned(a, b)) {
    const other = await comparisonOnRecord(b, a, tx, chipBytes);
    return other && turned(other);
  }
  const known = await ComparisonRow.findOne({ where: keyOf(a, b, chipBytes), transaction: tx });
  return known && (JSON.parse(known.result) as Compared);
}

function turned(c: Compared): Compared {
  return {
    ...c, zeroToOne: c.oneToZero, oneToZero: c.zeroToOne, fillInA: c.fillInB, fillInB: c.fillInA, cause: turnCause(c.cause, c.sizeA),
  };
}

/** The same, or null when one of the stored images is damaged or gone: a lost image must not keep new reads out. */
export async function compareIfStored(a: ImageRef, b: ImageRef, tx?: Transaction, chipBytes?: number): Promise<Compared | null> {
  try {
    return await compareImages(a, b, tx, chipBytes);
  } catch (error) {
    if (error instanceof ImageNotSound || (error as NodeJS.ErrnoException).code === "ENOENT") return null;
    throw error;
  }
}
