import { randomUUID } from "node:crypto";
import { Readable } from "node:stream";
import { ENGINE_VERSION } from "@/lib/core/engine-version";
import type { ImageFacts } from "@/lib/core/inspect";
import { type Actor, readName, SYSTEM } from "@/lib/core/words";
import { crc32Hex } from "@/lib/core/digest";
import { withCommas } from "@/lib/core/quantity";
import { AppError } from "@/lib/errors";
import { MAX_FILE_NAME_CHARACTERS } from "@/lib/limits";
import { recordOfChip } from "@/lib/queries/chip-records";
import { chipState } from "@/lib/queries/chip-state";
import { people } from "@/lib/queries/people";
import { currentPolicy } from "@/lib/queries/policy";
import { readView } from "@/lib/queries/read-view";
import type { ReadFields } from "@/lib/schemas/read";
import type { ReadView, StateView } from "@/lib/views";
import { engine } from "@/lib/engine/pool";
import { Approval, inTransaction, Read, type Transaction, Transfer } from "@/models";
import { type Arrived, receive } from "@/storage";
import { appendEntry, lockChain } from "./append-entry";
import { checkStage } from "./check-stage";
import { compareIfStored } from "./compare-images";
import { inspectImage, recordImage } from "./inspect-image";
import { judge, judgeSameImages } from "./judge-read";
import { keepImage } from "./keep-image";
import { chipFor, type ChipPlace, placeOfChip } from "./place";
import { allow } from "./refuse";
import { revokeStanding } from "./revoke-approval";

export interface UploadedFile {
  arrived: Arrived;
  fileName: string;
}

/** A file of the call as it will be stored: its image and, for text formats, the text it was expanded from. */
interface Incoming extends UploadedFile {
  source: Arrived | null;
}

export interface StoredReads {
  reads: ReadView[];
  chip: StateView | null;
}

/**
 * Stores the files of one call as reads of a chip: all of them or none. Bytes are in the store before a row says so;
 * reads, judgements, entries and what they revoke are one transaction.
 */
export async function storeReads(actor: Actor, chipId: string, fields: ReadFields, files: UploadedFile[]): Promise<StoredReads> {
  allow(actor, "read.store");
  const place = await chipFor(actor, chipId);
  checkFiles(fields, files);
  await checkStage(place, fields.stage);
  const incoming = await Promise.all(files.map((file) => expandText(fields, file)));
  const facts = new Map<string, ImageFacts>();
  for (const arrived of incoming.flatMap((file) => (file.source ? [file.source, file.arrived] : [file.arrived]))) {
    await keepImage(arrived, "upload");
    facts.set(arrived.sha256, await inspectImage(arrived.sha256));
  }
  await compareAhead(chipId, fields, incoming);

  const stored = await inTransaction(async (tx) => {
    await lockChain(tx, place.drive.id);
    const now = await placeOfChip(chipId, tx);
    const transferId = await checkStage(now, fields.stage, tx);
    const rows: Read[] = [];
    for (const [index, file] of incoming.entries()) {
      if (file.source) await recordImage(tx, file.source, facts.get(file.source.sha256)!);
      await recordImage(tx, file.arrived, facts.get(file.arrived.sha256)!);
      const row = await createRead(tx, actor, now, fields, file, index, transferId);
      const findings = await judge(tx, now, row, true);
      if (fields.stage === "after") await recordReadBack(tx, now, row, transferId!, findings[0]?.message ?? "");
      rows.push(row);
    }
    if (fields.stage === "before") await reviewApproval(tx, actor, now, rows);
    const record = await recordOfChip(chipId, tx);
    const who = await people(tx);
    return { reads: rows.map((r) => readView(r, who)), chip: record && (await chipState(record, await currentPolicy(tx), tx)) };
  });
  for (const sha256 of new Set(incoming.map((f) => f.arrived.sha256))) await judgeSameImages(Buffer.from(sha256, "hex"), chipId);
  return stored;
}

