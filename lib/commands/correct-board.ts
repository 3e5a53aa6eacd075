import { donorFit } from "@/lib/core/donor-fit";
import { may } from "@/lib/core/policy";
import { listText } from "@/lib/core/quantity";
import type { Actor } from "@/lib/core/words";
import { AppError } from "@/lib/errors";
import type { BoardCorrection } from "@/lib/schemas/board";
import { Board, Chip, inTransaction, type Transaction } from "@/models";
import { appendEntry, lockChain } from "./append-entry";
import { changesOf } from "./correct-facts";
import { boardFor, placeOfBoard } from "./place";
import { onlyOnOriginal } from "./record-board";
import { allow } from "./refuse";
import { requireOpen } from "./require-open";

export async function correctBoard(actor: Actor, boardId: string, input: BoardCorrection): Promise<{ id: string }> {
  allow(actor, "fact.correct");
  const { drive } = await boardFor(actor, boardId);
  return inTransaction(async (tx) => {
    await lockChain(tx, drive.id);
    const { board, case: found } = await placeOfBoard(boardId, tx);
    requireOpen(found);
    const changes = changesOf(board, input.changes);
    if (changes.length === 0) throw new AppError("does-not-fit", "Nothing would change: these are the values on record.");
    if (input.changes.dataInController) await checkNoChipToMove(tx, board);
    await board.update(input.changes, { transaction: tx });
    // A corrected number may turn a fitting donor into one that needs a lead.
    const boards = await Board.findAll({ where: { driveId: drive.id }, transaction: tx });
    const original = boards.find((b) => b.role === "original");
    const misfits = boards.filter((b) => original && b.role === "donor" && donorFit(original, b).verdict === "other-number" && !b.fitReason);
    if (misfits.length > 0 && !may(actor, "board.allow-other-number")) {
      throw new AppError("rule-against", "With this the donor's board number would differ from the original's. A lead has to make this correction.");
    }
    for (const donor of misfits) await donor.update({ fitReason: input.reason }, { transaction: tx });
    await appendEntry(tx, drive.id, actor, "board.corrected", { type: "board", id: boardId }, { changes, reason: input.reason });
    return { id: boardId };
  });
}

/** What needs a transfer contradicts a board without a chip to move, and so does a donor that waits for its image. */
async function checkNoChipToMove(tx: Transaction, board: Board): Promise<void> {
  if (board.role !== "original") throw onlyOnOriginal();
  const chips = await Chip.findAll({ where: { boardId: board.id, needsTransfer: true }, order: ["designator"], transaction: tx });
  if (chips.length === 0) return;
  const names = listText(chips.map((chip) => chip.designator));
  throw new AppError("rule-against", `${names} of this board ${chips.length === 1 ? "needs" : "need"} a transfer. Correct ${chips.length === 1 ? "it" : "them"} to be kept for reference first, with the reason; then say where the unique data lies.`);
}
