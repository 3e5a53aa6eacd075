import { seatingLetter, SYSTEM } from "@/lib/core/words";
import { AppError } from "@/lib/errors";
import { usesOfImages } from "@/lib/queries/image-uses";
import { Case, Drive, inTransaction, type Transaction } from "@/models";
import { filesArriving, freeBytes } from "@/storage";
import { appendEntry, lockChain } from "./append-entry";
import { finishErasures } from "./erased-image";
import { mailMoreFaulty } from "./image-alarm";
import { foundByScrub } from "./report-image";
import { pacer, scrubImage } from "./scrub-image";
import { type DriveRound, driveRounds, type DueImage, imagesOfNone, imagesToCheck, isToBeClosed, limits, type ScrubRate } from "./scrub-plan";

const ROOM_FOR_THE_LOG_BYTES = 16 * 1024 * 1024;
const UPLOAD_LOOK_MS = 500;
/** uploads that never end must not stop the checking for ever */
const UPLOAD_WAIT_MS = 30_000;

export interface ScrubOptions extends ScrubRate {
  secondLookMs?: number;
  /** called before each step, by its name: tests end the work there as a crash would */
  at?: (step: "image" | "checked" | "close" | "closed") => void;
}

/** What is being done, and what was done last; of this process, gone with it. */
export interface ScrubNow {
  driveId: string | null;
  sha256: string | null;
}

const shared = globalThis as unknown as { twinreadScrub?: ScrubNow };
export const scrubNow = (): ScrubNow => (shared.twinreadScrub ??= { driveId: null, sha256: null });

/**
 * One drive's round of reading its stored images, if one is due: the drive whose image was verified longest ago, its
 * images oldest first, one at a time, then one entry in its log. All it knows is in the database: killed anywhere, the
 * next call goes on where it stopped. Answers how many images were read; null when nothing was due.
 */
export async function scrubNextDrive(options: ScrubOptions): Promise<number | null> {
  if ((await freeBytes()) < ROOM_FOR_THE_LOG_BYTES) throw new AppError("no-room", "The disk is full: stored images are not checked until there is room for the log. Free some space.");
  // what a crash left of an erasure, or a backup brought back, is taken away first
  await finishErasures();
  const limit = await limits(options);
  const rounds = await driveRounds();
  // what a killed round, or the rounds of other drives with the same images, left to be said
  const left = rounds.filter(isToBeClosed);
  for (const { driveId, oldest } of left) await closeRound(driveId, oldest, options);
  const due = rounds.find((round) => round.oldest < limit.due && !left.includes(round));
  try {
    if (due) {
      const read = await readAll(due.driveId, await imagesToCheck(due.driveId, limit), options);
      await closeRound(due.driveId, due.oldest, options);
      return read;
    }
    const read = await readAll(null, await imagesOfNone(limit), options);
    return read > 0 || left.length > 0 ? read : null;
  } finally {
    Object.assign(scrubNow(), { driveId: null, sha256: null });
  }
}

async function readAll(driveId: string | null, images: DueImage[], { bytesPerSecond, secondLookMs, at }: ScrubOptions): Promise<number> {
  const passed = pacer(bytesPerSecond);
  for (const image of images) {
    Object.assign(scrubNow(), { driveId, sha256: image.sha256 });
    at?.("image");
    await whileUploading();
    await scrubImage(image, { passed, secondLookMs });
    at?.("checked");
  }
  return images.length;
}

async function whileUploading(): Promise<void> {
  const until = performance.now() + UPLOAD_WAIT_MS;
  while (filesArriving() > 0 && performance.now() < until) await new Promise<void>((done) => void setTimeout(done, UPLOAD_LOOK_MS).unref());
}

/** The one entry of a round, unless it is there already or an image came meanwhile that was not read yet. */
async function closeRound(driveId: string, oldestBefore: string, { at }: ScrubOptions): Promise<void> {
  at?.("close");
  await inTransaction(async (tx) => {
    await lockChain(tx, driveId);
    const [round] = (await driveRounds(driveId, tx)) as (DriveRound | undefined)[];
    if (!round || !isToBeClosed(round)) return;
    const found = await foundByScrub(tx, driveId);
    const { images, bytes, damaged, missing } = round;
    await appendEntry(tx, driveId, SYSTEM, "images.checked", { type: "drive", id: driveId }, { images, bytes, damaged, missing, oldestBefore });
    // the first one's mail went out at once
    if (found.length > 1) await tellMore(tx, driveId, found.slice(1));
  }, { receipt: false });
  at?.("closed");
}

async function tellMore(tx: Transaction, driveId: string, found: { sha256: string; state: "damaged" | "missing" }[]): Promise<void> {
  const drive = (await Drive.findByPk(driveId, { transaction: tx }))!;
  const { ref } = (await Case.findByPk(drive.caseId, { transaction: tx }))!;
  const uses = await usesOfImages(found.map((one) => Buffer.from(one.sha256, "hex")), tx);
  await mailMoreFaulty(tx, `case ${ref}, Drive ${seatingLetter(drive.position)}`, found, uses);
}
