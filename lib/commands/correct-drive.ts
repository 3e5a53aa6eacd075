import type { Actor } from "@/lib/core/words";
import { AppError } from "@/lib/errors";
import type { DriveCorrection } from "@/lib/schemas/drive";
import { Board, Chip, inTransaction, Read, type Transaction } from "@/models";
import { appendEntry, lockChain } from "./append-entry";
import { changesOf } from "./correct-facts";
import { judge, judgeSameImages } from "./judge-read";
import { driveFor, placeOfChip, placeOfDrive } from "./place";
import { allow } from "./refuse";
import { requireOpen } from "./require-open";

/** Corrects what was typed about a drive. Two drives of one serial are one drive recorded twice, so a new serial is judged at once. */
export async function correctDrive(actor: Actor, driveId: string, input: DriveCorrection): Promise<{ id: string }> {
  allow(actor, "fact.correct");
  await driveFor(actor, driveId);
  const judged = await inTransaction(async (tx) => {
    await lockChain(tx, driveId);
    const { drive, case: found } = await placeOfDrive(driveId, tx);
    requireOpen(found);
    const changes = changesOf(drive, input.changes);
    if (changes.length === 0) throw new AppError("does-not-fit", "Nothing would change: these are the values on record.");
    drive.set(input.changes);
    if (!drive.partNumber && !drive.model && !drive.serial) {
      throw new AppError("does-not-fit", "A drive keeps at least one of part number, model and serial number.");
    }
    await drive.save({ transaction: tx });
    await appendEntry(tx, driveId, actor, "drive.corrected", { type: "drive", id: driveId }, { changes, reason: input.reason });
    return changes.some((c) => c.field === "serial") ? judgeReadsOf(tx, driveId) : [];
  });
  for (const { sha256, chipId } of judged) await judgeSameImages(sha256, chipId);
  return { id: driveId };
}

async function judgeReadsOf(tx: Transaction, driveId: string): Promise<{ sha256: Buffer; chipId: string }[]> {
  const boards = await Board.findAll({ where: { driveId, role: "original" }, transaction: tx });
  const chips = await Chip.findAll({ where: { boardId: boards.map((b) => b.id) }, transaction: tx });
  const reads = await Read.findAll({ where: { chipId: chips.map((c) => c.id), stage: "before" }, order: ["number"], transaction: tx });
  for (const read of reads) await judge(tx, await placeOfChip(read.chipId, tx), read);
  return reads.filter((read, i) => reads.findIndex((r) => r.chipId === read.chipId && r.sha256.equals(read.sha256)) === i);
}
