import { type Actor, WORKSHOP_CHAIN } from "@/lib/core/words";
import { checkCustody } from "@/lib/queries/custody";
import type { CustodyCheckView } from "@/lib/views";
import { CustodyEntry, CustodyHead } from "@/models";
import { driveFor } from "./place";
import { recordChainCheck } from "./record-chain-check";
import { allow } from "./refuse";

/** Checks one log as a whole because somebody asked, and writes down when and what was found. */
export async function checkChain(actor: Actor, chainId: string): Promise<CustodyCheckView> {
  allow(actor, "audit.read");
  if (chainId === WORKSHOP_CHAIN) allow(actor, "workshop-log.read");
  else if (actor.cases || !(await isLeftBehind(chainId))) await driveFor(actor, chainId);
  const check = await checkCustody(chainId);
  await recordChainCheck(chainId, check);
  return check;
}

/** A log whose drive is gone from the records can be checked all the same: it is what an auditor looks for. */
async function isLeftBehind(chainId: string): Promise<boolean> {
  return (await CustodyHead.findByPk(chainId)) !== null || (await CustodyEntry.findOne({ attributes: ["seq"], where: { chainId } })) !== null;
}
