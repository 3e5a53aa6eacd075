import type { Actor } from "@/lib/core/words";
import { AppError } from "@/lib/errors";
import type { ReopeningInput } from "@/lib/schemas/closing";
import { inTransaction } from "@/models";
import { appendToCase, lockCase } from "./append-to-case";
import { caseFor } from "./place";
import { allow } from "./refuse";

/** Work goes on with a closed case: its images are due for erasure no more until it is closed again, and an erasure before says nothing of what is stored from now on. */
export async function reopenCase(actor: Actor, caseId: string, { reason }: ReopeningInput): Promise<{ id: string }> {
  allow(actor, "case.release");
  await caseFor(actor, caseId);
  return inTransaction(async (tx) => {
    const { found, chains } = await lockCase(tx, caseId);
    if (!found.closedAt) throw new AppError("rule-against", `Case ${found.ref} is open. There is nothing to reopen.`);
    await found.update({ closedAt: null, closedKind: null, closedReason: null, eraseOn: null, erasedAt: null }, { transaction: tx });
    await appendToCase(tx, chains, actor, "case.reopened", { type: "case", id: caseId }, { caseRef: found.ref, reason });
    return { id: caseId };
  });
}
