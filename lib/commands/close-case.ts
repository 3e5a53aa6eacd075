import { closeRefusal, erasureDay, unverifiedChips } from "@/lib/core/closing";
import type { Actor } from "@/lib/core/words";
import { env } from "@/lib/env";
import { AppError } from "@/lib/errors";
import { closingFacts, keepDays } from "@/lib/queries/closing";
import { dayIn } from "@/lib/queries/workshop-day";
import type { ClosingInput } from "@/lib/schemas/closing";
import { inTransaction } from "@/models";
import { appendToCase, lockCase } from "./append-to-case";
import { caseFor } from "./place";
import { allow } from "./refuse";

/** A lead releases the case: the bench is done with it, and its images get the day from which they are due for erasure. */
export async function closeCase(actor: Actor, caseId: string, { kind, reason = null }: ClosingInput): Promise<{ closedAt: string; eraseOn: string }> {
  allow(actor, "case.release");
  await caseFor(actor, caseId);
  return inTransaction(async (tx) => {
    const { found, chains } = await lockCase(tx, caseId);
    if (found.closedAt) throw new AppError("rule-against", `Case ${found.ref} is closed already. There is nothing left to close.`);
    const facts = await closingFacts(found, tx);
    const refusal = closeRefusal(facts, kind, reason);
    if (refusal) throw new AppError("rule-against", refusal);
    const closedAt = new Date();
    // what never went back is kept from the day on which the case ends
    const eraseOn = erasureDay(dayIn(env().timeZone, found.returnedAt ?? closedAt), await keepDays(caseId, tx));
    await found.update({ closedAt, closedKind: kind, closedReason: reason, eraseOn, waitingFor: null, waitingSince: null, holdReason: null }, { transaction: tx });
    await appendToCase(tx, chains, actor, "case.closed", { type: "case", id: caseId }, { caseRef: found.ref, kind, reason, unverified: unverifiedChips(facts), eraseOn });
    return { closedAt: closedAt.toISOString(), eraseOn };
  });
}