function checkFiles(fields: ReadFields, files: UploadedFile[]): void {
  if (files.length === 0) throw new AppError("malformed", "No file came with the request. Send 1 to 16 parts named file.");
  for (const name of ["base", "size", "fill"] as const) {
    const given = fields[name] !== undefined && fields[name] !== null;
    if (given === (fields.format !== "raw")) continue;
    const detail = given ? `A raw image has no ${name}. Leave it out, or say which text format this is.` : `A text file needs its ${name}: say base, size and fill. They are never guessed, and are recorded.`;
    throw new AppError("does-not-fit", detail, { errors: [{ path: name, message: given ? "Leave it out." : `Give the ${name}.` }] });
  }
  for (const [name, list] of Object.entries({ sha256: fields.sha256, modifiedAt: fields.modifiedAt, takenAt: fields.takenAt })) {
    if (list.length !== 0 && list.length !== files.length) {
      throw new AppError("does-not-fit", `Give ${name} for every file or for none: ${files.length} files came with ${list.length}.`, { errors: [{ path: name, message: "One a file, or none." }] });
    }
  }
  for (const [index, { arrived, fileName }] of files.entries()) {
    // evidence is kept whole or not at all: a name is never cut
    const long = [...fileName].length;
    if (long > MAX_FILE_NAME_CHARACTERS) throw new AppError("does-not-fit", `A file’s name has ${withCommas(long)} characters; up to ${withCommas(MAX_FILE_NAME_CHARACTERS)} are kept with a read. Rename the file and send it again; nothing was stored.`);
    if (arrived.sizeBytes === 0) throw new AppError("does-not-fit", `${fileName} is empty: 0 bytes. Read the chip again and save the image; nothing was stored.`);
    const declared = fields.sha256[index];
    if (declared && declared !== arrived.sha256) {
      throw new AppError("does-not-fit", `${fileName} changed on its way: its SHA-256 here is ${arrived.sha256}, declared was ${declared}. Nothing was stored; send it again.`, { errors: [{ path: `sha256.${index}`, message: "Differs from the bytes that arrived." }] });
    }
  }
}

/** The image that a text file holds; the text itself is kept beside it as it came. Nothing malformed is stored. */
async function expandText({ format, base, size, fill }: ReadFields, file: UploadedFile): Promise<Incoming> {
  if (format === "raw") return { ...file, source: null };
  const result = await engine("expand", { file: file.arrived.path, format, window: { base: base!, size: size!, fill: fill! } });
  if ("refused" in result) throw new AppError("does-not-fit", `${file.fileName}: ${result.refused} Nothing was stored.`);
  return { fileName: file.fileName, arrived: await receive(Readable.from([Buffer.from(result.bytes.buffer, result.bytes.byteOffset, result.bytes.byteLength)])), source: file.arrived };
}

/** Compares with what is there already before any lock is taken: inside the transaction it is then a look-up. */
async function compareAhead(chipId: string, fields: ReadFields, files: Incoming[]): Promise<void> {
  const rows = await Read.findAll({ where: { chipId, stage: fields.stage, counted: true } });
  const known = new Map(rows.map((r) => [r.sha256.toString("hex"), r.sizeBytes]));
  for (const { arrived } of files) {
    for (const [sha256, sizeBytes] of known) {
      if (sha256 !== arrived.sha256) await compareIfStored({ sha256, sizeBytes }, arrived);
    }
    known.set(arrived.sha256, arrived.sizeBytes);
  }
}

