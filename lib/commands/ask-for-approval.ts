import { randomUUID } from "node:crypto";
import { agreement, deriveChipState } from "@/lib/core/chip-state";
import type { Actor } from "@/lib/core/words";
import { AppError } from "@/lib/errors";
import { stateFacts } from "@/lib/queries/chip-facts";
import { recordOfChip } from "@/lib/queries/chip-records";
import { currentPolicy } from "@/lib/queries/policy";
import type { ApprovalRequestInput } from "@/lib/schemas/approval";
import { ApprovalRequest, inTransaction } from "@/models";
import { appendEntry, lockChain } from "./append-entry";
import { chipFor } from "./place";
import { allow } from "./refuse";

/** Puts a chip on the leads' list, with a message. */
export async function askForApproval(actor: Actor, chipId: string, input: ApprovalRequestInput): Promise<{ id: string }> {
  allow(actor, "approval.ask");
  const { drive, chip, board } = await chipFor(actor, chipId);
  if (board.role !== "original") throw new AppError("does-not-fit", "Approval is asked for on the original's chip. Open its pair.");
  return inTransaction(async (tx) => {
    await lockChain(tx, drive.id);
    const record = (await recordOfChip(chipId, tx))!;
    const facts = { ...stateFacts(record, await currentPolicy(tx)), transfer: null };
    const state = deriveChipState(facts);
    const blocked = record.before.some((r) => r.counted && r.findings.includes('"severity":"blocks"'));
    if (state.state !== "ready" && (state.state !== "held" || blocked)) throw new AppError("rule-against", `Approval can't be asked for yet. ${state.sentence}`);
    const request = await ApprovalRequest.create({ id: randomUUID(), chipId, askedBy: actor.id, askedAt: new Date(), message: input.message ?? null }, { transaction: tx });
    await appendEntry(tx, drive.id, actor, "approval.asked", { type: "chip", id: chipId }, {
      chip: { id: chip.id, designator: chip.designator }, sha256: agreement(facts.reads.filter((r) => r.counted)).largest?.sha256 ?? null, message: input.message ?? null,
    });
    return { id: request.id };
  });
}

/** A lead sends the request back with a reason. */
export async function sendBack(actor: Actor, chipId: string, input: { reason: string }): Promise<{ id: string }> {
  allow(actor, "approval.send-back");
  const { drive, chip } = await chipFor(actor, chipId);
  return inTransaction(async (tx) => {
    await lockChain(tx, drive.id);
    const request = await ApprovalRequest.findOne({ where: { chipId }, order: [["askedAt", "DESC"]], transaction: tx });
    if (!request || request.sentBackAt) throw new AppError("rule-against", "No request for approval is open on this chip, so there is nothing to send back.");
    await request.update({ sentBackBy: actor.id, sentBackAt: new Date(), sentBackReason: input.reason }, { transaction: tx });
    await appendEntry(tx, drive.id, actor, "approval.sent-back", { type: "chip", id: chipId }, { chip: { id: chip.id, designator: chip.designator }, reason: input.reason });
    return { id: request.id };
  });
}
