import { type Actor, type Policy, WORKSHOP_CHAIN } from "@/lib/core/words";
import { AppError } from "@/lib/errors";
import { currentPolicy } from "@/lib/queries/policy";
import type { PolicyInput } from "@/lib/schemas/policy";
import { inTransaction, PolicyRow } from "@/models";
import { appendEntry, lockChain } from "./append-entry";
import type { Change } from "./correct-facts";
import { allow } from "./refuse";

/** The admin's rules for the whole workshop; each change names what it was before. */
export async function changePolicy(actor: Actor, input: PolicyInput): Promise<Policy> {
  allow(actor, "policy.change");
  return inTransaction(async (tx) => {
    await lockChain(tx, WORKSHOP_CHAIN);
    const before = await currentPolicy(tx);
    const changes: Change[] = (Object.keys(before) as (keyof Policy)[]).filter((k) => before[k] !== input[k]).map((k) => ({ field: k, from: before[k], to: input[k] }));
    if (changes.length === 0) throw new AppError("does-not-fit", "Nothing would change: this is the policy already.");
    const { reads, ...rest } = input;
    await PolicyRow.update({ policyReads: reads, ...rest }, { where: { id: 1 }, transaction: tx });
    await appendEntry(tx, WORKSHOP_CHAIN, actor, "policy.changed", { type: "policy", id: WORKSHOP_CHAIN }, { changes });
    return input;
  });
}
