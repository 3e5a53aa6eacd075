import type { Keyring } from "@/lib/core/keyring";

/** What a signed `seal.made` entry of the workshop's log tells of a seal. */
export interface LoggedSeal {
  /** of the entry */
  seq: number;
  number: number;
  sha256: string;
  root: string;
  chains: number;
  keyId: string;
  cause: string;
}

/** The logs as they are here, for what is held against them. */
export interface Ledger {
  /** of each chain: SHA-256 of each entry's body in hex, by its number */
  entries: ReadonlyMap<string, ReadonlyMap<number, string>>;
  ring: Keyring;
  sealsMade: readonly LoggedSeal[];
  /** name of a chain for people */
  place(chain: string): string;
}

/** Where a chain ends here; 0 where there is none. */
export function endOf(ledger: Ledger, chain: string): number {
  return Math.max(0, ...[...(ledger.entries.get(chain)?.keys() ?? [])].slice(-1));
}
