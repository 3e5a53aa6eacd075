import { SYSTEM } from "@/lib/core/words";
import { AppError } from "@/lib/errors";
import { Approval, Image, inTransaction, Read, type Transaction } from "@/models";
import { checkImage, type ImageState } from "@/storage";
import { appendEntry, lockChain } from "./append-entry";
import { placeOfChip } from "./place";
import { revokeStanding } from "./revoke-approval";

/** Writes down that a stored image is damaged or missing: in its row, in the log of every drive that has it; approvals fall. */
export async function reportImage(sha256: string, state: Exclude<ImageState, "sound">, where: string): Promise<void> {
  const digest = Buffer.from(sha256, "hex");
  await inTransaction(async (tx) => {
    const drives = await lockDrivesOf(tx, digest);
    const image = await Image.findByPk(digest, { transaction: tx });
    if (!image || image.state === state) return;
    await image.update({ state }, { transaction: tx });
    for (const drive of drives) await appendEntry(tx, drive, SYSTEM, "image.found-damaged", { type: "image", id: drive }, { sha256, state, where });
    for (const { chipId } of await Approval.findAll({ where: { sha256: digest, revokedAt: null }, transaction: tx })) {
      await revokeStanding(tx, SYSTEM, chipId, "image-damaged", `The stored image is ${state}.`);
    }
  }, { receipt: false });
}

/** The other way: an image that was on record as damaged or missing is whole again, from a backup or from a new read. */
export async function reportSound(sha256: string, where: string): Promise<void> {
  const digest = Buffer.from(sha256, "hex");
  const known = await Image.findByPk(digest);
  if (!known || known.state === "sound") return;
  await inTransaction(async (tx) => {
    const drives = await lockDrivesOf(tx, digest);
    const image = await Image.findByPk(digest, { transaction: tx });
    if (!image || image.state === "sound") return;
    await image.update({ state: "sound" }, { transaction: tx });
    for (const drive of drives) await appendEntry(tx, drive, SYSTEM, "image.found-sound", { type: "image", id: drive }, { sha256, where });
  }, { receipt: false });
}

/** Locks the chain of every drive that has this image, in the order of their ids. */
async function lockDrivesOf(tx: Transaction, digest: Buffer): Promise<string[]> {
  const reads = await Read.findAll({ where: { sha256: digest }, transaction: tx });
  const places = await Promise.all([...new Set(reads.map((r) => r.chipId))].map((id) => placeOfChip(id, tx)));
  const drives = [...new Set(places.map((p) => p.drive.id))].sort();
  for (const drive of drives) await lockChain(tx, drive);
  return drives;
}

/** Reads the whole stored image before anything is built on it; a fault is written down and refused. */
export async function requireSoundImage(sha256: string, sizeBytes: number, where: string): Promise<void> {
  const state = await checkImage(sha256, sizeBytes);
  if (state === "sound") return reportSound(sha256, where);
  await reportImage(sha256, state, where);
  throw new AppError("rule-against", `The stored image ${sha256.slice(0, 8)}… is ${state}: it no longer matches its digest. Nothing was done with it. Tell the lead; restore it from a backup or read the chip again.`);
}
