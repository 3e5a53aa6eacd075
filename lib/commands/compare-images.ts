import { type Comparison, createComparison } from "@/lib/core/compare";
import { ENGINE_VERSION } from "@/lib/core/engine-version";
import { ComparisonRow, type Transaction } from "@/models";
import { imageChunks } from "@/storage";
import { breathe, inTurn } from "./in-turn";

export interface ImageRef {
  sha256: string;
  sizeBytes: number;
}

/**
 * Byte by byte from `a` to `b`; computed once per pair of digests and engine version, then kept. Inside a transaction
 * `tx` must be given: who holds a chain's lock and asks for a second connection waits for those who wait for the lock.
 */
export async function compareImages(a: ImageRef, b: ImageRef, tx?: Transaction): Promise<Comparison> {
  const swapped = a.sha256 > b.sha256;
  const [first, second] = swapped ? [b, a] : [a, b];
  const key = { sha256A: Buffer.from(first.sha256, "hex"), sha256B: Buffer.from(second.sha256, "hex"), engineVersion: ENGINE_VERSION };
  const known = await ComparisonRow.findOne({ where: key, transaction: tx });
  if (known) return seenFrom(JSON.parse(known.result) as Comparison, swapped);
  const made = await inTurn(() => run(first, second));
  await ComparisonRow.bulkCreate([{ ...key, result: JSON.stringify(made) }], { ignoreDuplicates: true, transaction: tx });
  return seenFrom(made, swapped);
}

/** The same, or null when one of the stored images is gone: a lost image must not keep new reads out. */
export async function compareIfStored(a: ImageRef, b: ImageRef, tx?: Transaction): Promise<Comparison | null> {
  try {
    return await compareImages(a, b, tx);
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code === "ENOENT") return null;
    throw error;
  }
}

async function run(a: ImageRef, b: ImageRef): Promise<Comparison> {
  const comparison = createComparison(a.sizeBytes, b.sizeBytes);
  const chunksB = imageChunks(b.sha256);
  try {
    for await (const chunk of imageChunks(a.sha256)) {
      const { value } = await chunksB.next();
      if (!value) break;
      const common = Math.min(chunk.length, value.length);
      comparison.push(chunk.subarray(0, common), value.subarray(0, common));
      await breathe();
    }
  } finally {
    await chunksB.return(undefined);
  }
  return comparison.finish();
}

/** The same comparison from the other side: only what has a direction changes places. */
function seenFrom(c: Comparison, swapped: boolean): Comparison {
  if (!swapped) return c;
  return { ...c, sizeA: c.sizeB, sizeB: c.sizeA, zeroToOne: c.oneToZero, oneToZero: c.zeroToOne, fillInA: c.fillInB, fillInB: c.fillInA };
}
