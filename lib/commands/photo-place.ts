import { boardName } from "@/lib/core/board-name";
import type { Actor, PhotoSubject } from "@/lib/core/words";
import { Board, Case, Drive, ShelfBoard, type Transaction } from "@/models";
import { boardFor, caseFor, chipFor, driveFor, driveLetter } from "./place";
import { notFound } from "./refuse";

/** What a photo is of: the case it belongs to, whose logs tell of it, and its name in them. */
export interface PhotoPlace {
  type: PhotoSubject;
  id: string;
  /** null for a board on the shelf that no drive has taken */
  case: Case | null;
  /** null: it is of the whole case, or of a board on the shelf */
  driveId: string | null;
  /** null where there is no drive */
  driveLetter: string | null;
  /** "Drive A", "the original board BX 40-3179 rev C", "U12 of the donor" */
  name: string;
}

/** On behalf of somebody: what they may not see is not there. */
export async function photoPlaceFor(actor: Actor, type: PhotoSubject, id: string, tx?: Transaction): Promise<PhotoPlace> {
  if (type === "case") {
    const found = await caseFor(actor, id, tx);
    return { type, id, case: found, driveId: null, driveLetter: null, name: `case ${found.ref}` };
  }
  if (type === "drive") {
    const { drive, case: found } = await driveFor(actor, id, tx);
    return { type, id, case: found, driveId: drive.id, driveLetter: driveLetter(drive), name: `Drive ${driveLetter(drive)}` };
  }
  if (type === "board") {
    const { board, drive, case: found } = await boardFor(actor, id, tx);
    return { type, id, case: found, driveId: drive.id, driveLetter: driveLetter(drive), name: `the ${board.role} board ${boardName({ boardNumber: board.boardNumber, revision: board.revision ?? null })}` };
  }
  if (type === "chip") {
    const { chip, board, drive, case: found } = await chipFor(actor, id, tx);
    return { type, id, case: found, driveId: drive.id, driveLetter: driveLetter(drive), name: `${chip.designator} of the ${board.role}` };
  }
  return shelfPlace(actor, id, tx);
}

/** A limited auditor sees a shelf board only once a drive of one of their cases has taken it. */
async function shelfPlace(actor: Actor, id: string, tx?: Transaction): Promise<PhotoPlace> {
  const found = await ShelfBoard.findByPk(id, { transaction: tx });
  if (!found) throw notFound("shelf board");
  if (actor.cases) {
    const taker = found.takenBoardId ? await boardFor(actor, found.takenBoardId, tx).catch(() => null) : null;
    if (!taker) throw notFound("shelf board");
  }
  return { type: "shelf-board", id, case: null, driveId: null, driveLetter: null, name: `the shelf board ${found.number}, ${found.boardNumber}` };
}

/** The drives whose logs tell of a photo, in the order in which they are locked; none: it is told in the workshop's log. */
export async function drivesToTell(place: Pick<PhotoPlace, "driveId" | "case">, tx: Transaction): Promise<string[]> {
  if (place.driveId) return [place.driveId];
  if (!place.case) return [];
  const drives = await Drive.findAll({ attributes: ["id"], where: { caseId: place.case.id }, transaction: tx });
  return drives.map((drive) => drive.id).sort();
}

/** Boards of a drive, in the order of the page: the original first. */
export function boardsOf(driveIds: readonly string[], tx?: Transaction): Promise<Board[]> {
  return Board.findAll({ where: { driveId: [...driveIds] }, order: [["role", "ASC"], ["createdAt", "ASC"]], transaction: tx });
}
