import { type Actor, WORKSHOP_CHAIN } from "@/lib/core/words";
import { CustodyEntry, CustodyHead } from "@/models";
import { driveFor } from "./place";
import { allow } from "./refuse";

/** Throws when this log is not there for the actor: a drive's, the workshop's, or one whose drive is gone from the records. */
export async function requireChain(actor: Actor, chainId: string): Promise<void> {
  if (chainId === WORKSHOP_CHAIN) allow(actor, "workshop-log.read");
  else if (actor.cases || !(await isLeftBehind(chainId))) await driveFor(actor, chainId);
}

/** A log whose drive is gone from the records can be checked all the same: it is what an auditor looks for. */
async function isLeftBehind(chainId: string): Promise<boolean> {
  return (await CustodyHead.findByPk(chainId)) !== null || (await CustodyEntry.findOne({ attributes: ["seq"], where: { chainId } })) !== null;
}
