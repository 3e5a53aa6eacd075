import type { Actor } from "@/lib/core/words";
import { checkCustody } from "@/lib/queries/custody";
import type { CustodyCheckView } from "@/lib/views";
import { requireChain } from "./chain-for";
import { recordChainCheck } from "./record-chain-check";
import { allow } from "./refuse";

/** Checks one log as a whole because somebody asked, and writes down when and what was found. */
export async function checkChain(actor: Actor, chainId: string): Promise<CustodyCheckView> {
  allow(actor, "audit.read");
  await requireChain(actor, chainId);
  const check = await checkCustody(chainId);
  await recordChainCheck(chainId, check);
  return check;
}
