import type { Keyring } from "@/lib/core/keyring";
import { WORKSHOP_CHAIN } from "@/lib/core/words";
import { keyring } from "@/lib/queries/keyring";
import { CustodyEntry, type Transaction } from "@/models";
import { dropNextKey, type KeyUse, nextKeyId, placeNextKey } from "@/storage";

const USES: readonly KeyUse[] = ["log", "seal"];

/**
 * Ends a change of key that a crash cut short: a waiting key that the log introduces comes into use, another is removed.
 * The workshop's chain has to be locked: whoever is changing a key holds that lock until its entry is committed.
 */
export async function settleKeys(tx: Transaction): Promise<Keyring> {
  const rows = await CustodyEntry.findAll({ where: { chainId: WORKSHOP_CHAIN, action: "key.introduced" }, order: ["seq"], transaction: tx });
  const ring = keyring(rows, null);
  for (const use of USES) {
    const waiting = nextKeyId(use);
    if (waiting === null) continue;
    if ((use === "log" ? ring.keys : ring.sealKeys).has(waiting)) placeNextKey(use, waiting);
    else dropNextKey(use);
  }
  return ring;
}
