import { createPublicKey } from "node:crypto";
import * as rules from "@/lib/core/keyring";
import { keyIdOf, verifySignature } from "@/storage";

export type { KeyEntry, Keyring } from "@/lib/core/keyring";

/** The keys that the workshop's log introduces, checked with Node's own crypto; the rules are lib/core/keyring.ts. */
export function keyring(entries: rules.KeyEntry[], fromFolder: string | null): rules.Keyring {
  return rules.keyring(entries, { keyId: idOf, verify: verifySignature }, fromFolder);
}

function idOf(pem: string): string | null {
  try {
    return keyIdOf(createPublicKey(pem));
  } catch {
    return null;
  }
}
