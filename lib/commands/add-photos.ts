import { randomUUID } from "node:crypto";
import { withCommas } from "@/lib/core/quantity";
import { type Actor, type PhotoSubject, SYSTEM, WORKSHOP_CHAIN } from "@/lib/core/words";
import { AppError } from "@/lib/errors";
import { MAX_CAPTION_CHARACTERS, MAX_PHOTO_NAME_CHARACTERS } from "@/lib/limits";
import { people } from "@/lib/queries/people";
import { photoView } from "@/lib/queries/photo-view";
import type { PhotoView } from "@/lib/views";
import { type Case, Image, inTransaction, Photo, type Transaction } from "@/models";
import { type Arrived, writeReduced } from "@/storage";
import { appendEntry, lockChain } from "./append-entry";
import { holdStored } from "./erased-image";
import { keepImage } from "./keep-image";
import { lookAtPhoto, type PhotoLook } from "./photo-look";
import { drivesToTell, type PhotoPlace, photoPlaceFor } from "./photo-place";
import { allow } from "./refuse";
import { requireOpen } from "./require-open";

export interface PhotoFile {
  arrived: Arrived;
  /** as it came; evidence, never a path */
  fileName: string;
  caption?: string | null;
}

/** A file that was opened, found in order, and whose bytes lie in the store: what is missing is its row. */
export interface ReadyPhoto extends PhotoFile {
  look: PhotoLook;
}

/** Stores the files of one call as photos or documents of a thing: all of them or none. */
export async function addPhotos(actor: Actor, type: PhotoSubject, id: string, files: PhotoFile[]): Promise<{ photos: PhotoView[] }> {
  await requirePhotoPlace(actor, type, id);
  if (files.length === 0) throw new AppError("does-not-fit", "No photo came along. Send 1 to 16 parts named file.", { errors: [{ path: "file", message: "Send at least one." }] });
  const ready = await readyPhotos(files);
  if (ready.length < files.length) throw new AppError("does-not-fit", "The same file came twice in one call. Nothing was stored; send it once.");
  const rows = await inTransaction(async (tx) => {
    const place = await photoPlaceFor(actor, type, id, tx);
    return writePhotos(tx, actor, "workshop", place, ready);
  });
  const who = await people();
  return { photos: rows.map((row) => photoView(row, who, true)) };
}

/** Whether this person may add photos there now: asked before any byte is taken, and again after. */
export async function requirePhotoPlace(actor: Actor, type: PhotoSubject, id: string): Promise<PhotoPlace> {
  allow(actor, "photo.add");
  const place = await photoPlaceFor(actor, type, id);
  if (place.case) requireOpen(place.case);
  return place;
}

/**
 * For a customer's request: inside the transaction that made the case, after `readyPhotos`. They are photos of the case by
 * the customer, told in the workshop's log because the case has no drive yet.
 */
export async function addPhotosForRequest(tx: Transaction, found: Case, ready: ReadyPhoto[]): Promise<Photo[]> {
  const place: PhotoPlace = { type: "case", id: found.id, case: found, driveId: null, driveLetter: null, name: `case ${found.ref}` };
  return writePhotos(tx, SYSTEM, "customer", place, ready);
}

/**
 * Opens every file, refuses the whole call where one is not taken, and puts the bytes into the store. A file that came
 * twice is kept once. Takes seconds for large photos: never called inside a transaction.
 */
export async function readyPhotos(files: PhotoFile[]): Promise<ReadyPhoto[]> {
  const ready = new Map<string, ReadyPhoto>();
  for (const file of files) {
    checkTexts(file);
    ready.set(file.arrived.sha256, { ...file, look: await lookAtPhoto(file.arrived, file.fileName) });
  }
  for (const { arrived, look } of ready.values()) {
    await keepImage(arrived, "upload");
    for (const [edge, bytes] of look.reduced) await writeReduced(arrived.sha256, edge, bytes);
  }
  return [...ready.values()];
}

function checkTexts({ fileName, caption }: PhotoFile): void {
  const long = [...fileName].length;
  if (long > MAX_PHOTO_NAME_CHARACTERS) throw new AppError("does-not-fit", `A file’s name has ${withCommas(long)} characters; up to ${MAX_PHOTO_NAME_CHARACTERS} are kept with a photo. Rename the file and send it again; nothing was stored.`);
  if ([...(caption ?? "")].length > MAX_CAPTION_CHARACTERS) throw new AppError("does-not-fit", `A caption has up to ${MAX_CAPTION_CHARACTERS} characters. Shorten it; nothing was stored.`, { errors: [{ path: "caption", message: `Up to ${MAX_CAPTION_CHARACTERS} characters.` }] });
}

/** Rows and entries, in the caller's transaction. The bytes are in the store already. */
async function writePhotos(tx: Transaction, actor: Actor, by: "workshop" | "customer", place: PhotoPlace, ready: ReadyPhoto[]): Promise<Photo[]> {
  const drives = await drivesToTell(place, tx);
  const chains = drives.length > 0 ? drives : [WORKSHOP_CHAIN];
  for (const chain of chains) await lockChain(tx, chain);
  await place.case?.reload({ transaction: tx });
  if (place.case) requireOpen(place.case);
  const rows: Photo[] = [];
  for (const { arrived, fileName, caption, look } of ready) {
    const sha256 = Buffer.from(arrived.sha256, "hex");
    const known = await Photo.findOne({ where: { subjectType: place.type, subjectId: place.id, sha256 }, transaction: tx });
    if (known) throw new AppError("rule-against", `${fileName || "A file"} is among the photos of ${place.name} already, as ${known.fileName || "a file without a name"}. Nothing was stored.`);
    await keepRow(tx, arrived, sha256);
    const row = await Photo.create({
      id: randomUUID(), caseId: place.case?.id ?? null, subjectType: place.type, subjectId: place.id, kind: look.kind, sha256, sizeBytes: arrived.sizeBytes, mediaType: look.type,
      fileName, caption: caption?.trim() || null, width: look.width, height: look.height, hadLocation: look.hadLocation, byUserId: by === "customer" ? null : actor.id, storedAt: new Date(),
    }, { transaction: tx });
    for (const chain of chains) {
      await appendEntry(tx, chain, actor, "photo.added", { type: "photo", id: row.id }, {
        photo: row.id, of: { type: place.type, id: place.id, name: place.name }, kind: row.kind, sha256: arrived.sha256, sizeBytes: row.sizeBytes, mediaType: row.mediaType,
        caption: row.caption ?? null, by,
      });
    }
    rows.push(row);
  }
  return rows;
}

/** facts of an image that no engine has looked at: the first read with the same bytes has them worked out */
const NO_ENGINE = "none";

/** The row by which stored bytes are read again and again. It makes them no read: those are rows of their own. */
async function keepRow(tx: Transaction, { sizeBytes, crc32 }: Arrived, sha256: Buffer): Promise<void> {
  const facts = { sizeBytes, distinctValues: 0, dominantByte: 0, dominantCount: 0, ffCount: 0, zeroCount: 0, cells: "" };
  await Image.bulkCreate([{ sha256, sizeBytes, crc32, facts, engineVersion: NO_ENGINE, storedAt: new Date() }], { transaction: tx, ignoreDuplicates: true });
  await holdStored(tx, sha256);
}
