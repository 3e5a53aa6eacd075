import type { Actor } from "@/lib/core/words";
import { AppError } from "@/lib/errors";
import { Approval, Chip, inTransaction, type Transaction } from "@/models";
import { appendEntry, lockChain } from "./append-entry";
import { chipFor, placeOfChip } from "./place";
import { allow, notFound } from "./refuse";

export type RevocationCause =
  | "lead" | "differing-read" | "below-policy" | "size-changed" | "pair-changed" | "image-damaged" | "approver-took-read";

/** Revokes the standing approval of a chip, if there is one, and says by what. The chain's head must be locked already. */
export async function revokeStanding(tx: Transaction, actor: Actor, chipId: string, cause: RevocationCause, reason: string): Promise<boolean> {
  const approval = await Approval.findOne({ where: { chipId, revokedAt: null }, transaction: tx });
  if (!approval) return false;
  await approval.update({ revokedAt: new Date(), revokedBy: actor.id, revokedCause: cause, revokedReason: reason }, { transaction: tx });
  const { chip, drive } = await placeOfChip(chipId, tx);
  await appendEntry(tx, drive.id, actor, "approval.revoked", { type: "approval", id: approval.id }, {
    chip: { id: chip.id, designator: chip.designator }, approval: approval.id, sha256: approval.sha256.toString("hex"), cause, reason,
  });
  return true;
}

/** A lead takes an approval back. */
export async function revokeApproval(actor: Actor, approvalId: string, input: { reason: string }): Promise<{ id: string; revoked: true }> {
  allow(actor, "approval.revoke");
  const approval = await Approval.findByPk(approvalId);
  const chip = approval && (await Chip.findByPk(approval.chipId));
  if (!approval || !chip) throw notFound("approval");
  const { drive } = await chipFor(actor, chip.id, undefined, "approval");
  return inTransaction(async (tx) => {
    await lockChain(tx, drive.id);
    const now = await Approval.findByPk(approvalId, { transaction: tx });
    if (!now || now.revokedAt) throw new AppError("rule-against", "This approval was revoked already. The custody log says by whom.");
    await revokeStanding(tx, actor, chip.id, "lead", input.reason);
    return { id: approvalId, revoked: true as const };
  });
}
