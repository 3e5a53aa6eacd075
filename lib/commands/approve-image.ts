import { randomUUID } from "node:crypto";
import { UniqueConstraintError } from "sequelize";
import { approvalRefusal } from "@/lib/core/approval";
import { crc32Hex } from "@/lib/core/digest";
import { type Actor, type Policy, readName } from "@/lib/core/words";
import { AppError } from "@/lib/errors";
import { approvalFacts } from "@/lib/queries/chip-facts";
import { type ChipRecord, chipRecords, recordOfChip } from "@/lib/queries/chip-records";
import { people } from "@/lib/queries/people";
import { currentPolicy } from "@/lib/queries/policy";
import { siblingsOfRecord } from "@/lib/queries/siblings";
import type { ApprovalInput } from "@/lib/schemas/approval";
import { Approval, inTransaction, Read, type Transaction } from "@/models";
import { appendEntry, lockChain } from "./append-entry";
import { chainIsClean } from "./chain-gate";
import { judgeChip } from "./judge-read";
import { chipFor, placeOfChip } from "./place";
import { allow } from "./refuse";
import { requireSoundImage } from "./report-image";

class AgainstRule extends Error {}

/**
 * A lead clears one image for writing to one donor chip. Everything is asked again under the chain's lock, so that a
 * read or another approval that came meanwhile counts. A refusal by a rule is itself an entry of the log.
 */
export async function approveImage(actor: Actor, chipId: string, input: ApprovalInput): Promise<{ id: string; sha256: string }> {
  allow(actor, "approval.give");
  const { drive, chip, board } = await chipFor(actor, chipId);
  if (board.role !== "original") throw new AppError("does-not-fit", "An approval belongs to the original's chip. Open its pair.");
  const read = await Read.findOne({ where: { chipId, stage: "before", sha256: Buffer.from(input.sha256, "hex") } });
  if (read) await requireSoundImage(input.sha256, read.sizeBytes, "approval");
  await requireSoundDonor(input.donorChipId);
  try {
    return await inTransaction(async (tx) => {
      await lockChain(tx, drive.id);
      await judgeChip(tx, await placeOfChip(chipId, tx));
      const record = (await recordOfChip(chipId, tx))!;
      const policy = await currentPolicy(tx);
      const facts = approvalFacts(record, policy, await chainIsClean(drive.id, tx));
      const refusal = approvalRefusal(facts, actor, input);
      if (refusal) throw new AgainstRule(refusal);
      return give(tx, actor, record, input, policy);
    });
  } catch (error) {
    const rule = error instanceof AgainstRule ? error.message : error instanceof UniqueConstraintError ? "Another approval of this chip stands already." : null;
    if (rule === null) throw error;
    await inTransaction((tx) => appendEntry(tx, drive.id, actor, "approval.refused", { type: "chip", id: chipId }, {
      chip: { id: chip.id, designator: chip.designator }, sha256: input.sha256, rule,
    }), { receipt: false });
    throw new AppError("rule-against", rule);
  }
}

/** The write destroys what the donor holds now, so its saved content must be there to the last bit. */
async function requireSoundDonor(donorChipId: string): Promise<void> {
  const own = await Read.findAll({ where: { chipId: donorChipId, stage: "donor", counted: true } });
  const sizes = new Map(own.map((r) => [r.sha256.toString("hex"), r.sizeBytes]));
  for (const [sha256, sizeBytes] of sizes) await requireSoundImage(sha256, sizeBytes, "approval");
}

async function give(tx: Transaction, actor: Actor, record: ChipRecord, input: ApprovalInput, policy: Policy): Promise<{ id: string; sha256: string }> {
  const held = record.before.filter((r) => r.counted && r.sha256.toString("hex") === input.sha256);
  const who = await people(tx);
  const { twoPersonRule } = policy;
  const siblings = await siblingsOfRecord((await chipRecords([record.drive.id], tx)).records, record, policy, tx);
  const donor = record.donor!;
  const approval = await Approval.create({
    id: randomUUID(), chipId: record.chip.id, donorChipId: input.donorChipId, sha256: Buffer.from(input.sha256, "hex"), approvedBy: actor.id,
    givenAt: new Date(), statement: input.statement, reasons: JSON.stringify(input.reasons), lookedAt: JSON.stringify(input.lookedAt), twoPersonRule,
  }, { transaction: tx });
  await appendEntry(tx, record.drive.id, actor, "approval.given", { type: "approval", id: approval.id }, {
    chip: { id: record.chip.id, designator: record.chip.designator },
    donorChip: { id: donor.chip.id, designator: donor.chip.designator, boardNumber: donor.board.boardNumber },
    sha256: input.sha256, sizeBytes: held[0].sizeBytes, crc32: crc32Hex(held[0].crc32), reads: held.map((r) => readName("before", r.number)),
    seatings: [...new Set(held.map((r) => r.seating))].sort((a, b) => a - b), statement: input.statement, reasons: input.reasons, lookedAt: input.lookedAt, twoPersonRule,
    readsTakenBy: [...new Set(record.before.map((r) => r.operatorId))].map((id) => ({ id, name: who(id).name })),
    ...(siblings.length > 0 ? { siblings: siblings.map(({ designator, label }) => ({ designator, state: label })) } : {}),
  });
  return { id: approval.id, sha256: input.sha256 };
}
