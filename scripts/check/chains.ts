import { createHash } from "node:crypto";
import type { Transaction } from "sequelize";
import { chainLine } from "@/lib/queries/custody";
import { CHAIN_PROBLEMS } from "@/lib/core/chain-words";
import { checkChain, signedBytes } from "@/lib/core/custody";
import { keyOrder } from "@/lib/core/keyring";
import { WORKSHOP_CHAIN } from "@/lib/core/words";
import { CustodyEntry, CustodyHead } from "@/models";
import { verifySignature } from "@/storage";
import { keyring, type Keyring } from "@/lib/queries/keyring";
import type { Ledger, LoggedSeal } from "./ledger";
import { noteEntry, type Logged, newLogged } from "./logged";
import type { Places } from "./places";
import type { Damage, StoreReport } from "./report";

export interface ChainsChecked {
  chains: StoreReport["chains"];
  signatures: number;
  keys: string[];
  damage: Damage[];
  logged: Logged;
  ledger: Ledger;
}

interface Gathered extends Omit<ChainsChecked, "ledger"> {
  entries: Map<string, Map<number, string>>;
  sealsMade: LoggedSeal[];
}

const sha256 = (bytes: Uint8Array) => createHash("sha256").update(bytes).digest("hex");

export async function checkChains(tx: Transaction, places: Places, keyInFolder: string | null): Promise<ChainsChecked> {
  const found: Gathered = { chains: [], signatures: 0, keys: [], damage: [], logged: newLogged(), entries: new Map(), sealsMade: [] };
  const heads = new Map((await CustodyHead.findAll({ transaction: tx, raw: true })).map((row) => [row.chainId, { seq: row.seq, hash: row.hash.toString("hex") }]));
  const inLog = await CustodyEntry.findAll({ attributes: ["chainId"], group: ["chainId"], transaction: tx, raw: true });
  const chains = new Set([WORKSHOP_CHAIN, ...heads.keys(), ...inLog.map((row) => row.chainId), ...places.driveIds]);
  const ring = await keys(tx, keyInFolder);
  found.keys = [...ring.keys.keys()];
  for (const { seq, sentence } of ring.problems) found.damage.push(damage(places, WORKSHOP_CHAIN, seq, "key", sentence));
  for (const chain of [...chains].sort()) await checkOne(tx, chain, heads.get(chain) ?? null, ring, places, found);
  const { entries, sealsMade, ...rest } = found;
  return { ...rest, ledger: { entries, sealsMade, ring, place: (chain) => places.chain(chain) } };
}

async function keys(tx: Transaction, fromFolder: string | null): Promise<Keyring> {
  const rows = await CustodyEntry.findAll({ where: { chainId: WORKSHOP_CHAIN, action: "key.introduced" }, order: ["seq"], transaction: tx, raw: true });
  return keyring(rows, fromFolder);
}

async function checkOne(tx: Transaction, chain: string, head: { seq: number; hash: string } | null, ring: Keyring, places: Places, found: Gathered): Promise<void> {
  const rows = await CustodyEntry.findAll({ where: { chainId: chain }, order: ["seq"], transaction: tx, raw: true });
  const findings = await checkChain(
    rows.map(chainLine),
    head, {
      sha256,
      knows: (keyId) => ring.keys.has(keyId),
      order: keyOrder(ring),
      verify: (keyId, bytes, signature) => verifySignature(ring.keys.get(keyId) ?? "", bytes, signature),
    }, chain,
  );
  for (const finding of findings) {
    found.damage.push({ ...damage(places, chain, finding.seq, finding.problem, CHAIN_PROBLEMS[finding.problem]), expected: finding.expected, found: finding.found });
  }
  if (rows.length === 0 && !head && chain !== WORKSHOP_CHAIN) found.damage.push(damage(places, chain, null, "no-log", "The drive has no log at all."));
  found.chains.push({ chain, place: places.chain(chain), entries: rows.length, head, findings: findings.length });
  found.signatures += rows.length;
  found.entries.set(chain, new Map(rows.map((row) => [row.seq, sha256(row.body)])));
  for (const row of rows) {
    const signed = () => verifySignature(ring.keys.get(row.keyId) ?? "", signedBytes(row.body), row.signature);
    noteEntry(row, found.logged);
    // whoever can put rows in must not make up seals: only a signed entry tells of one
    if (chain === WORKSHOP_CHAIN) found.sealsMade.push(...sealIn(row, signed));
  }
}

function sealIn(row: CustodyEntry, signed: () => boolean): LoggedSeal[] {
  try {
    const { action, facts } = JSON.parse(row.body.toString("utf8")) as { action: string; facts: LoggedSeal };
    return action === "seal.made" && signed() ? [{ ...facts, seq: row.seq }] : [];
  } catch {
    return [];
  }
}

export function damage(places: Places, chain: string, seq: number | null, problem: Damage["problem"], sentence: string): Damage {
  return { place: places.chain(chain), seq, problem, sentence, chain, sha256: null, reads: [] };
}
