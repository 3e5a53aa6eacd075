import { boardLabel, chipFolder, imagePath, VOTES_ENDING } from "@/lib/core/bundle-layout";
import { crc32Hex } from "@/lib/core/digest";
import { donorFit } from "@/lib/core/donor-fit";
import { readName } from "@/lib/core/words";
import type { ErasedView } from "@/lib/views";
import { erasedOf } from "@/lib/queries/erased-views";
import { people, type People } from "@/lib/queries/people";
import { readView } from "@/lib/queries/read-view";
import { derivedFacts } from "@/lib/core/derived";
import { FORMAT_ENDING } from "@/lib/core/text-format";
import { Approval, ApprovalRequest, Board, type Case, Chip, Customer, type Drive, Image, Read, type Transaction, Transfer } from "@/models";
import { bundleAround } from "./bundle-around";
import { bundlePhotos } from "./bundle-photos";
import { driveLetter } from "./place";

export interface BundleImage {
  path: string;
  sha256: string;
  sizeBytes: number;
}

export interface CaseRecord {
  /** the content of case.json, in a fixed order */
  record: Record<string, unknown>;
  images: BundleImage[];
  /** photos and documents, as they came */
  photos: BundleImage[];
  /** how many files were erased before */
  erased: number;
  /** false when any approval of the case was given without it */
  twoPersonRule: boolean;
}

interface Rows {
  boards: Board[];
  chips: Chip[];
  reads: Read[];
  approvals: Approval[];
  requests: ApprovalRequest[];
  transfers: Transfer[];
  /** bytes of what is kept beside images: texts as they came, reports of composites */
  sizes: Map<string, number>;
  erased: Map<string, ErasedView>;
  who: People;
}

/** The case as it stands while its chains are locked: for people and programs that have nothing but the bundle. */
export async function recordOfCase(tx: Transaction, found: Case, drives: Drive[], heads: Map<string, { seq: number; hash: string }>): Promise<CaseRecord> {
  const at = { transaction: tx };
  const boards = await Board.findAll({ where: { driveId: drives.map((d) => d.id) }, order: ["createdAt", "id"], ...at });
  const chips = await Chip.findAll({ where: { boardId: boards.map((b) => b.id) }, order: ["createdAt", "id"], ...at });
  const chipId = chips.map((c) => c.id);
  const reads = await Read.findAll({ where: { chipId }, order: ["stage", "number"], ...at });
  const beside = await Image.findAll({ where: { sha256: reads.flatMap(besides).map((one) => Buffer.from(one.sha256, "hex")) }, ...at });
  const rows: Rows = {
    boards, chips, reads, who: await people(tx), erased: await erasedOf([...reads.map((row) => row.sha256), ...beside.map((row) => row.sha256)], tx), sizes: new Map(beside.map((i) => [i.sha256.toString("hex"), i.sizeBytes])),
    approvals: await Approval.findAll({ where: { chipId }, order: ["givenAt", "id"], ...at }),
    requests: await ApprovalRequest.findAll({ where: { chipId }, order: ["askedAt", "id"], ...at }),
    transfers: await Transfer.findAll({ where: { chipId }, order: ["at", "id"], ...at }),
  };
  const customer = (await Customer.findByPk(found.customerId, at))!;
  const images: BundleImage[] = [];
  const photos = await bundlePhotos(tx, { caseId: found.id, drives, boards, chips, who: rows.who });
  const around = await bundleAround(tx, found.id, drives.map((drive) => drive.id), rows.who);
  const record = {
    ref: found.ref, id: found.id, requestedAt: found.requestedAt?.toISOString() ?? null, receivedAt: found.receivedAt?.toISOString() ?? null, recordedBy: found.createdBy ? rows.who(found.createdBy) : null, damage: found.damage, note: found.note ?? null,
    dueOn: found.dueOn ?? null, closedAt: found.closedAt?.toISOString() ?? null, closedReason: found.closedReason ?? null, receipt: around.receipt, returned: around.returned, ...(found.erasedAt ? { imagesErasedAt: found.erasedAt.toISOString() } : {}),
    customer: { name: customer.name, email: customer.email, phone: customer.phone ?? null, contact: customer.contact ?? null },
    drives: drives.map((drive, i) => ({
      number: i + 1, letter: driveLetter(drive), id: drive.id, partNumber: drive.partNumber ?? null, model: drive.model ?? null, serial: drive.serial ?? null,
      interface: drive.interface ?? null, capacity: drive.capacity ?? null, made: drive.made ?? null, firmware: drive.firmware ?? null, encryption: drive.encryption ?? null,
      recordedAt: drive.createdAt.toISOString(), logUpTo: heads.get(drive.id)!, boards: boardRecords(rows, drive.id, i + 1, images), startUpTests: around.startUpTests(drive.id), photos: photos.ofDrive.get(drive.id) ?? [],
    })),
    photos: photos.ofCase,
  };
  const gone = reads.flatMap((row) => [row.sha256.toString("hex"), ...besides(row).map((one) => one.sha256)]).filter((digest) => rows.erased.has(digest));
  const erased = gone.length + [...photos.ofCase, ...[...photos.ofDrive.values()].flat()].filter((photo) => photo.erased).length;
  return { record, images, photos: photos.files, erased, twoPersonRule: rows.approvals.every((a) => a.twoPersonRule) };
}

