import { Op } from "sequelize";
import { boardsOf, photoPlaceFor } from "@/lib/commands/photo-place";
import { driveFor, driveLetter } from "@/lib/commands/place";
import { allow, notFound } from "@/lib/commands/refuse";
import { boardName } from "@/lib/core/board-name";
import { may } from "@/lib/core/policy";
import type { Actor, PhotoSubject } from "@/lib/core/words";
import { AppError } from "@/lib/errors";
import type { PhotoGroup, PhotoPageView, PhotoView } from "@/lib/views";
import { Board, Chip, Drive, Image, Photo, ShelfBoard } from "@/models";
import { erasedViews } from "./erased-views";
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

/** Whether this person may add photos there now; the page shows no place for them otherwise. */
export async function addsPhotos(actor: Actor, type: PhotoSubject, id: string): Promise<boolean> {
  return may(actor, "photo.add") && !(await photoPlaceFor(actor, type, id)).case?.closedAt;
}

type Key = readonly [type: PhotoSubject, id: string];

async function views(keys: readonly Key[]): Promise<PhotoView[]> {
  if (keys.length === 0) return [];
  const rows = await Photo.findAll({ where: { [Op.or]: keys.map(([subjectType, subjectId]) => ({ subjectType, subjectId })) }, order: ["storedAt", "id"] });
  if (rows.length === 0) return [];
  const unsound = await Image.findAll({ attributes: ["sha256", "state", "erasedAt", "erasedCause"], where: { sha256: rows.map((row) => row.sha256), state: { [Op.ne]: "sound" } } });
  const [who, bad] = [await people(), new Set(unsound.map((image) => image.sha256.toString("hex")))];
  const erased = erasedViews(unsound);
  return rows.map((row) => photoView(row, who, !bad.has(row.sha256.toString("hex")), erased.get(row.sha256.toString("hex"))));
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
    { of: { type: "drive", id: driveId }, name: `Drive ${driveLetter(drive)}`, photos: of(driveId) },
    ...boards.map((board): PhotoGroup => ({
      of: { type: "board", id: board.id }, name: `${board.role === "original" ? "Original" : "Donor"} board ${boardName({ boardNumber: board.boardNumber, revision: board.revision ?? null })}`, photos: of(board.id),
    })),
  ]);
}

/** The newest photo of each board of these drives, which stands as the ground of its picture. */
export async function boardPhotos(actor: Actor, driveIds: readonly string[]): Promise<Map<string, PhotoView>> {
  const groups = (await Promise.all(driveIds.map((id) => photosOfDrive(actor, id)))).flat();
  const newest = groups.flatMap(({ of, photos }) => {
    const photo = of.type === "board" ? photos.findLast((one) => one.kind === "photo" && !one.erased) : undefined;
    return photo ? [[of.id, photo] as const] : [];
  });
  return new Map(newest);
}

/** One photo with where it belongs and its neighbours. */
export async function photoPage(actor: Actor, id: string): Promise<PhotoPageView> {
  allow(actor, "photo.read");
  const row = await Photo.findByPk(id);
  if (!row) throw notFound("photo");
  const place = await photoPlaceFor(actor, row.subjectType, row.subjectId).catch((error: unknown) => {
    throw error instanceof AppError && error.code === "not-found" ? notFound("photo") : error;
  });
  const list = await views([[row.subjectType, row.subjectId]]);
  const at = list.findIndex((photo) => photo.id === id);
  const [{ case: found, driveId, type }, first] = [place, list[at]];
  const pages = [
    ...(found ? [{ label: `Case ${found.ref}`, href: `/cases/${found.id}` }] : []),
    ...(driveId ? [{ label: `Drive ${place.driveLetter}`, href: `/drives/${driveId}` }] : []),
    ...(type === "chip" ? [{ label: place.name, href: `/chips/${place.id}` }] : []),
    ...(type === "shelf-board" ? [{ label: capital(place.name), href: `/shelf/${place.id}` }, { label: "The board", href: `/shelf/${place.id}` }] : []),
  ];
  const last = pages[pages.length - 1];
  return seenBy(actor, {
    photo: first, place: found && type !== "case" ? `${capital(place.name)}, case ${found.ref}` : capital(place.name), crumbs: pages,
    back: { href: `${last.href}#photos`, label: type === "case" ? `case ${found!.ref}` : type === "board" ? `Drive ${place.driveLetter}` : type === "shelf-board" ? "the board on the shelf" : place.name },
    prev: list[at - 1]?.id ?? null, next: list[at + 1]?.id ?? null, number: at + 1, of: list.length,
  });
}

const capital = (text: string) => text.charAt(0).toUpperCase() + text.slice(1);

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
