import type { Actor } from "@/lib/core/words";
import { AppError } from "@/lib/errors";
import type { DriveCorrection } from "@/lib/schemas/drive";
import { Drive, inTransaction } from "@/models";
import { appendEntry, lockChain } from "./append-entry";
import { changesOf } from "./correct-facts";
import { allow, notFound } from "./refuse";

export async function correctDrive(actor: Actor, driveId: string, input: DriveCorrection): Promise<{ id: string }> {
  allow(actor, "fact.correct");
  if (!(await Drive.findByPk(driveId))) throw notFound("drive");
  return inTransaction(async (tx) => {
    await lockChain(tx, driveId);
    const drive = (await Drive.findByPk(driveId, { transaction: tx }))!;
    const changes = changesOf(drive, input.changes);
    if (changes.length === 0) throw new AppError("does-not-fit", "Nothing would change: these are the values on record.");
    await drive.update(input.changes, { transaction: tx });
    if (!drive.partNumber && !drive.model && !drive.serial) {
      throw new AppError("does-not-fit", "A drive keeps at least one of part number, model and serial number.");
    }
    await appendEntry(tx, driveId, actor, "drive.corrected", { type: "drive", id: driveId }, { changes, reason: input.reason });
    return { id: driveId };
  });
}
