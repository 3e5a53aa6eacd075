import { randomUUID } from "node:crypto";
import { UniqueConstraintError } from "sequelize";
import { NO_CHIP_REFUSAL } from "@/lib/core/no-chip";
import type { Actor } from "@/lib/core/words";
import { AppError } from "@/lib/errors";
import type { ChipInput } from "@/lib/schemas/chip";
import { Chip, inTransaction, type Transaction } from "@/models";
import { appendEntry, lockChain } from "./append-entry";
import { pairChip } from "./pair-chip";
import { boardFor, placeOfBoard } from "./place";
import { allow } from "./refuse";
import { requireOpen } from "./require-open";

export async function recordChip(actor: Actor, boardId: string, input: ChipInput): Promise<{ id: string; designator: string }> {
  allow(actor, "chip.record");
  const { board, drive } = await boardFor(actor, boardId);
  if (input.pairedWith && board.role !== "donor") {
    throw new AppError("does-not-fit", "Only a donor's chip is paired: record it on the donor board and name the original's chip.", { errors: [{ path: "pairedWith", message: "Only on a donor's chip." }] });
  }
  try {
    const chip = await inTransaction((tx) => writeChip(tx, actor, drive.id, boardId, input));
    return { id: chip.id, designator: chip.designator };
  } catch (error) {
    if (error instanceof UniqueConstraintError) {
      throw new AppError("rule-against", `This board has a ${input.designator} already. Open that one, or check the designator.`);
    }
    throw error;
  }
}

/** The same within a change that does more, such as taking a board from the shelf. */
export async function writeChip(tx: Transaction, actor: Actor, driveId: string, boardId: string, input: ChipInput): Promise<Chip> {
  await lockChain(tx, driveId);
  const now = await placeOfBoard(boardId, tx);
  requireOpen(now.case);
  if (now.board.dataInController && input.needsTransfer) throw new AppError("rule-against", NO_CHIP_REFUSAL, { errors: [{ path: "needsTransfer", message: "Take the tick off: the chip is kept for reference." }] });
  const supply = input.supplyMillivolts;
  const facts = {
    bus: input.bus, sizeBytes: input.sizeBytes, sizeSource: input.sizeSource, package: input.package ?? null,
    marking: input.marking ?? null, holds: input.holds ?? null, idBytes: input.idBytes ?? null, sfdp: input.sfdp ?? null, needsTransfer: now.board.role === "original" ? input.needsTransfer : false,
  };
  const chip = await Chip.create({
    id: randomUUID(), boardId, designator: input.designator, ...facts, supplyMillivolts: supply === "unknown" ? null : supply, createdAt: new Date(),
  }, { transaction: tx });
  await appendEntry(tx, driveId, actor, "chip.recorded", { type: "chip", id: chip.id }, {
    chip: { id: chip.id, designator: chip.designator }, boardRole: now.board.role, supplyMillivolts: supply, ...facts,
  });
  if (input.pairedWith) await pairChip(tx, actor, { donorChip: chip, donorBoard: now.board, driveId, originalChipId: input.pairedWith });
  return chip;
}
