import { Board, Case, Chip, Drive, type Transaction } from "@/models";
import { notFound } from "./refuse";

/** Where a thing stands: a chip on a board on a drive of a case. */
export interface BoardPlace {
  board: Board;
  drive: Drive;
  case: Case;
}
export interface ChipPlace extends BoardPlace {
  chip: Chip;
}

export async function placeOfDrive(id: string, tx?: Transaction): Promise<{ drive: Drive; case: Case }> {
  const drive = await Drive.findByPk(id, { transaction: tx });
  const found = drive && (await Case.findByPk(drive.caseId, { transaction: tx }));
  if (!drive || !found) throw notFound("drive");
  return { drive, case: found };
}

export async function placeOfBoard(id: string, tx?: Transaction): Promise<BoardPlace> {
  const board = await Board.findByPk(id, { transaction: tx });
  if (!board) throw notFound("board");
  return { board, ...(await placeOfDrive(board.driveId, tx)) };
}

export async function placeOfChip(id: string, tx?: Transaction): Promise<ChipPlace> {
  const chip = await Chip.findByPk(id, { transaction: tx });
  if (!chip) throw notFound("chip");
  return { chip, ...(await placeOfBoard(chip.boardId, tx)) };
}

/** Drives are A, B, C on screen, by the order in which they were recorded. */
export function driveLetter(drive: Pick<Drive, "position">): string {
  return String.fromCharCode(64 + ((drive.position - 1) % 26) + 1);
}