/** What is kept beside a read's image: the text it came as, the report of the vote. */
function besides(row: Read): { sha256: string; ending: string }[] {
  const derived = derivedFacts(row);
  return [
    ...(row.sourceSha256 ? [{ sha256: row.sourceSha256.toString("hex"), ending: `.${FORMAT_ENDING[row.format]}` }] : []),
    ...(derived ? [{ sha256: derived.reportSha256, ending: VOTES_ENDING }] : []),
  ];
}

function boardRecords(rows: Rows, driveId: string, drive: number, images: BundleImage[]) {
  const mine = rows.boards.filter((b) => b.driveId === driveId);
  const original = mine.find((b) => b.role === "original");
  return mine.map((board) => {
    const label = boardLabel(board.role, mine.filter((b) => b.role === board.role).indexOf(board) + 1);
    return {
      label, id: board.id, role: board.role, boardNumber: board.boardNumber, revision: board.revision ?? null, controllerMarking: board.controllerMarking ?? null,
      motorDriverMarking: board.motorDriverMarking ?? null, condition: board.condition ?? null, dataInController: board.dataInController ?? false, recordedAt: board.createdAt.toISOString(),
      fit: board.role === "donor" && original ? { ...donorFit(original, board), reason: board.fitReason ?? null } : null,
      chips: rows.chips.filter((c) => c.boardId === board.id).map((chip) => chipRecord(rows, chip, { drive, board: label, designator: chip.designator }, images)),
    };
  });
}

function chipRecord(rows: Rows, chip: Chip, place: { drive: number; board: string; designator: string }, images: BundleImage[]) {
  const { who } = rows;
  return {
    designator: chip.designator, id: chip.id, folder: chipFolder(place), bus: chip.bus, sizeBytes: chip.sizeBytes, sizeSource: chip.sizeSource,
    supplyMillivolts: chip.supplyMillivolts ?? "unknown", package: chip.package ?? null, marking: chip.marking ?? null, holds: chip.holds ?? null,
    needsTransfer: chip.needsTransfer, pairedWith: chip.pairedWithId ?? null,
    place: chip.placeX == null || chip.placeY == null ? null : { x: chip.placeX, y: chip.placeY }, recordedAt: chip.createdAt.toISOString(),
    reads: rows.reads.filter((r) => r.chipId === chip.id).map((row) => {
      const path = imagePath({ ...place, stage: row.stage, number: row.number });
      // what was erased keeps its name and digest in the record and is not among the files
      const gone = rows.erased.get(row.sha256.toString("hex"));
      if (!gone) images.push({ path, sha256: row.sha256.toString("hex"), sizeBytes: row.sizeBytes });
      for (const { sha256: digest, ending } of besides(row)) if (!rows.erased.has(digest)) images.push({ path: path.replace(/\.bin$/, ending), sha256: digest, sizeBytes: rows.sizes.get(digest)! });
      const { id, number, stage, seating, sizeBytes, crc32, sha256, counted, findings, ...rest } = readView(row, who);
      const { chipId: _chip, imageSound: _sound, erased: _erased, fileName, ...equipment } = rest;
      return { name: readName(stage, number), path, id, number, stage, seating, sizeBytes, crc32, sha256, counted, findings, originalFileName: fileName, ...equipment, ...(gone ? { erased: { at: gone.at, cause: gone.cause } } : {}) };
    }),
    approvalRequests: rows.requests.filter((r) => r.chipId === chip.id).map((r) => ({
      id: r.id, askedBy: who(r.askedBy), askedAt: r.askedAt.toISOString(), message: r.message ?? null,
      sentBack: r.sentBackAt ? { by: who(r.sentBackBy ?? null), at: r.sentBackAt.toISOString(), reason: r.sentBackReason ?? null } : null,
    })),
    approvals: rows.approvals.filter((a) => a.chipId === chip.id).map((a) => ({
      id: a.id, sha256: a.sha256.toString("hex"), crc32: crcOf(rows, a.sha256), composite: compositeOf(rows, chip.id, a.sha256), donorChip: a.donorChipId, approvedBy: who(a.approvedBy), givenAt: a.givenAt.toISOString(), statement: a.statement,
      reasons: JSON.parse(a.reasons) as Record<string, string>, twoPersonRule: a.twoPersonRule,
      revoked: a.revokedAt ? { at: a.revokedAt.toISOString(), by: who(a.revokedBy ?? null), cause: a.revokedCause ?? null, reason: a.revokedReason ?? null } : null,
    })),
    transfers: rows.transfers.filter((t) => t.chipId === chip.id).map((t) => ({
      id: t.id, approval: t.approvalId, kind: t.kind, donorChip: t.donorChipId, programmer: t.programmer ?? null, toolVersion: t.toolVersion ?? null,
      adapter: t.adapter ?? null, note: t.note ?? null, by: who(t.byUserId), at: t.at.toISOString(),
    })),
  };
}

/** "Read 6" where the approved image is a composite: nothing read it as a whole. Null when a read of the chip holds the same bytes. */
function compositeOf({ reads }: Rows, chipId: string, sha256: Buffer): string | null {
  const holders = reads.filter((r) => r.chipId === chipId && r.stage === "before" && r.sha256.equals(sha256));
  return holders.length > 0 && holders.every((r) => r.derived) ? readName("before", holders[0].number) : null;
}

function crcOf({ reads }: Rows, sha256: Buffer): string | null {
  const read = reads.find((r) => r.sha256.equals(sha256));
  return read ? crc32Hex(read.crc32) : null;
}
