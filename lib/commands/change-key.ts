import { type Actor, type KeyPurpose, WORKSHOP_CHAIN } from "@/lib/core/words";
import { AppError } from "@/lib/errors";
import type { KeyChangeInput } from "@/lib/schemas/seal";
import { inTransaction } from "@/models";
import { dropNextKey, logKey, makeNextKey, placeNextKey, sealKey } from "@/storage";
import { appendEntry, lockChain } from "./append-entry";
import { allow } from "./refuse";
import { settleKeys } from "./settle-keys";

export interface ChangedKey {
  purpose: KeyPurpose;
  keyId: string;
  formerKeyId: string;
}

/**
 * A new key in place of the one in use. It is on disk before the log introduces it, signed by the log key in use, and
 * comes into use after that; a crash at any point is ended at the next start (settle-keys).
 */
export async function changeKey(actor: Actor, { purpose, reason }: KeyChangeInput): Promise<ChangedKey> {
  allow(actor, "key.change");
  const changed = await inTransaction(async (tx): Promise<ChangedKey> => {
    await lockChain(tx, WORKSHOP_CHAIN);
    await settleKeys(tx);
    const formerKeyId = (purpose === "log" ? logKey() : sealKey()).keyId;
    const { keyId, publicKeyPem } = makeNextKey(purpose);
    try {
      await appendEntry(tx, WORKSHOP_CHAIN, actor, "key.introduced", { type: "key", id: WORKSHOP_CHAIN }, { keyId, purpose, publicKeyPem, reason });
    } catch (error) {
      dropNextKey(purpose);
      throw error;
    }
    return { purpose, keyId, formerKeyId };
  });
  try {
    placeNextKey(purpose, changed.keyId);
  } catch (error) {
    console.error("could not put a new key in place:", error);
    throw new AppError("unavailable", "The log has introduced the new key, but its file could not be put in place. Look at the disk of the data folder, then start Twinread again: it ends the change by itself.");
  }
  return changed;
}
