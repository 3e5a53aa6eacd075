import { SYSTEM } from "@/lib/core/words";
import { AppError } from "@/lib/errors";
import { type ImageUse, usesOfImages } from "@/lib/queries/image-uses";
import { Approval, connection, CustodyEntry, Image, inTransaction, type Transaction } from "@/models";
import { checkImage, type ImageState, type Look, lookAtImage, markOfImage, storeIsThere } from "@/storage";
import { appendEntry, lockChain } from "./append-entry";
import { refuseErased } from "./erased-image";
import { mailFaulty } from "./image-alarm";
import { revokeStanding } from "./revoke-approval";

export const SCRUB = "scrub";
const PAUSE_MS = 200;
const LOOKS = 4;

const pause = (ms: number) => new Promise<void>((done) => void setTimeout(done, ms).unref());

/** No single image is to blame when all are away, and none is marked. */
export class StoreAway extends AppError {
  constructor() {
    super("unavailable", "The folder of the stored images is missing or empty: the disk that holds them may not be there. Nothing was changed; bring it back.", { retryAfterSeconds: 60 });
  }
}

/**
 * For whoever read a stored image and found it wanting: it is read a second time before anything is said. Wanting again:
 * written down in its row and in the log of every drive that has it, approvals fall, leads and admins get a mail. Sound
 * at the second look: an entry that says so, and nothing falls. Answers how the image is.
 */
export async function reportImage(sha256: string, state: Exclude<ImageState, "sound">, where: string, { pauseMs = PAUSE_MS } = {}): Promise<ImageState> {
  const digest = Buffer.from(sha256, "hex");
  for (let i = 0; i < LOOKS; i += 1) {
    const image = await Image.findByPk(digest);
    if (!image || image.state === "erased") return state;
    await pause(pauseMs);
    const look = await lookAtImage(sha256, image.sizeBytes);
    if (look.state !== "sound" && !(await storeIsThere())) throw new StoreAway();
    if (await settle(sha256, look, where)) return look.state;
  }
  // somebody keeps changing the file: what was seen last is not what is there, and the next look will tell
  return state;
}

/** False when the file was put in place or taken away since it was looked at: then it has to be looked at again. */
async function settle(sha256: string, look: Look, where: string): Promise<boolean> {
  const digest = Buffer.from(sha256, "hex");
  return inTransaction(async (tx) => {
    const { drives, uses } = await lockDrivesOf(tx, digest);
    const image = await Image.findByPk(digest, { transaction: tx, lock: tx.LOCK.UPDATE });
    // what was erased meanwhile is neither damaged nor missing
    if (image?.state === "erased") return true;
    if (!image || (await markOfImage(sha256)) !== look.mark) return !image;
    const before = image.state;
    await image.update({ state: look.state, ...checkedNow() }, { transaction: tx });
    const { state } = look;
    const enter = async (write: (drive: string) => Promise<unknown>) => {
      for (const drive of drives) await write(drive);
    };
    if (state === "sound") {
      await enter((drive) => appendEntry(tx, drive, SYSTEM, before === "sound" ? "image.second-look" : "image.found-sound", { type: "image", id: drive }, { sha256, where }));
    } else if (before !== state) {
      // one mail at once, the others of a scrub's round together at its end: a dying disk must not fill the mail boxes
      const alarm = where !== SCRUB || !(await foundInRound(tx, drives));
      await enter((drive) => appendEntry(tx, drive, SYSTEM, "image.found-damaged", { type: "image", id: drive }, { sha256, state, where }));
      const approvals = await Approval.findAll({ where: { sha256: digest, revokedAt: null }, transaction: tx });
      for (const { chipId } of approvals) await revokeStanding(tx, SYSTEM, chipId, "image-damaged", `The stored image is ${state}.`);
      if (alarm) await mailFaulty(tx, { sha256, state, why: look.why }, where, uses, approvals.length);
    }
    return true;
  }, { receipt: false });
}

