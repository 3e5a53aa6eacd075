import { type KeyPurpose, SYSTEM, WORKSHOP_CHAIN } from "@/lib/core/words";
import { CustodyEntry, inTransaction, type Transaction } from "@/models";
import { logKey, sealKey } from "@/storage";
import { appendEntry, lockChain } from "./append-entry";
import { settleKeys } from "./settle-keys";

/**
 * The first entry of the workshop's chain names the key that signs the log, the next one the key that signs seals, so
 * that every bundle can show where they came from. A change of key that was cut short is ended first.
 */
export async function introduceKey(): Promise<void> {
  await inTransaction(async (tx) => {
    await lockChain(tx, WORKSHOP_CHAIN);
    const ring = await settleKeys(tx);
    const known = (await CustodyEntry.count({ where: { chainId: WORKSHOP_CHAIN, action: "key.introduced" }, transaction: tx })) > 0;
    await introduce(tx, "log", ring.keys, known);
    await introduce(tx, "seal", ring.sealKeys, ring.sealKeys.size > 0);
  });
}

async function introduce(tx: Transaction, purpose: KeyPurpose, keys: Map<string, string>, known: boolean): Promise<void> {
  const { keyId, publicKeyPem } = purpose === "log" ? logKey() : sealKey();
  if ([...keys.keys()].at(-1) === keyId) return;
  if (keys.has(keyId)) throw new Error(`The ${purpose} key in the data folder is a former one: the log has introduced another since. Bring the newest folder keys back from your backup.`);
  if (known) throw new Error(`The ${purpose} key in the data folder is not the one that the custody log knows. Put the former key back from your backup.`);
  await appendEntry(tx, WORKSHOP_CHAIN, SYSTEM, "key.introduced", { type: "key", id: WORKSHOP_CHAIN }, { keyId, purpose, publicKeyPem });
}