async function createRead(tx: Transaction, actor: Actor, place: ChipPlace, fields: ReadFields, file: Incoming, index: number, transferId: string | null): Promise<Read> {
  const { chip, drive } = place;
  const number = ((await Read.max<number, Read>("number", { where: { chipId: chip.id, stage: fields.stage }, transaction: tx })) ?? 0) + 1;
  const taken = fields.takenAt[index] ?? null;
  const modified = fields.modifiedAt[index] ?? null;
  const equipment = {
    method: fields.method ?? null, toolVersion: fields.toolVersion ?? null, adapter: fields.adapter ?? null,
    clockKilohertz: fields.clockKilohertz ?? null, controllerHeld: fields.controllerHeld ?? null, note: fields.note ?? null,
  };
  const supply = fields.supplyMillivolts ?? null;
  const row = await Read.create({
    id: randomUUID(), chipId: chip.id, stage: fields.stage, number, seating: fields.seating, transferId, reader: fields.reader, ...equipment,
    supplyMillivolts: supply === "unknown" ? null : supply, supplyUnknown: supply === "unknown", format: fields.format, fileName: file.fileName,
    ...(file.source ? { sourceSha256: Buffer.from(file.source.sha256, "hex"), sourceBase: fields.base, sourceFill: fields.fill } : {}),
    modifiedAt: modified ? new Date(modified) : null, takenAt: taken ? new Date(taken) : null, storedAt: new Date(), operatorId: actor.id,
    sha256: Buffer.from(file.arrived.sha256, "hex"), sizeBytes: file.arrived.sizeBytes, crc32: file.arrived.crc32, findings: "[]", engineVersion: ENGINE_VERSION,
  }, { transaction: tx });
  await appendEntry(tx, drive.id, actor, "read.stored", { type: "read", id: row.id }, {
    read: { id: row.id, stage: row.stage, number }, chip: { id: chip.id, designator: chip.designator }, seating: row.seating,
    sizeBytes: row.sizeBytes, crc32: crc32Hex(row.crc32), sha256: file.arrived.sha256, format: row.format, fileName: row.fileName, reader: row.reader,
    ...equipment, supplyMillivolts: supply, statusBits: "not read", takenAt: row.takenAt?.toISOString() ?? null, modifiedAt: row.modifiedAt?.toISOString() ?? null, transfer: transferId,
    ...(file.source ? { source: { fileSha256: file.source.sha256, fileBytes: file.source.sizeBytes, base: fields.base!, fill: fields.fill! } } : {}),
  });
  return row;
}

async function recordReadBack(tx: Transaction, place: ChipPlace, read: Read, transferId: string, diagnosis: string): Promise<void> {
  const transfer = (await Transfer.findByPk(transferId, { transaction: tx }))!;
  const approval = (await Approval.findByPk(transfer.approvalId, { transaction: tx }))!;
  const sha256 = read.sha256.toString("hex");
  const facts = { read: { id: read.id, stage: read.stage, number: read.number }, chip: { id: place.chip.id, designator: place.chip.designator }, transfer: transferId, sha256 };
  const subject = { type: "read" as const, id: read.id };
  if (read.sha256.equals(approval.sha256)) await appendEntry(tx, place.drive.id, SYSTEM, "readback.verified", subject, facts);
  else await appendEntry(tx, place.drive.id, SYSTEM, "readback.differs", subject, { ...facts, approvedSha256: approval.sha256.toString("hex"), diagnosis });
}

/** A later read that differs, or one taken by the approver, brings a standing approval down. */
async function reviewApproval(tx: Transaction, actor: Actor, place: ChipPlace, rows: Read[]): Promise<void> {
  const standing = await Approval.findOne({ where: { chipId: place.chip.id, revokedAt: null }, transaction: tx });
  if (!standing) return;
  const odd = rows.find((r) => !r.sha256.equals(standing.sha256));
  if (odd) await revokeStanding(tx, SYSTEM, place.chip.id, "differing-read", `${readName("before", odd.number)} differs from the approved image.`);
  else if (standing.twoPersonRule && standing.approvedBy === actor.id) {
    await revokeStanding(tx, SYSTEM, place.chip.id, "approver-took-read", `${actor.name} approved the image and has now taken a read of the original.`);
  }
}
