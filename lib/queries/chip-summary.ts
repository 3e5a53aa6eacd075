import { compareIfStored } from "@/lib/commands/compare-images";
import { agreement } from "@/lib/core/chip-state";
import { CELLS, reduceCells } from "@/lib/core/strip";
import { readName, seatingLetter } from "@/lib/core/words";
import type { ChipSummary, StateView } from "@/lib/views";
import type { Board, Chip, Read } from "@/models";
import { donorContentSaved, stateRead } from "./chip-facts";
import type { ChipRecord } from "./chip-records";
import { compositeBehind, imageAtStake } from "./composite-behind";
import { cellsOf, type StripImage } from "./strips";

export function stripImage(read: Read): StripImage {
  return {
    readId: read.id, name: readName(read.stage, read.number), note: read.derived ? "composite" : `seating ${seatingLetter(read.seating)}`,
    sha256: read.sha256.toString("hex"), sizeBytes: read.sizeBytes,
  };
}

/** Reads worth drawing: the counted ones, and of those the first of each agreeing group when there are more than six. */
export function worthDrawing(reads: Read[], unsound: Set<string>): Read[] {
  const counted = reads.filter((r) => r.counted && !unsound.has(r.sha256.toString("hex")));
  if (counted.length <= 6) return counted;
  const seen = new Set<string>();
  return counted.filter((r) => !seen.has(r.sha256.toString("hex")) && seen.add(r.sha256.toString("hex")));
}

/** At most two distinct images as 64 cells, and the lane between them. */
async function thumbnail(reads: Read[], unsound: Set<string>, sizeBytes: number): Promise<ChipSummary["thumbnail"]> {
  const distinct: StripImage[] = [];
  for (const read of worthDrawing(reads, unsound)) {
    const image = stripImage(read);
    if (distinct.length < 2 && !distinct.some((d) => d.sha256 === image.sha256)) distinct.push(image);
  }
  return { ...(await drawn(distinct, sizeBytes)), shows: "reads" };
}

/** After a write: the written image over the newest read-back that differs from it; null where none does. */
async function readBackThumbnail({ chip, before, backs, approvals, transfers, unsound }: ChipRecord): Promise<ChipSummary["thumbnail"] | null> {
  const latest = transfers.at(-1);
  const written = approvals.find((a) => a.id === latest?.approvalId)?.sha256;
  const sound = (read: Read) => !unsound.has(read.sha256.toString("hex"));
  const image = written && before.find((r) => r.sha256.equals(written) && sound(r));
  const back = written && backs.findLast((r) => r.transferId === latest?.id && r.counted && !r.sha256.equals(written) && sound(r));
  return image && back ? { ...(await drawn([stripImage(image), stripImage(back)], chip.sizeBytes)), shows: "read-back" } : null;
}

async function drawn(distinct: StripImage[], sizeBytes: number): Promise<Omit<ChipSummary["thumbnail"], "shows">> {
  const length = Math.max(sizeBytes, ...distinct.map((d) => d.sizeBytes));
  const images = await Promise.all(distinct.map(async (d) => reduceCells(await cellsOf(d.sha256, d.sizeBytes, 0, length), 64)));
  if (distinct.length < 2) return { images, lane: null };
  const cells = (await compareIfStored(distinct[0], distinct[1]))?.cells;
  if (!cells) return { images, lane: null };
  const lane = Array.from({ length: 64 }, (_, i) => cells.slice((i * CELLS) / 64, ((i + 1) * CELLS) / 64).reduce((a, b) => a + b, 0));
  return { images, lane };
}

function base(chip: Chip, board: Board) {
  return {
    id: chip.id, designator: chip.designator, boardRole: board.role, bus: chip.bus, sizeBytes: chip.sizeBytes, sizeSource: chip.sizeSource,
    supplyMillivolts: chip.supplyMillivolts ?? null, package: chip.package ?? null, marking: chip.marking ?? null, holds: chip.holds ?? null,
    idBytes: chip.idBytes ?? null, sfdp: chip.sfdp ?? null, needsTransfer: chip.needsTransfer,
    place: chip.placeX == null || chip.placeY == null ? null : { x: chip.placeX, y: chip.placeY },
  };
}

const pairOf = (chip: Chip, board: Board) => ({ id: chip.id, designator: chip.designator, boardId: board.id, boardNumber: board.boardNumber, sizeBytes: chip.sizeBytes });

/** The original's chip in a line of a list. */
export async function originalSummary(record: ChipRecord, state: StateView): Promise<ChipSummary> {
  const counted = record.before.filter((r) => r.counted);
  return {
    ...base(record.chip, record.board), state, pair: record.donor && pairOf(record.donor.chip, record.donor.board),
    countedReads: counted.length, agreeingReads: agreement(counted.map(stateRead)).largest?.reads.length ?? 0,
    donorSaved: donorContentSaved(record), composite: compositeBehind(record, imageAtStake(record)),
    thumbnail: (await readBackThumbnail(record)) ?? await thumbnail(record.before, record.unsound, record.chip.sizeBytes),
  };
}

/** A donor's chip: it reports its pair's state and its own reads. */
export async function donorSummary(chip: Chip, board: Board, own: Read[], record: ChipRecord | null, state: StateView): Promise<ChipSummary> {
  const counted = own.filter((r) => r.counted && r.stage === "donor");
  return {
    ...base(chip, board), state, pair: record && pairOf(record.chip, record.board),
    countedReads: counted.length, agreeingReads: agreement(counted.map(stateRead)).largest?.reads.length ?? 0,
    donorSaved: record !== null && donorContentSaved(record), composite: record && compositeBehind(record, imageAtStake(record)),
    thumbnail: await thumbnail(counted, record?.unsound ?? new Set(), chip.sizeBytes),
  };
}

export const UNPAIRED: StateView = { state: "unread", label: "Not paired yet", sentence: "Pair this donor chip with a chip of the original board; then its own content can be saved." };
