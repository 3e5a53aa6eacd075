import { SYSTEM, WORKSHOP_CHAIN } from "@/lib/core/words";
import { keyring } from "@/lib/queries/keyring";
import { CustodyEntry, inTransaction } from "@/models";
import { logKey } from "@/storage";
import { appendEntry, lockChain } from "./append-entry";

/** The first entry of the workshop's chain names the key that signs the log, so that every bundle can show where it came from. */
export async function introduceKey(): Promise<void> {
  const { keyId, publicKeyPem } = logKey();
  await inTransaction(async (tx) => {
    await lockChain(tx, WORKSHOP_CHAIN);
    const rows = await CustodyEntry.findAll({ where: { chainId: WORKSHOP_CHAIN, action: "key.introduced" }, transaction: tx });
    if (keyring(rows, publicKeyPem).keys.has(keyId)) return;
    if (rows.length > 0) throw new Error("The log key in the data folder is not the one that the custody log knows. Put the former key back from your backup.");
    await appendEntry(tx, WORKSHOP_CHAIN, SYSTEM, "key.introduced", { type: "key", id: WORKSHOP_CHAIN }, { keyId, purpose: "log", publicKeyPem });
  });
}
