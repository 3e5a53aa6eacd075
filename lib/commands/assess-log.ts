import { type Actor, WORKSHOP_CHAIN } from "@/lib/core/words";
import { inTransaction } from "@/models";
import { appendEntry } from "./append-entry";
import { requireChain } from "./chain-for";
import { allow } from "./refuse";

/** An auditor has looked at a log that does not check out, a drive's or the workshop's, and says what to think of it. */
export async function assessLog(actor: Actor, chainId: string, input: { text: string }): Promise<{ seq: number; hash: string }> {
  allow(actor, "assessment.record");
  await requireChain(actor, chainId);
  const type = chainId === WORKSHOP_CHAIN ? "workshop" : "drive";
  return inTransaction((tx) => appendEntry(tx, chainId, actor, "log.assessed", { type, id: chainId }, { text: input.text }));
}
