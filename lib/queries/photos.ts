import { Op } from "sequelize";
import { boardsOf, photoPlaceFor } from "@/lib/commands/photo-place";
import { driveFor, driveLetter } from "@/lib/commands/place";
import { allow } from "@/lib/commands/refuse";
import { boardName } from "@/lib/core/board-name";
import type { Actor, PhotoSubject } from "@/lib/core/words";
import type { PhotoGroup, PhotoView } from "@/lib/views";
import { Board, Chip, Drive, Image, Photo, ShelfBoard } from "@/models";
import { people } from "./people";
import { photoView } from "./photo-view";
import { seenBy } from "./seen-by";

/** Photos of one thing, the oldest first. A board that came from the shelf brings the photos that were taken of it there. */
export async function photosOf(actor: Actor, type: PhotoSubject, id: string): Promise<PhotoView[]> {
  allow(actor, "photo.read");
  await photoPlaceFor(actor, type, id);
  const shelf = type === "board" ? await ShelfBoard.findOne({ attributes: ["id"], where: { takenBoardId: id } }) : null;
  return seenBy(actor, await views([[type, id], ...(shelf ? [["shelf-board", shelf.id] as const] : [])]));
}

type Key = readonly [type: PhotoSubject, id: string];

async function views(keys: readonly Key[]): Promise<PhotoView[]> {
  if (keys.length === 0) return [];
  const rows = await Photo.findAll({ where: { [Op.or]: keys.map(([subjectType, subjectId]) => ({ subjectType, subjectId })) }, order: ["storedAt", "id"] });
  if (rows.length === 0) return [];
  const unsound = await Image.findAll({ attributes: ["sha256"], where: { sha256: rows.map((row) => row.sha256), state: { [Op.ne]: "sound" } } });
  const [who, bad] = [await people(), new Set(unsound.map((image) => image.sha256.toString("hex")))];
  return rows.map((row) => photoView(row, who, !bad.has(row.sha256.toString("hex"))));
}

/** What a drive's page shows: the drive, then each board. Every one is there, with photos or without. */
export async function photosOfDrive(actor: Actor, driveId: string): Promise<PhotoGroup[]> {
  allow(actor, "photo.read");
  const { drive } = await driveFor(actor, driveId);
  const boards = await boardsOf([driveId]);
  const shelf = await ShelfBoard.findAll({ attributes: ["id", "takenBoardId"], where: { takenBoardId: boards.map((board) => board.id) } });
  const photos = await views([["drive", driveId], ...boards.map((board) => ["board", board.id] as const), ...shelf.map((one) => ["shelf-board", one.id] as const)]);
  const boardOf = new Map(shelf.map((one) => [one.id, one.takenBoardId]));
  const of = (id: string) => photos.filter((photo) => photo.of.id === id || boardOf.get(photo.of.id) === id);
  return seenBy(actor, [
    { of: { type: "drive", id: driveId }, name: `Drive ${driveLetter(drive)}, its label and connectors`, photos: of(driveId) },
    ...boards.map((board): PhotoGroup => ({
      of: { type: "board", id: board.id }, name: `${board.role === "original" ? "Original" : "Donor"} board ${boardName({ boardNumber: board.boardNumber, revision: board.revision ?? null })}`, photos: of(board.id),
    })),
  ]);
}

/** How many photos lie on the drives of a case, their boards and chips, for a line that leads there. */
export async function photoCounts(actor: Actor, caseId: string): Promise<{ driveId: string; photos: number }[]> {
  allow(actor, "photo.read");
  await photoPlaceFor(actor, "case", caseId);
  const drives = await Drive.findAll({ attributes: ["id"], where: { caseId }, order: ["position"] });
  const boards = await Board.findAll({ attributes: ["id", "driveId"], where: { driveId: drives.map((drive) => drive.id) } });
  const chips = await Chip.findAll({ attributes: ["id", "boardId"], where: { boardId: boards.map((board) => board.id) } });
  const rows = await Photo.findAll({ attributes: ["subjectId"], where: { caseId } });
  const driveOf = new Map<string, string>(drives.map((drive) => [drive.id, drive.id]));
  for (const board of boards) driveOf.set(board.id, board.driveId);
  for (const chip of chips) driveOf.set(chip.id, driveOf.get(chip.boardId)!);
  return drives.map(({ id }) => ({ driveId: id, photos: rows.filter((row) => driveOf.get(row.subjectId) === id).length }));
}
