import { longDay } from "@/lib/core/erasure";
import type { Actor } from "@/lib/core/words";
import { env } from "@/lib/env";
import { AppError } from "@/lib/errors";
import { dayIn } from "@/lib/queries/workshop-day";
import type { KeepingInput } from "@/lib/schemas/erasure";
import { inTransaction } from "@/models";
import { appendToCase, lockCase } from "./append-to-case";
import { caseFor } from "./place";
import { allow } from "./refuse";

const wrongDay = (detail: string) => new AppError("does-not-fit", detail, { errors: [{ path: "until", message: detail }] });

/** The images of a closed case are kept beyond their day, until another one; without a day that keeping ends. */
export async function keepLonger(actor: Actor, caseId: string, { until, reason }: KeepingInput): Promise<{ keptUntil: string | null }> {
  allow(actor, "case.erase");
  await caseFor(actor, caseId);
  return inTransaction(async (tx) => {
    const { found, chains } = await lockCase(tx, caseId);
    if (!found.closedAt || !found.eraseOn) throw new AppError("rule-against", `Case ${found.ref} has no day of erasure yet: its images are kept anyway. It gets one when it is closed.`);
    if (until === null && !found.keptUntil) throw new AppError("rule-against", `The images of case ${found.ref} are not kept beyond ${longDay(found.eraseOn)}. There is no keeping to end.`);
    if (until !== null && until <= found.eraseOn) throw wrongDay(`They are kept until ${longDay(found.eraseOn)} anyway. Give a later day.`);
    if (until !== null && until <= dayIn(env().timeZone, new Date())) throw wrongDay("Give a day that is still to come.");
    await found.update({ keptUntil: until, keptReason: until === null ? null : reason }, { transaction: tx });
    await appendToCase(tx, chains, actor, "case.kept-longer", { type: "case", id: caseId }, { caseRef: found.ref, until, reason });
    return { keptUntil: until };
  });
}
