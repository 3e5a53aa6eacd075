import { createHash } from "node:crypto";
import { Readable } from "node:stream";
import { approveImage } from "@/lib/commands/approve-image";
import { createCase } from "@/lib/commands/create-case";
import { createUser } from "@/lib/commands/create-user";
import { introduceKey } from "@/lib/commands/introduce-key";
import { recordBoard } from "@/lib/commands/record-board";
import { recordChip } from "@/lib/commands/record-chip";
import { recordDrive } from "@/lib/commands/record-drive";
import { type StoredReads, storeReads } from "@/lib/commands/store-reads";
import { type Actor, type Role, type Stage, SYSTEM } from "@/lib/core/words";
import { AppError } from "@/lib/errors";
import { chipView } from "@/lib/queries/chip-view";
import { type ReadFields, readFields } from "@/lib/schemas/read";
import type { ReadView } from "@/lib/views";
import { CustodyEntry } from "@/models";
import { receive } from "@/storage";
import { likeFirmware } from "./firmware";

/** Real rows through the real commands: what a test needs to begin with. */
let serial = 0;

export async function makeUser(role: Role, name = `Person ${(serial += 1)}`): Promise<Actor & { role: Role; email: string }> {
  await introduceKey();
  const email = `${name.toLowerCase().replace(/[^a-z]+/g, ".")}.${Date.now().toString(36)}${(serial += 1)}@bench.example`;
  const { user } = await createUser(SYSTEM, { email, name, role }, "correct horse battery staple", false);
  return { id: user.id, name, role, email };
}

export interface MadeChip {
  caseId: string;
  ref: string;
  driveId: string;
  originalBoardId: string;
  donorBoardId: string;
  chipId: string;
  donorChipId: string;
}

/** A case with one drive, both boards and a pair of chips. */
export async function makeChip(actor: Actor, { sizeBytes = 8192, serialNumber = `SN-${(serial += 1)}-${Date.now().toString(36)}`, boardNumber = "BX 40-3179" } = {}): Promise<MadeChip> {
  const made = await createCase(actor, { customer: { name: "Lindmoor Veterinary Practice", email: "desk@lindmoor.example" }, damage: "Power surge" });
  const drive = await recordDrive(actor, made.id, { partNumber: "PN 4471-0093-B", serial: serialNumber });
  const board = { boardNumber, revision: "rev C" };
  const original = await recordBoard(actor, drive.id, { role: "original", ...board });
  const donor = await recordBoard(actor, drive.id, { role: "donor", ...board });
  const facts = { designator: "U12", bus: "spi" as const, sizeBytes, sizeSource: "marking" as const, supplyMillivolts: 3300, needsTransfer: true };
  const chip = await recordChip(actor, original.id, facts);
  const donorChip = await recordChip(actor, donor.id, { ...facts, pairedWith: chip.id });
  return { caseId: made.id, ref: made.ref, driveId: drive.id, originalBoardId: original.id, donorBoardId: donor.id, chipId: chip.id, donorChipId: donorChip.id };
}

/**
 * Repeatable bytes that look like firmware rather than noise: SHA-256 blocks of the seed and a counter, every third byte
 * thinned out. Plain noise would be held against a chip (`noise-like`).
 */
export function firmware(seed: string, length: number): Buffer {
  const blocks: Buffer[] = [];
  for (let i = 0; i * 32 < length; i += 1) {
    const counter = Buffer.alloc(4);
    counter.writeUInt32BE(i);
    blocks.push(createHash("sha256").update(seed).update(counter).digest());
  }
  return likeFirmware(Buffer.concat(blocks).subarray(0, length));
}

export const sha256 = (bytes: Uint8Array) => createHash("sha256").update(bytes).digest("hex");

type Fields = Partial<Omit<ReadFields, "stage">>;

/** Uploads one image as a read. */
export async function store(actor: Actor, chipId: string, stage: Stage, bytes: Uint8Array, seating = 1, fields: Fields = {}, fileName = "image.bin"): Promise<StoredReads> {
  const arrived = await receive(Readable.from([Buffer.from(bytes)]));
  return storeReads(actor, chipId, { ...readFields.parse({ stage, seating, reader: "R2", supplyMillivolts: 3300 }), ...fields }, [{ arrived, fileName }]);
}

/** Three equal reads in two seatings and the donor's content saved: ready for approval. */
export async function makeReady(technician: Actor, chip: MadeChip, image: Uint8Array, donorImage: Uint8Array = Buffer.alloc(image.length, 0xff)): Promise<void> {
  for (const seating of [1, 1]) await store(technician, chip.donorChipId, "donor", donorImage, seating);
  for (const seating of [1, 1, 2]) await store(technician, chip.chipId, "before", image, seating);
}

/** An image of random look that no other test has. */
export const freshImage = (length = 8192) => firmware(`image-${(serial += 1)}-${Date.now()}-${Math.random()}`, length);

/** Clears the agreed image for the paired donor chip. */
export function approve(lead: Actor, chip: MadeChip, image: Uint8Array, reasons: Record<string, string> = {}): Promise<{ id: string; sha256: string }> {
  return approveImage(lead, chip.chipId, { sha256: sha256(image), donorChipId: chip.donorChipId, statement: "Three clean reads.", reasons, lookedAt: [] });
}

export interface Bench {
  technician: Awaited<ReturnType<typeof makeUser>>;
  lead: Awaited<ReturnType<typeof makeUser>>;
  chip: MadeChip;
  image: Buffer;
}

/** A technician, a lead and a chip whose image waits for approval. */
export async function makeReadyBench(): Promise<Bench> {
  const [technician, lead] = [await makeUser("technician"), await makeUser("lead")];
  const [chip, image] = [await makeChip(technician), freshImage()];
  await makeReady(technician, chip, image);
  return { technician, lead, chip, image };
}

export async function makeApprovedBench(): Promise<Bench & { approvalId: string }> {
  const bench = await makeReadyBench();
  return { ...bench, approvalId: (await approve(bench.lead, bench.chip, bench.image)).id };
}

export async function stateOf(actor: Actor, chipId: string): Promise<string> {
  return (await chipView(actor, chipId)).state.state;
}

export async function readsOf(actor: Actor, chipId: string, stage: Stage): Promise<ReadView[]> {
  return (await chipView(actor, chipId)).reads.filter((read) => read.stage === stage);
}

/** What a refused call answered; a call that went through, or broke in another way, is an error of the test. */
export async function refusalOf(call: Promise<unknown>): Promise<{ code: string; detail: string }> {
  try {
    await call;
  } catch (error) {
    if (error instanceof AppError) return { code: error.code, detail: error.detail };
    throw error;
  }
  throw new Error("the call was not refused");
}

/** What a chain says, in its order: the action and the facts of every entry. */
export async function logOf(chain: string): Promise<{ action: string; facts: Record<string, unknown>; actor: { id: string; role: string } }[]> {
  const rows = await CustodyEntry.findAll({ where: { chainId: chain }, order: ["seq"] });
  return rows.map((row) => JSON.parse(row.body.toString("utf8")) as { action: string; facts: Record<string, unknown>; actor: { id: string; role: string } });
}

export async function lastEntry(chain: string, action: string): Promise<Record<string, unknown> | undefined> {
  return (await logOf(chain)).findLast((entry) => entry.action === action)?.facts;
}
