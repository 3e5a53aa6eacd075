import type { Actor } from "@/lib/core/words";
import { AppError } from "@/lib/errors";
import type { HoldInput, ResumeInput } from "@/lib/schemas/note";
import { inTransaction } from "@/models";
import { appendToCase, lockCase } from "./append-to-case";
import { caseFor } from "./place";
import { allow } from "./refuse";
import { requireOpen } from "./require-open";

/** A case waits for somebody or something. What waits for the customer is shown to them, with the reason. */
export async function holdCase(actor: Actor, caseId: string, { waitingFor, reason }: HoldInput): Promise<{ since: string }> {
  allow(actor, "case.hold");
  await caseFor(actor, caseId);
  return inTransaction(async (tx) => {
    const { found, chains } = await lockCase(tx, caseId);
    requireOpen(found);
    const now = new Date();
    // a changed reason doesn't start the waiting afresh
    const since = found.waitingFor === waitingFor && found.waitingSince ? found.waitingSince : now;
    if (found.waitingFor === waitingFor && found.holdReason === reason) throw new AppError("does-not-fit", "Nothing would change: it waits for this already.");
    await found.update({ waitingFor, waitingSince: since, holdReason: reason }, { transaction: tx });
    await appendToCase(tx, chains, actor, "case.held", { type: "case", id: caseId }, { caseRef: found.ref, waitingFor, reason });
    return { since: since.toISOString() };
  });
}

export async function resumeCase(actor: Actor, caseId: string, input: ResumeInput): Promise<{ id: string }> {
  allow(actor, "case.hold");
  await caseFor(actor, caseId);
  return inTransaction(async (tx) => {
    const { found, chains } = await lockCase(tx, caseId);
    requireOpen(found);
    const { waitingFor } = found;
    if (!waitingFor) throw new AppError("rule-against", "This case is not on hold.");
    await found.update({ waitingFor: null, waitingSince: null, holdReason: null }, { transaction: tx });
    await appendToCase(tx, chains, actor, "case.resumed", { type: "case", id: caseId }, { caseRef: found.ref, waitingFor, reason: input.reason ?? null });
    return { id: caseId };
  });
}
