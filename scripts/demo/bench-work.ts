import { Readable } from "node:stream";
import { approveImage } from "@/lib/commands/approve-image";
import { askForApproval } from "@/lib/commands/ask-for-approval";
import { recordBoard } from "@/lib/commands/record-board";
import { recordChip } from "@/lib/commands/record-chip";
import { recordDrive } from "@/lib/commands/record-drive";
import { recordTransfer } from "@/lib/commands/record-transfer";
import { storeReads } from "@/lib/commands/store-reads";
import type { Actor, Stage } from "@/lib/core/words";
import { readFields } from "@/lib/schemas/read";
import type { ChipInput } from "@/lib/schemas/chip";
import type { DriveInput } from "@/lib/schemas/drive";
import type { ReadView } from "@/lib/views";
import { receive } from "@/storage";

/** What a bench does, in the demo's words; each step is the command that the pages use. */

export interface BoardFacts {
  boardNumber: string;
  revision: string;
  controllerMarking?: string;
  motorDriverMarking?: string;
  condition?: string;
}

export interface Boards {
  driveId: string;
  original: string;
  donor: string;
}

/** A drive with its original board and, where `donor` says how it differs, a donor board. */
export async function boards(actor: Actor, caseId: string, drive: DriveInput, original: BoardFacts, donor: Partial<BoardFacts> = {}): Promise<Boards> {
  const { id: driveId } = await recordDrive(actor, caseId, drive);
  const first = await recordBoard(actor, driveId, { role: "original", ...original });
  const second = await recordBoard(actor, driveId, { role: "donor", ...original, condition: "Sound, from the donor shelf", ...donor });
  return { driveId, original: first.id, donor: second.id };
}

export interface Pair {
  /** the original's chip */
  chip: string;
  donorChip: string;
  /** starts each file name: 26-0042_A_U3 */
  name: string;
}

export const FIRMWARE_CHIP = {
  bus: "spi", sizeBytes: 524_288, sizeSource: "marking", supplyMillivolts: 3300, package: "SOIC-8", marking: "A7 0442 K", holds: "Firmware", needsTransfer: true,
} as const satisfies Omit<ChipInput, "designator">;

export const SETTINGS_CHIP = {
  bus: "i2c", sizeBytes: 8192, sizeSource: "marking", supplyMillivolts: 3300, package: "TSSOP-8", marking: "64C 118", holds: "Settings", needsTransfer: true,
} as const satisfies Omit<ChipInput, "designator">;

export async function pair(actor: Actor, { original, donor }: Boards, name: string, facts: Omit<ChipInput, "designator">): Promise<Pair> {
  const designator = name.split("_")[2];
  const { id: chip } = await recordChip(actor, original, { designator, ...facts });
  const { id: donorChip } = await recordChip(actor, donor, { designator, ...facts, pairedWith: chip });
  return { chip, donorChip, name };
}

export interface Taken {
  seating: number;
  image: Buffer;
  /** as the uploader claims it; minutes before now */
  minutesAgo: number;
  /** the file's name without the chip's, such as r1 */
  file: string;
  note?: string;
}

const EQUIPMENT: Record<Stage, { reader: string; adapter: string }> = {
  before: { reader: "R2", adapter: "SOIC-8 clip C4" },
  donor: { reader: "R1", adapter: "SOIC-8 clip C2" },
  after: { reader: "R2", adapter: "SOIC-8 clip C4" },
};

/** Asked once, so that what is said to be one file has one time. */
const NOW = Math.floor(Date.now() / 60_000) * 60_000;

/** Uploads one read as a page does: one call, one file. */
export async function take(actor: Actor, at: Pair, stage: Stage, { seating, image, minutesAgo, file, note }: Taken): Promise<ReadView> {
  const when = new Date(NOW - minutesAgo * 60_000).toISOString();
  const arrived = await receive(Readable.from([image]));
  const fields = readFields.parse({
    stage, seating, ...EQUIPMENT[stage], method: "in-place", toolVersion: "4.2", supplyMillivolts: 3300, clockKilohertz: 8000, controllerHeld: "true", note,
    takenAt: [when], modifiedAt: [when],
  });
  const { reads } = await storeReads(actor, stage === "before" ? at.chip : at.donorChip, fields, [{ arrived, fileName: `${at.name}_${file}.bin` }]);
  return reads[0];
}

/** The donor's content first, then the original, three minutes a read. */
function minutesAgo(stage: Stage, number: number): number {
  return { donor: 150, before: 90, after: 30 }[stage] - 3 * number;
}

/** One more read of the original that came out otherwise. */
export function readOtherwise(actor: Actor, at: Pair, image: Buffer, seating: number, number: number): Promise<ReadView> {
  return take(actor, at, "before", { seating, image, minutesAgo: minutesAgo("before", number), file: `r${number}` });
}

/** Reads of the original, one a letter of `seatings`: "AAB" are three reads in two seatings. */
export async function readOriginal(actor: Actor, at: Pair, image: Buffer, seatings = "AAB", from = 1): Promise<ReadView[]> {
  return series(actor, at, "before", "r", image, seatings, from);
}

export async function saveDonor(actor: Actor, at: Pair, image: Buffer, seatings = "AB"): Promise<ReadView[]> {
  return series(actor, at, "donor", "own", image, seatings, 1);
}

export async function readBack(actor: Actor, at: Pair, image: Buffer, seatings = "AB", from = 1): Promise<ReadView[]> {
  return series(actor, at, "after", "back", image, seatings, from);
}

async function series(actor: Actor, at: Pair, stage: Stage, prefix: string, image: Buffer, seatings: string, from: number): Promise<ReadView[]> {
  const taken: ReadView[] = [];
  for (const [index, letter] of [...seatings].entries()) {
    const number = from + index;
    taken.push(await take(actor, at, stage, { seating: letter.charCodeAt(0) - 64, image, minutesAgo: minutesAgo(stage, number), file: `${prefix}${number}` }));
  }
  return taken;
}

/** A technician asks, a lead approves what the read holds. */
export async function clear(asker: Actor, lead: Actor, at: Pair, { sha256 }: ReadView, statement = "Three equal reads in two seatings, nothing stands against it."): Promise<string> {
  await askForApproval(asker, at.chip, { message: "Reads agree, donor saved. Please look." });
  const { id } = await approveImage(lead, at.chip, { sha256, donorChipId: at.donorChip, statement, reasons: {}, lookedAt: [] });
  return id;
}

/** The original's chip itself, soldered onto the donor board. */
export async function move(actor: Actor, at: Pair, approvalId: string): Promise<void> {
  await recordTransfer(actor, approvalId, { kind: "chip-moved", donorChipId: at.donorChip, note: "Lifted with hot air at 340 °C, soldered on by hand" });
}

export async function write(actor: Actor, at: Pair, approvalId: string): Promise<void> {
  await recordTransfer(actor, approvalId, { kind: "write", donorChipId: at.donorChip, programmer: "R2", toolVersion: "4.2", adapter: "SOIC-8 clip C4" });
}
