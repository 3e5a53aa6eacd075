import { UniqueConstraintError } from "sequelize";
import { type DonorFit, sameMarking } from "@/lib/core/donor-fit";
import { type ShelfChip, shelfNumber } from "@/lib/core/shelf";
import { type Actor, WORKSHOP_CHAIN } from "@/lib/core/words";
import { AppError } from "@/lib/errors";
import { chipsOfRow, shelfRows } from "@/lib/queries/shelf-view";
import type { TakingInput } from "@/lib/schemas/shelf";
import { Board, Chip, inTransaction, ShelfBoard, type Transaction } from "@/models";
import { appendEntry, lockChain } from "./append-entry";
import { takenRefusal } from "./change-shelf-board";
import type { Change } from "./correct-facts";
import { driveFor, driveLetter, placeOfDrive } from "./place";
import { writeBoard } from "./record-board";
import { writeChip } from "./record-chip";
import { allow, notFound } from "./refuse";
import { requireOpen } from "./require-open";

export interface Taken {
  boardId: string;
  fit: DonorFit | null;
  /** chips that were recorded on the drive */
  chips: string[];
  /** chips of the shelf whose bus or size is not known: to be recorded by hand */
  left: string[];
}

/** Makes a board of the shelf the donor board of a drive, with its chips, by the rules of any donor. Once. */
export async function takeFromShelf(actor: Actor, shelfBoardId: string, { driveId, reason = null }: TakingInput): Promise<Taken> {
  allow(actor, "shelf.change");
  allow(actor, "board.record");
  allow(actor, "chip.record");
  if (!(await ShelfBoard.findByPk(shelfBoardId))) throw notFound("shelf board");
  await driveFor(actor, driveId);
  try {
    return await inTransaction((tx) => take(tx, actor, shelfBoardId, driveId, reason));
  } catch (error) {
    if (error instanceof UniqueConstraintError) throw new AppError("rule-against", "This board was taken a moment ago. Take another one.");
    throw error;
  }
}

async function take(tx: Transaction, actor: Actor, shelfBoardId: string, driveId: string, reason: string | null): Promise<Taken> {
  // the workshop's chain comes first in the order of ids
  await lockChain(tx, WORKSHOP_CHAIN);
  await lockChain(tx, driveId);
  const row = (await ShelfBoard.findByPk(shelfBoardId, { transaction: tx, lock: tx.LOCK.UPDATE }))!;
  const [view] = await shelfRows([row], tx);
  if (view.state === "taken") throw new AppError("rule-against", takenRefusal(view, "Take another board."));
  if (view.state === "retired") throw new AppError("rule-against", `${view.number} is retired: ${view.retired?.reason ?? ""} Take another board.`);
  const { drive, case: found } = await placeOfDrive(driveId, tx);
  requireOpen(found);
  if (view.reservedFor && view.reservedFor.caseId !== found.id) throw new AppError("rule-against", `${view.number} is reserved for case ${view.reservedFor.ref}. Take another board, or have the reservation taken off on its page.`);
  const number = shelfNumber(row.number);
  const { id: boardId, fit } = await writeBoard(tx, actor, driveId, {
    role: "donor", boardNumber: row.boardNumber, revision: row.revision, controllerMarking: row.controllerMarking, motorDriverMarking: row.motorDriverMarking, condition: row.condition, reason,
  });
  await appendEntry(tx, driveId, actor, "board.taken-from-shelf", { type: "board", id: boardId }, { board: boardId, shelfBoard: row.id, number, boardNumber: row.boardNumber });
  const { chips, left } = await writeChips(tx, actor, driveId, boardId, chipsOfRow(row));
  await row.update({ takenBoardId: boardId, takenAt: new Date(), reservedCaseId: null }, { transaction: tx });
  const changes: Change[] = [
    { field: "taken for", from: null, to: `Drive ${driveLetter(drive)} of case ${found.ref}` },
    ...(view.reservedFor ? [{ field: "reserved for", from: view.reservedFor.ref, to: null }] : []),
  ];
  await appendEntry(tx, WORKSHOP_CHAIN, actor, "shelf.changed", { type: "shelf-board", id: row.id }, { shelfBoard: row.id, number, changes, reason });
  return { boardId, fit, chips, left };
}

/** Chips whose bus and size are known; one of the designator and size of an original's chip that still needs a donor becomes its pair. */
async function writeChips(tx: Transaction, actor: Actor, driveId: string, boardId: string, chips: readonly ShelfChip[]): Promise<Pick<Taken, "chips" | "left">> {
  const original = await Board.findOne({ where: { driveId, role: "original" }, transaction: tx });
  const needed = original ? await Chip.findAll({ where: { boardId: original.id, needsTransfer: true }, transaction: tx }) : [];
  const paired = new Set((await Chip.findAll({ where: { pairedWithId: needed.map((chip) => chip.id) }, transaction: tx })).map((chip) => chip.pairedWithId));
  const [done, left]: [string[], string[]] = [[], []];
  for (const chip of chips) {
    if (chip.bus === null || chip.sizeBytes === null) {
      left.push(chip.designator);
      continue;
    }
    const pair = needed.find((one) => sameMarking(one.designator, chip.designator) && one.sizeBytes === chip.sizeBytes && !paired.has(one.id));
    await writeChip(tx, actor, driveId, boardId, {
      designator: chip.designator, bus: chip.bus, sizeBytes: chip.sizeBytes, sizeSource: "typed", supplyMillivolts: "unknown", package: chip.package, marking: chip.marking, needsTransfer: true, pairedWith: pair?.id ?? null,
    });
    done.push(chip.designator);
  }
  return { chips: done, left };
}
