import { allow } from "@/lib/commands/refuse";
import { chipFor, driveLetter } from "@/lib/commands/place";
import { withCheck } from "@/lib/core/case-number";
import { crc32Hex } from "@/lib/core/digest";
import { handOutName } from "@/lib/core/hand-out-name";
import { FORMAT_ENDING } from "@/lib/core/text-format";
import type { Actor } from "@/lib/core/words";
import { AppError } from "@/lib/errors";
import type { WriteTicketView } from "@/lib/views";
import { Board, Chip } from "@/models";
import { chipRecords } from "./chip-records";
import { compositeBehind } from "./composite-behind";
import { people } from "./people";

const NONE = "No image of this chip is approved, so there is nothing to take to the programmer. A lead approves one on the chip's decision sheet; then the ticket can be printed.";

/** The write ticket of an original's chip: the approval that stands, else the last one with its revocation. */
export async function printWriteTicket(actor: Actor, caseId: string, chipId: string): Promise<WriteTicketView> {
  allow(actor, "case.read");
  const place = await chipFor(actor, chipId);
  const { records } = await chipRecords([place.drive.id]);
  const record = records.find((one) => one.chip.id === chipId || one.donor?.chip.id === chipId);
  const approval = record?.standing ?? record?.approvals.at(-1);
  if (place.case.id !== caseId || !record || !approval) throw new AppError("rule-against", NONE);
  const [donorChip, who] = [(await Chip.findByPk(approval.donorChipId))!, await people()];
  const donorBoard = (await Board.findByPk(donorChip.boardId))!;
  const sha256 = approval.sha256.toString("hex");
  const image = record.before.find((read) => read.counted && read.sha256.equals(approval.sha256)) ?? record.before.find((read) => read.sha256.equals(approval.sha256))!;
  const letter = driveLetter(record.drive);
  return {
    refChecked: withCheck(record.case.ref), driveLetter: letter, designator: record.chip.designator, holds: record.chip.holds ?? null,
    donor: { designator: donorChip.designator, boardNumber: donorBoard.boardNumber, revision: donorBoard.revision ?? null, marking: donorChip.marking ?? null },
    imageName: handOutName({ caseRef: record.case.ref, drive: letter, designator: record.chip.designator, stage: image.stage, number: image.number, sha256 }, FORMAT_ENDING.raw),
    sha256, crc32: crc32Hex(image.crc32), sizeBytes: image.sizeBytes, supplyMillivolts: donorChip.supplyMillivolts ?? null,
    programmer: record.transfers.at(-1)?.programmer ?? image.reader,
    approvedBy: who(approval.approvedBy).name, approvedAt: approval.givenAt.toISOString(), statement: approval.statement, twoPersonRule: approval.twoPersonRule,
    composite: compositeBehind(record, sha256) !== null,
    revoked: approval.revokedAt ? { by: who(approval.revokedBy ?? null).name, at: approval.revokedAt.toISOString(), cause: approval.revokedCause ?? "", reason: approval.revokedReason ?? "" } : null,
  };
}
