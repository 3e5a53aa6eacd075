import { allow, notFound } from "@/lib/commands/refuse";
import { chipFor, driveLetter } from "@/lib/commands/place";
import { withCheck } from "@/lib/core/case-number";
import { crc32Hex } from "@/lib/core/digest";
import { handOutName } from "@/lib/core/hand-out-name";
import { encryptionCaution } from "@/lib/core/encryption";
import { FORMAT_ENDING } from "@/lib/core/text-format";
import { siblingWords } from "@/lib/core/two-chips";
import type { Actor } from "@/lib/core/words";
import { AppError } from "@/lib/errors";
import { uuid } from "@/lib/schemas/text";
import type { WriteTicketView } from "@/lib/views";
import { type Approval, Board, Chip } from "@/models";
import { type ChipRecord, chipRecords } from "./chip-records";
import { compositeBehind } from "./composite-behind";
import { people } from "./people";
import { currentPolicy } from "./policy";
import { seenBy } from "./seen-by";
import { siblingsOfRecord } from "./siblings";

const NONE = "No image of this chip is approved, so there is nothing to take to the programmer. A lead approves one on the chip's decision sheet; then the ticket can be printed.";

/** The chip of this case whose ticket was asked for, with its approval: the one that stands, else the last one. */
async function approved(actor: Actor, caseId: string, chipId: string): Promise<{ record: ChipRecord; records: ChipRecord[]; approval: Approval } | null> {
  allow(actor, "case.read");
  if (!uuid.safeParse(chipId).success) throw notFound("chip");
  const place = await chipFor(actor, chipId);
  if (place.case.id !== caseId) throw notFound("chip of this case");
  const { records } = await chipRecords([place.drive.id]);
  const record = records.find((one) => one.chip.id === chipId || one.donor?.chip.id === chipId);
  const approval = record?.standing ?? record?.approvals.at(-1);
  return record && approval ? { record, records, approval } : null;
}

/** Why there is no ticket; null when there is one. */
export async function ticketRefusal(actor: Actor, caseId: string, chipId?: string): Promise<string | null> {
  if (!chipId) return "A ticket is for one chip. Open the chip and print it there.";
  return (await approved(actor, caseId, chipId)) ? null : NONE;
}

/** The write ticket of an original's chip. One whose approval was revoked says so, and is printed void. */
export async function printWriteTicket(actor: Actor, caseId: string, chipId: string): Promise<WriteTicketView> {
  const found = await approved(actor, caseId, chipId);
  if (!found) throw new AppError("rule-against", NONE);
  const { record, records, approval } = found;
  const siblings = await siblingsOfRecord(records, record, await currentPolicy());
  const [donorChip, who] = [(await Chip.findByPk(approval.donorChipId))!, await people()];
  const donorBoard = (await Board.findByPk(donorChip.boardId))!;
  const sha256 = approval.sha256.toString("hex");
  const image = record.before.find((read) => read.counted && read.sha256.equals(approval.sha256)) ?? record.before.find((read) => read.sha256.equals(approval.sha256))!;
  const letter = driveLetter(record.drive);
  return seenBy(actor, {
    refChecked: withCheck(record.case.ref), driveLetter: letter, designator: record.chip.designator, holds: record.chip.holds ?? null,
    donor: { designator: donorChip.designator, boardNumber: donorBoard.boardNumber, revision: donorBoard.revision ?? null, marking: donorChip.marking ?? null },
    imageName: handOutName({ caseRef: record.case.ref, drive: letter, designator: record.chip.designator, stage: image.stage, number: image.number, sha256 }, FORMAT_ENDING.raw),
    sha256, crc32: crc32Hex(image.crc32), sizeBytes: image.sizeBytes, supplyMillivolts: donorChip.supplyMillivolts ?? null,
    programmer: record.transfers.at(-1)?.programmer ?? image.reader,
    approvedBy: who(approval.approvedBy).name, approvedAt: approval.givenAt.toISOString(), statement: approval.statement, twoPersonRule: approval.twoPersonRule,
    composite: compositeBehind(record, sha256) !== null, together: siblingWords(record.chip.designator, siblings), encrypted: encryptionCaution(record.drive.encryption ?? null) !== null,
    revoked: approval.revokedAt ? { by: who(approval.revokedBy ?? null).name, at: approval.revokedAt.toISOString(), cause: approval.revokedCause ?? "", reason: approval.revokedReason ?? "" } : null,
  });
}
