import { randomUUID } from "node:crypto";
import type { Actor } from "@/lib/core/words";
import { AppError } from "@/lib/errors";
import type { TransferInput } from "@/lib/schemas/approval";
import { Approval, Image, inTransaction, Transfer } from "@/models";
import { appendEntry, lockChain } from "./append-entry";
import { requireCleanChain } from "./chain-gate";
import { chipFor, placeOfChip } from "./place";
import { allow, notFound } from "./refuse";
import { requireSoundImage } from "./report-image";

/** Writes down that the approved image was written to the donor's chip, or that the chip itself was moved there. */
export async function recordTransfer(actor: Actor, approvalId: string, input: TransferInput): Promise<{ id: string; donorChipId: string }> {
  allow(actor, "transfer.record");
  const known = await Approval.findByPk(approvalId);
  if (!known) throw notFound("approval");
  const { drive, chip } = await chipFor(actor, known.chipId, undefined, "approval");
  // the read-back will be held against this image
  const image = known.revokedAt ? null : await Image.findByPk(known.sha256);
  if (image) await requireSoundImage(known.sha256.toString("hex"), image.sizeBytes, "transfer");
  return inTransaction(async (tx) => {
    await lockChain(tx, drive.id);
    const approval = (await Approval.findByPk(approvalId, { transaction: tx }))!;
    if (approval.revokedAt) throw new AppError("rule-against", "This approval was revoked: the image is no longer cleared. Don't use what was written; see the chip's page for what to do.");
    if (approval.donorChipId !== input.donorChipId) throw new AppError("rule-against", "The approval covers another donor chip. Write to that one, or ask a lead for a new approval.");
    await requireCleanChain(drive.id, tx);
    const donor = await placeOfChip(approval.donorChipId, tx);
    const facts = { programmer: input.programmer ?? null, toolVersion: input.toolVersion ?? null, adapter: input.adapter ?? null, note: input.note ?? null };
    const transfer = await Transfer.create({
      id: randomUUID(), approvalId, chipId: chip.id, donorChipId: donor.chip.id, kind: input.kind, ...facts, byUserId: actor.id, at: new Date(),
    }, { transaction: tx });
    await appendEntry(tx, drive.id, actor, "transfer.recorded", { type: "transfer", id: transfer.id }, {
      chip: { id: chip.id, designator: chip.designator }, donorChip: { id: donor.chip.id, designator: donor.chip.designator, boardNumber: donor.board.boardNumber },
      transfer: transfer.id, approval: approvalId, sha256: approval.sha256.toString("hex"), kind: input.kind, ...facts,
    });
    return { id: transfer.id, donorChipId: donor.chip.id };
  });
}
