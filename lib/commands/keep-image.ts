import { SYSTEM } from "@/lib/core/words";
import { Image, inTransaction } from "@/models";
import { type Arrived, keep } from "@/storage";
import { appendEntry } from "./append-entry";
import { checkedNow, lockDrivesOf, reportImage, reportSound } from "./report-image";

/**
 * Makes an arrived file an image of the store. Where a damaged one lay under its name, that is written down first, then
 * the right bytes take its place: reading the chip again is the way out that the screen names. One that was erased is
 * stored again, and every log that tells of its erasure says so.
 */
export async function keepImage(arrived: Arrived, where: string): Promise<void> {
  const known = await Image.findByPk(Buffer.from(arrived.sha256, "hex"), { attributes: ["state"] });
  if (known?.state === "erased" && (await storeAgain(arrived, where))) return;
  await keep(arrived, async () => void (await reportImage(arrived.sha256, "damaged", where, { pauseMs: 0 })));
  await reportSound(arrived.sha256, where);
}

/** Under the row's lock, so that nobody takes the file away meanwhile; the file comes last, for it can be moved only once. */
async function storeAgain(arrived: Arrived, where: string): Promise<boolean> {
  const digest = Buffer.from(arrived.sha256, "hex");
  return inTransaction(async (tx) => {
    const { drives } = await lockDrivesOf(tx, digest);
    const image = await Image.findByPk(digest, { transaction: tx, lock: tx.LOCK.UPDATE });
    if (image?.state !== "erased") return false;
    await image.update({ state: "sound", erasedAt: null, erasedCause: null, ...checkedNow() }, { transaction: tx });
    for (const drive of drives) await appendEntry(tx, drive, SYSTEM, "image.found-sound", { type: "image", id: drive }, { sha256: arrived.sha256, where });
    await keep(arrived);
    return true;
  }, { receipt: false });
}
