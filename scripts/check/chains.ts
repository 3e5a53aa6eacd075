import { createHash } from "node:crypto";
import type { Transaction } from "sequelize";
import { CHAIN_PROBLEMS } from "@/lib/core/chain-words";
import { checkChain } from "@/lib/core/custody";
import { keyOrder } from "@/lib/core/keyring";
import { WORKSHOP_CHAIN } from "@/lib/core/words";
import { CustodyEntry, CustodyHead } from "@/models";
import { verifySignature } from "@/storage";
import { keyring, type Keyring } from "@/lib/queries/keyring";
import type { Places } from "./places";
import type { Damage, StoreReport } from "./report";

/** What the log says was stored or approved: the facts that a row must agree with. */
export interface Logged {
  reads: Map<string, { chain: string; seq: number; sha256: string; sizeBytes: number; crc32: string }>;
  approvals: Map<string, { chain: string; seq: number; sha256: string }>;
  /** ids of revoked approvals */
  revoked: Set<string>;
}

export interface ChainsChecked {
  chains: StoreReport["chains"];
  signatures: number;
  keys: string[];
  damage: Damage[];
  logged: Logged;
}

const sha256 = (bytes: Uint8Array) => createHash("sha256").update(bytes).digest("hex");

export async function checkChains(tx: Transaction, places: Places, keyInFolder: string | null): Promise<ChainsChecked> {
  const found: ChainsChecked = { chains: [], signatures: 0, keys: [], damage: [], logged: { reads: new Map(), approvals: new Map(), revoked: new Set() } };
  const heads = new Map((await CustodyHead.findAll({ transaction: tx, raw: true })).map((row) => [row.chainId, { seq: row.seq, hash: row.hash.toString("hex") }]));
  const inLog = await CustodyEntry.findAll({ attributes: ["chainId"], group: ["chainId"], transaction: tx, raw: true });
  const chains = new Set([WORKSHOP_CHAIN, ...heads.keys(), ...inLog.map((row) => row.chainId), ...places.driveIds]);
  const ring = await keys(tx, keyInFolder);
  found.keys = [...ring.keys.keys()];
  for (const { seq, sentence } of ring.problems) found.damage.push(damage(places, WORKSHOP_CHAIN, seq, "key", sentence));
  for (const chain of [...chains].sort()) await checkOne(tx, chain, heads.get(chain) ?? null, ring, places, found);
  return found;
}

async function keys(tx: Transaction, fromFolder: string | null): Promise<Keyring> {
  const rows = await CustodyEntry.findAll({ where: { chainId: WORKSHOP_CHAIN, action: "key.introduced" }, order: ["seq"], transaction: tx, raw: true });
  return keyring(rows, fromFolder);
}

async function checkOne(tx: Transaction, chain: string, head: { seq: number; hash: string } | null, ring: Keyring, places: Places, found: ChainsChecked): Promise<void> {
  const rows = await CustodyEntry.findAll({ where: { chainId: chain }, order: ["seq"], transaction: tx, raw: true });
  const findings = await checkChain(
    rows.map((row) => ({ body: row.body, hash: row.hash.toString("hex"), signature: row.signature.toString("base64"), keyId: row.keyId })),
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
  for (const row of rows) note(row, found.logged);
}

const NOTED = new Set(["read.stored", "approval.given", "approval.revoked"]);

/** Remembers what the entry says; one that cannot be read says nothing, and is named by the chain's check. */
function note(row: CustodyEntry, logged: Logged): void {
  if (!NOTED.has(row.action)) return;
  try {
    const { subject, facts } = JSON.parse(row.body.toString("utf8")) as { subject: { id: string }; facts: { sha256: string; sizeBytes: number; crc32: string } };
    const common = { chain: row.chainId, seq: row.seq, sha256: facts.sha256 };
    if (row.action === "read.stored") logged.reads.set(subject.id, { ...common, sizeBytes: facts.sizeBytes, crc32: facts.crc32 });
    else if (row.action === "approval.given") logged.approvals.set(subject.id, common);
    else logged.revoked.add(subject.id);
  } catch {
    return;
  }
}

export function damage(places: Places, chain: string, seq: number | null, problem: Damage["problem"], sentence: string): Damage {
  return { place: places.chain(chain), seq, problem, sentence, chain, sha256: null, reads: [] };
}
