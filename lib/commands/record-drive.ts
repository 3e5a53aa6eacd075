import { randomUUID } from "node:crypto";
import type { Actor } from "@/lib/core/words";
import type { DriveInput } from "@/lib/schemas/drive";
import { AppError } from "@/lib/errors";
import { Case, Drive, inTransaction } from "@/models";
import { appendEntry } from "./append-entry";
import { driveLetter } from "./place";
import { allow, allowCase, notFound } from "./refuse";
import { requireOpen } from "./require-open";

export async function recordDrive(actor: Actor, caseId: string, input: DriveInput): Promise<{ id: string; letter: string }> {
  allow(actor, "drive.record");
  return inTransaction(async (tx) => {
    // the case row is locked so that two drives cannot take one letter
    const found = await Case.findByPk(caseId, { transaction: tx, lock: tx.LOCK.UPDATE });
    if (!found) throw notFound("case");
    allowCase(actor, caseId);
    requireOpen(found);
    if (!found.receivedAt) throw new AppError("rule-against", "The parcel of this case has not been received yet. Receive it first; then record the drive that is in it.");
    const position = (await Drive.max<number, Drive>("position", { where: { caseId }, transaction: tx }) ?? 0) + 1;
    const facts = {
      partNumber: input.partNumber ?? null, model: input.model ?? null, serial: input.serial ?? null, interface: input.interface ?? null,
      capacity: input.capacity ?? null, made: input.made ?? null, firmware: input.firmware ?? null, encryption: input.encryption ?? null,
    };
    const drive = await Drive.create({ id: randomUUID(), caseId, position, ...facts, createdAt: new Date() }, { transaction: tx });
    await appendEntry(tx, drive.id, actor, "drive.recorded", { type: "drive", id: drive.id }, {
      caseRef: found.ref, letter: driveLetter(drive), ...facts, caseReceivedAt: found.receivedAt.toISOString(),
    });
    return { id: drive.id, letter: driveLetter(drive) };
  });
}
