import { Op } from "sequelize";
import { ENGINE_VERSION } from "@/lib/core/engine-version";
import type { ImageFacts } from "@/lib/core/inspect";
import { engine } from "@/lib/engine/pool";
import { Image, type Transaction } from "@/models";
import { type Arrived, pathOfImage } from "@/storage";
import { holdStored } from "./erased-image";
import { requireSoundNow } from "./require-sound-now";

/** What one image shows by itself; worked out once per distinct digest and engine version, kept with the image's row. */
export async function inspectImage(sha256: string, tx?: Transaction): Promise<ImageFacts> {
  const known = await Image.findByPk(Buffer.from(sha256, "hex"), { transaction: tx });
  if (known && known.engineVersion === ENGINE_VERSION) return known.facts;
  // one that was stored long ago is not judged unseen
  if (known) await requireSoundNow([{ sha256, sizeBytes: known.sizeBytes }], "judging", tx);
  return engine("inspect", { file: pathOfImage(sha256) });
}

/** The image's row, unless it is there already; its facts are those of the present engine. Bytes are in the store before. */
export async function recordImage(tx: Transaction, arrived: Arrived, facts: ImageFacts): Promise<void> {
  const sha256 = Buffer.from(arrived.sha256, "hex");
  await Image.bulkCreate([{ sha256, sizeBytes: arrived.sizeBytes, crc32: arrived.crc32, facts, engineVersion: ENGINE_VERSION, storedAt: new Date() }], {
    transaction: tx, ignoreDuplicates: true,
  });
  await holdStored(tx, sha256);
  await Image.update({ facts, engineVersion: ENGINE_VERSION }, { where: { sha256, engineVersion: { [Op.ne]: ENGINE_VERSION } }, transaction: tx });
}
