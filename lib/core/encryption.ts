import type { Encryption } from "./words";

export const ENCRYPTION_WORDS: Record<Encryption, string> = { none: "None", suspected: "Suspected", yes: "Yes" };

export interface EncryptionCaution {
  title: string;
  text: string;
}

/** What every page of an encrypted drive says; null where it is not encrypted or nobody has said. */
export function encryptionCaution(encryption: Encryption | null): EncryptionCaution | null {
  if (encryption !== "suspected" && encryption !== "yes") return null;
  return {
    title: `${encryption === "yes" ? "Encrypted drive" : "Perhaps an encrypted drive"}: keep the enclosure’s small board and the drive together.`,
    text: "The small board may hold the key to the data. Images of the chips may hold key material too: each hand-out goes into the log.",
  };
}
