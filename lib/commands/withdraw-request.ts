import { SYSTEM } from "@/lib/core/words";
import { env } from "@/lib/env";
import { AppError } from "@/lib/errors";
import { openRequest } from "@/lib/queries/open-request";
import { currentPolicy } from "@/lib/queries/policy";
import { dayIn } from "@/lib/queries/workshop-day";
import { inTransaction } from "@/models";
import { appendToCase, lockCase } from "./append-to-case";
import { notFound } from "./refuse";

const DAY_MS = 86_400_000;
export const WITHDRAWN = "Withdrawn by the customer before the parcel came";

/** The customer takes the request back, as long as the parcel is not here: the case is closed as cancelled. */
export async function withdrawRequest(token: string): Promise<void> {
  const open = await openRequest(token);
  if (!open) throw notFound("request");
  await inTransaction(async (tx) => {
    const { found, chains } = await lockCase(tx, open.case.id);
    if (found.receivedAt) throw new AppError("rule-against", "Your parcel is here already. Ask us to stop: by mail or telephone, with your case number.");
    if (found.closedAt) throw new AppError("rule-against", "This request is closed already. There is nothing left to withdraw.");
    const now = new Date();
    const { erasureDays } = await currentPolicy(tx);
    const eraseOn = dayIn(env().timeZone, new Date(now.getTime() + erasureDays * DAY_MS));
    await found.update({ closedAt: now, closedKind: "cancelled", closedReason: WITHDRAWN, eraseOn, waitingFor: null, waitingSince: null, holdReason: null }, { transaction: tx });
    await appendToCase(tx, chains, SYSTEM, "case.closed", { type: "case", id: found.id }, { caseRef: found.ref, kind: "cancelled", reason: WITHDRAWN, unverified: [], eraseOn });
  });
}
