import { allow } from "@/lib/commands/refuse";
import type { Actor, Policy } from "@/lib/core/words";
import { PolicyRow, type Transaction } from "@/models";

/** The workshop's policy; one row, made by the migration. */
export async function currentPolicy(tx?: Transaction): Promise<Policy> {
  const row = (await PolicyRow.findByPk(1, { transaction: tx }))!;
  return {
    reads: row.policyReads, seatings: row.seatings, readBacks: row.readBacks, readBackSeatings: row.readBackSeatings,
    twoPersonRule: row.twoPersonRule, secondFactor: row.secondFactor, shareDays: row.shareDays, erasureDays: row.erasureDays,
  };
}

/** The rules as every member of staff may read them. */
export async function policyView(actor: Actor): Promise<Policy> {
  allow(actor, "policy.read");
  return currentPolicy();
}
