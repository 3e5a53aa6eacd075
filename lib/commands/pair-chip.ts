import type { Actor } from "@/lib/core/words";
import { AppError } from "@/lib/errors";
import { Board, Chip, type Transaction } from "@/models";
import { appendEntry } from "./append-entry";
import { revokeStanding } from "./revoke-approval";

interface Pairing {
  donorChip: Chip;
  donorBoard: Board;
  driveId: string;
  /** null ends the pairing */
  originalChipId: string | null;
}

/** Pairs a donor's chip with an original's, one donor chip at a time. An approval for the earlier pair falls. */
export async function pairChip(tx: Transaction, actor: Actor, { donorChip, donorBoard, driveId, originalChipId }: Pairing): Promise<void> {
  if (donorChip.pairedWithId === originalChipId) return;
  if (donorChip.pairedWithId) {
    await revokeStanding(tx, actor, donorChip.pairedWithId, "pair-changed", `Donor ${donorChip.designator} is no longer this chip's pair.`);
  }
  if (originalChipId === null) {
    await donorChip.update({ pairedWithId: null }, { transaction: tx });
    return;
  }
  const original = await Chip.findByPk(originalChipId, { transaction: tx });
  const board = original && (await Board.findByPk(original.boardId, { transaction: tx }));
  if (!original || !board || board.driveId !== driveId || board.role !== "original") {
    throw new AppError("does-not-fit", "A donor's chip is paired with a chip on the original board of the same drive.", { errors: [{ path: "pairedWith", message: "Choose a chip of the original board." }] });
  }
  const before = await Chip.findOne({ where: { pairedWithId: original.id }, transaction: tx });
  if (before) {
    await before.update({ pairedWithId: null }, { transaction: tx });
    await revokeStanding(tx, actor, original.id, "pair-changed", `${original.designator} was paired with another donor chip.`);
  }
  await donorChip.update({ pairedWithId: original.id }, { transaction: tx });
  await appendEntry(tx, driveId, actor, "chip.paired", { type: "chip", id: original.id }, {
    chip: { id: original.id, designator: original.designator },
    donorChip: { id: donorChip.id, designator: donorChip.designator, boardNumber: donorBoard.boardNumber },
    before: before && { id: before.id, designator: before.designator },
  });
}
