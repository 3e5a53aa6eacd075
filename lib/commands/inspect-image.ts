import { createInspection, type ImageFacts } from "@/lib/core/inspect";
import { Image, type Transaction } from "@/models";
import { type Arrived, imageChunks } from "@/storage";
import { breathe, inTurn } from "./in-turn";

/** What one image shows by itself; computed once per distinct digest and kept with the image's row. */
export async function inspectImage(sha256: string, sizeBytes: number): Promise<ImageFacts> {
  const known = await Image.findByPk(Buffer.from(sha256, "hex"));
  if (known) return known.facts;
  return inTurn(async () => {
    const inspection = createInspection(sizeBytes);
    for await (const chunk of imageChunks(sha256)) {
      inspection.push(chunk);
      await breathe();
    }
    return inspection.finish();
  });
}

/** The image's row, unless it is there already. Bytes are in the store before this is called. */
export async function recordImage(tx: Transaction, arrived: Arrived, facts: ImageFacts): Promise<void> {
  await Image.bulkCreate([{ sha256: Buffer.from(arrived.sha256, "hex"), sizeBytes: arrived.sizeBytes, crc32: arrived.crc32, facts, storedAt: new Date() }], {
    transaction: tx, ignoreDuplicates: true,
  });
}
