import type { Actor } from "@/lib/core/words";
import { Board, Case, Chip, Drive, Read, type Transaction } from "@/models";
import { allowCase, notFound } from "./refuse";

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

/*
 * The same on behalf of somebody: what lies outside an auditor's case list is not there, word for word like what never
 * was. Queries and commands that take an actor load by these; the bare ones above are for Twinread's own steps.
 */
export async function caseFor(actor: Actor, id: string, tx?: Transaction): Promise<Case> {
  const found = await Case.findByPk(id, { transaction: tx });
  if (!found) throw notFound("case");
  allowCase(actor, found.id);
  return found;
}

export async function driveFor(actor: Actor, id: string, tx?: Transaction): Promise<{ drive: Drive; case: Case }> {
  const place = await placeOfDrive(id, tx);
  allowCase(actor, place.case.id, "drive");
  return place;
}

export async function boardFor(actor: Actor, id: string, tx?: Transaction): Promise<BoardPlace> {
  const place = await placeOfBoard(id, tx);
  allowCase(actor, place.case.id, "board");
  return place;
}

/** `what` is the word in the refusal, where it is not the chip that was asked for. */
export async function chipFor(actor: Actor, id: string, tx?: Transaction, what = "chip"): Promise<ChipPlace> {
  const place = await placeOfChip(id, tx);
  allowCase(actor, place.case.id, what);
  return place;
}

/** A read with where it stands. */
export async function readFor(actor: Actor, id: string, what = "read"): Promise<{ read: Read; place: ChipPlace }> {
  const read = await Read.findByPk(id);
  if (!read) throw notFound(what);
  const place = await placeOfChip(read.chipId);
  allowCase(actor, place.case.id, what);
  return { read, place };
}

/** Drives are A, B, C on screen, by the order in which they were recorded. */
export function driveLetter(drive: Pick<Drive, "position">): string {
  return String.fromCharCode(64 + ((drive.position - 1) % 26) + 1);
}
