import { canonicalJson } from "./canonical";
import { fromHex, toHex } from "./digest";
import { inclusionPath, leafHash, merkleRoot, rootFromPath, type Sha256 } from "./merkle";

/** The seal `twinread-seal/1` (CUSTODY.md): a signed statement of where every chain stood at a moment. */
export interface SealFacts {
  /** counts up by one from 1 */
  number: number;
  /** RFC 3339, UTC, "2026-11-03T09:14:05.123456Z" */
  at: string;
  chains: number;
  /** 64 lower-case hex digits */
  root: string;
  /** SHA-256 of the previous seal's text; ZERO_HASH for the first */
  prev: string;
}

/** Where one chain stands; `drive` is the chain's id, `head` the hash of its last entry in lower-case hex. */
export interface SealLeaf {
  drive: string;
  head: string;
  seq: number;
}

export interface SealProof {
  format: "twinread-proof/1";
  seal: number;
  chains: number;
  proofs: (SealLeaf & { index: number; path: string[] })[];
}

export const SEAL_FORMAT = "twinread-seal/1";

/** Exactly these bytes are signed. */
export function sealText({ number, at, chains, root, prev }: SealFacts): string {
  return `${SEAL_FORMAT}\n${number}\n${at}\n${chains}\n${root}\n${prev}\n`;
}

const SEAL = /^twinread-seal\/1\n([1-9]\d{0,9})\n(\d{4}-\d\d-\d\dT\d\d:\d\d:\d\d(?:\.\d{1,6})?Z)\n(0|[1-9]\d{0,9})\n([0-9a-f]{64})\n([0-9a-f]{64})\n$/;

/** Hostile input: null for anything that is not a seal to the letter. */
export function parseSeal(text: string): SealFacts | null {
  const found = SEAL.exec(text);
  if (!found) return null;
  const [, number, at, chains, root, prev] = found;
  return { number: Number(number), at, chains: Number(chains), root, prev };
}

/** Leaves in the order of the tree, by chain id. */
export function inLeafOrder(leaves: SealLeaf[]): SealLeaf[] {
  return [...leaves].sort((a, b) => (a.drive < b.drive ? -1 : a.drive > b.drive ? 1 : 0));
}

/** What a leaf's hash is taken over: canonical JSON of drive, head and seq. */
export function leafText({ drive, head, seq }: SealLeaf): string {
  return canonicalJson({ drive, head, seq });
}

const hashes = (leaves: SealLeaf[], sha256: Sha256) => leaves.map((leaf) => leafHash(new TextEncoder().encode(leafText(leaf)), sha256));

/** The root over leaves that are in leaf order, lower-case hex. */
export function sealRoot(leaves: SealLeaf[], sha256: Sha256): string {
  return toHex(merkleRoot(hashes(leaves, sha256), sha256));
}

/** Inclusion proofs of these chains, for leaves in leaf order. Throws a RangeError for a chain that isn't sealed. */
export function sealProof(seal: number, leaves: SealLeaf[], chains: string[], sha256: Sha256): SealProof {
  const all = hashes(leaves, sha256);
  const proofs = chains.map((chain) => {
    const index = leaves.findIndex((leaf) => leaf.drive === chain);
    if (index < 0) throw new RangeError(`Seal ${seal} says nothing of ${chain}.`);
    return { ...leaves[index], index, path: inclusionPath(all, index, sha256).map(toHex) };
  });
  return { format: "twinread-proof/1", seal, chains: leaves.length, proofs };
}

/** True when the proof leads from this leaf to the seal's root. Hostile input. */
export function proofHolds(seal: SealFacts, proof: SealProof["proofs"][number], sha256: Sha256): boolean {
  try {
    const leaf = leafHash(new TextEncoder().encode(leafText(proof)), sha256);
    const root = rootFromPath(leaf, proof.index, seal.chains, proof.path.map((step) => fromHex(step)), sha256);
    return root !== null && toHex(root) === seal.root;
  } catch {
    return false;
  }
}