/** The other way: an image that was on record as damaged or missing is whole again, from a backup or from a new read. */
export async function reportSound(sha256: string, where: string): Promise<void> {
  const digest = Buffer.from(sha256, "hex");
  const known = await Image.findByPk(digest);
  if (!known || known.state === "sound" || known.state === "erased") return;
  await inTransaction(async (tx) => {
    const { drives } = await lockDrivesOf(tx, digest);
    const image = await Image.findByPk(digest, { transaction: tx, lock: tx.LOCK.UPDATE });
    if (!image || image.state === "sound" || image.state === "erased") return;
    await image.update({ state: "sound", ...checkedNow() }, { transaction: tx });
    for (const drive of drives) await appendEntry(tx, drive, SYSTEM, "image.found-sound", { type: "image", id: drive }, { sha256, where });
  }, { receipt: false });
}

/** By the database's clock, like every time that is compared with a time of the log. */
export const checkedNow = () => ({ checkedAt: connection().literal("UTC_TIMESTAMP(6)") as unknown as Date });

/** Locks the chain of every drive that has this image, in the order of their ids. */
export async function lockDrivesOf(tx: Transaction, digest: Buffer): Promise<{ drives: string[]; uses: ImageUse[] }> {
  const uses = await usesOfImages([digest], tx);
  const drives = [...new Set(uses.flatMap((use) => (use.driveId ? [use.driveId] : [])))].sort();
  for (const drive of drives) await lockChain(tx, drive);
  return { drives, uses };
}

const ROUND_ACTIONS = ["images.checked", "image.found-damaged"] as const;

export interface FoundByScrub {
  sha256: string;
  state: "damaged" | "missing";
}

/** What the scrub wrote into a drive's log since the entry that closed the round before. */
export async function foundByScrub(tx: Transaction, drive: string): Promise<FoundByScrub[]> {
  const found: FoundByScrub[] = [];
  const rows = await CustodyEntry.findAll({ where: { chainId: drive, action: [...ROUND_ACTIONS] }, order: [["seq", "DESC"]], transaction: tx });
  for (const row of rows) {
    if (row.action === "images.checked") break;
    const facts = factsOf(row.body);
    if (facts?.where === SCRUB) found.unshift({ sha256: facts.sha256, state: facts.state });
  }
  return found;
}

/** A body that somebody damaged says nothing; the chain's check names it. */
function factsOf(body: Buffer): (FoundByScrub & { where: string }) | null {
  try {
    return (JSON.parse(body.toString("utf8")) as { facts?: FoundByScrub & { where: string } }).facts ?? null;
  } catch {
    return null;
  }
}

/** Asked for each image that is found: the newest entry mostly tells, however many lie before it. */
async function foundInRound(tx: Transaction, drives: string[]): Promise<boolean> {
  for (const drive of drives) {
    const newest = await CustodyEntry.findOne({ where: { chainId: drive, action: [...ROUND_ACTIONS] }, order: [["seq", "DESC"]], transaction: tx });
    if (!newest || newest.action === "images.checked") continue;
    if (factsOf(newest.body)?.where === SCRUB || (await foundByScrub(tx, drive)).length > 0) return true;
  }
  return false;
}

/** Reads the whole stored image before anything is built on it; a fault is written down and refused. */
export async function requireSoundImage(sha256: string, sizeBytes: number, where: string): Promise<void> {
  await refuseErased(sha256);
  const first = await checkImage(sha256, sizeBytes);
  const state = first === "sound" ? first : await reportImage(sha256, first, where);
  if (state === "sound") return reportSound(sha256, where);
  await refuseErased(sha256);
  throw new AppError("rule-against", `The stored image ${sha256.slice(0, 8)}… is ${state}: it no longer matches its digest. Nothing was done with it. Tell the lead; restore it from a backup or read the chip again.`);
}
