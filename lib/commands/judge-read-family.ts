import { col, fn, Op, where } from "sequelize";
import { bareMarking } from "@/lib/core/donor-fit";
import { ENGINE_VERSION } from "@/lib/core/engine-version";
import { alike, type Family, type Likeness, nearest, type Relative } from "@/lib/core/family";
import { type ImageFacts, nearlyBlank } from "@/lib/core/inspect";
import { readName } from "@/lib/core/words";
import { engine } from "@/lib/engine/pool";
import { Board, Chip, ComparisonRow, Read, type Transaction } from "@/models";
import { pathOfImage } from "@/storage";
import { type ChipPlace, placeOfChip } from "./place";
import { ImageNotSound, requireSoundNow } from "./require-sound-now";

/** Chips looked at, the newest; so that the work stays the same however many a workshop has seen. */
const MOST = 4;
const BOARDS_LOOKED_AT = 200;
const READS_LOOKED_AT = 40;

/** Apart from whole comparisons of the same two images. */
const VERSION = `${ENGINE_VERSION}:like`;

const pairOf = (a: Buffer, b: Buffer) => (Buffer.compare(a, b) < 0 ? { sha256A: a, sha256B: b } : { sha256A: b, sha256B: a });

/** A damaged image is like nothing: what its bytes say now is not kept under its digest. */
async function isSound(tx: Transaction, sha256: Buffer, sizeBytes: number): Promise<boolean> {
  return requireSoundNow([{ sha256: sha256.toString("hex"), sizeBytes }], "judging", tx).then(() => true, (error: unknown) => {
    if (error instanceof ImageNotSound) return false;
    throw error;
  });
}

/** How alike one image is to others of its size, each pair worked out once and then kept; null for one that is gone. */
async function likenesses(tx: Transaction, sha256: Buffer, others: readonly Buffer[], sizeBytes: number): Promise<(Likeness | null)[]> {
  const rows = others.length === 0 ? [] : await ComparisonRow.findAll({
    where: { engineVersion: VERSION, [Op.or]: others.map((other) => pairOf(sha256, other)) }, transaction: tx,
  });
  const kept = (other: Buffer) => {
    const { sha256A, sha256B } = pairOf(sha256, other);
    const row = rows.find((one) => one.sha256A.equals(sha256A) && one.sha256B.equals(sha256B));
    return row ? (JSON.parse(row.result) as Likeness) : null;
  };
  const missing: Buffer[] = [];
  for (const other of others) if (kept(other) === null && (await isSound(tx, other, sizeBytes))) missing.push(other);
  if (missing.length === 0) return others.map(kept);
  const made = await engine("likeness", { file: pathOfImage(sha256.toString("hex")), others: missing.map((other) => pathOfImage(other.toString("hex"))) });
  await ComparisonRow.bulkCreate(missing.flatMap((other, i) => (made[i] ? [{ ...pairOf(sha256, other), engineVersion: VERSION, result: JSON.stringify(made[i]) }] : [])), {
    ignoreDuplicates: true, transaction: tx,
  });
  return others.map((other) => kept(other) ?? made[missing.indexOf(other)]);
}

/** The newest counted read of each of the newest chips, stored before this one: a later case changes no earlier judgement. */
async function candidates(tx: Transaction, place: ChipPlace, read: Read): Promise<Read[]> {
  const boards = await Board.findAll({
    attributes: ["id"], order: [["createdAt", "DESC"]], limit: BOARDS_LOOKED_AT, transaction: tx,
    where: { [Op.and]: [{ role: "original", driveId: { [Op.ne]: place.drive.id } }, where(fn("UPPER", fn("REPLACE", col("board_number"), " ", "")), bareMarking(place.board.boardNumber))] },
  });
  if (boards.length === 0) return [];
  const chips = await Chip.findAll({ attributes: ["id"], where: { boardId: boards.map((board) => board.id), designator: place.chip.designator }, transaction: tx });
  if (chips.length === 0) return [];
  const reads = await Read.findAll({
    where: {
      chipId: chips.map((chip) => chip.id), stage: "before", counted: true, sizeBytes: read.sizeBytes,
      sha256: { [Op.ne]: read.sha256 }, storedAt: { [Op.lt]: read.storedAt },
    },
    order: [["storedAt", "DESC"], ["number", "DESC"]], limit: READS_LOOKED_AT, transaction: tx,
  });
  return reads.filter((one, i) => reads.findIndex((other) => other.chipId === one.chipId) === i).slice(0, MOST);
}

/** The same chip on other cases' boards of the same number, and how alike they are; the chips to each other only where it matters. */
export async function familyOf(tx: Transaction, place: ChipPlace, read: Read, facts: ImageFacts): Promise<Family> {
  const none: Family = { relatives: [], among: null };
  if (read.stage !== "before" || read.sizeBytes !== place.chip.sizeBytes || nearlyBlank(facts)) return none;
  const found: Read[] = [];
  const relatives: Relative[] = [];
  const reads = await candidates(tx, place, read);
  const likeness = await likenesses(tx, read.sha256, reads.map((one) => one.sha256), read.sizeBytes);
  for (const [i, other] of reads.entries()) {
    const there = await placeOfChip(other.chipId, tx);
    const known = likeness[i];
    if (!known || there.case.id === place.case.id) continue;
    found.push(other);
    relatives.push({ ...known, readName: readName(other.stage, other.number), designator: there.chip.designator, caseRef: there.case.ref });
  }
  return { relatives, among: alike(nearest(relatives)) ? null : await nearestAmong(tx, found.map((one) => one.sha256), read.sizeBytes) };
}

async function nearestAmong(tx: Transaction, images: readonly Buffer[], sizeBytes: number): Promise<Likeness | null> {
  const distinct = images.filter((one, i) => images.findIndex((other) => other.equals(one)) === i);
  let best: Likeness | null = null;
  for (const [i, image] of distinct.entries()) {
    const pairs = await likenesses(tx, image, distinct.slice(i + 1), sizeBytes);
    best = nearest([best, ...pairs].filter((one) => one !== null));
    if (alike(best)) return best;
  }
  return best;
}
