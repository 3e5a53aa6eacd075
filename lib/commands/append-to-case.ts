import type { Action, Facts } from "@/lib/core/custody-actions";
import { type Actor, WORKSHOP_CHAIN } from "@/lib/core/words";
import { Case, Drive, type Transaction } from "@/models";
import { appendEntry, lockChain, type Subject } from "./append-entry";
import { notFound } from "./refuse";

/**
 * The first statement of a change to a case as a whole: locks the chains that tell of it (each of its drives in the order
 * of their ids, the workshop's where it has none yet), then the case itself.
 */
export async function lockCase(tx: Transaction, caseId: string): Promise<{ found: Case; chains: string[] }> {
  const drives = await Drive.findAll({ where: { caseId }, attributes: ["id"], transaction: tx });
  const chains = drives.length > 0 ? drives.map((drive) => drive.id).sort() : [WORKSHOP_CHAIN];
  for (const chain of chains) await lockChain(tx, chain);
  const found = await Case.findByPk(caseId, { transaction: tx, lock: tx.LOCK.UPDATE });
  if (!found) throw notFound("case");
  return { found, chains };
}

/** One entry of the same words in each of these chains. */
export async function appendToCase<A extends Action>(tx: Transaction, chains: readonly string[], actor: Actor, action: A, subject: Subject, facts: Facts<A>): Promise<void> {
  for (const chain of chains) await appendEntry(tx, chain, actor, action, subject, facts);
}
