import { joined } from "./bytes";

/**
 * The Merkle tree of RFC 9162, section 2.1: a leaf is hashed behind 0x00 and a node behind 0x01, so that neither can
 * stand for the other; the left half of n leaves holds the largest power of two below n. The digest comes in as an
 * argument, for server and browser alike.
 */
export type Sha256 = (bytes: Uint8Array) => Uint8Array;

export function leafHash(data: Uint8Array, sha256: Sha256): Uint8Array {
  return sha256(joined([[0], data]));
}

function nodeHash(left: Uint8Array, right: Uint8Array, sha256: Sha256): Uint8Array {
  return sha256(joined([[1], left, right]));
}

/** The largest power of two below `n`, for n of 2 or more. */
function split(n: number): number {
  let k = 1;
  while (k * 2 < n) k *= 2;
  return k;
}

/** The root over leaf hashes in their order; of no leaves it is the digest of nothing. */
export function merkleRoot(leaves: Uint8Array[], sha256: Sha256): Uint8Array {
  if (leaves.length === 0) return sha256(new Uint8Array());
  return rootOf(leaves, 0, leaves.length, sha256);
}

function rootOf(leaves: Uint8Array[], from: number, to: number, sha256: Sha256): Uint8Array {
  if (to - from === 1) return leaves[from];
  const middle = from + split(to - from);
  return nodeHash(rootOf(leaves, from, middle, sha256), rootOf(leaves, middle, to, sha256), sha256);
}

/** The hashes beside the way from leaf `index` up to the root, lowest first (2.1.3.1). Throws a RangeError for no such leaf. */
export function inclusionPath(leaves: Uint8Array[], index: number, sha256: Sha256): Uint8Array[] {
  if (!Number.isInteger(index) || index < 0 || index >= leaves.length) throw new RangeError(`There is no leaf ${index} among ${leaves.length}.`);
  const path: Uint8Array[] = [];
  let [from, to] = [0, leaves.length];
  while (to - from > 1) {
    const middle = from + split(to - from);
    if (index < middle) {
      path.push(rootOf(leaves, middle, to, sha256));
      to = middle;
    } else {
      path.push(rootOf(leaves, from, middle, sha256));
      from = middle;
    }
  }
  return path.reverse();
}

/** The root that a leaf, its place and its path lead to (2.1.3.2); null where the path can't belong to that place. */
export function rootFromPath(leaf: Uint8Array, index: number, size: number, path: Uint8Array[], sha256: Sha256): Uint8Array | null {
  if (!Number.isSafeInteger(index) || !Number.isSafeInteger(size) || index < 0 || index >= size) return null;
  let [fn, sn, r] = [index, size - 1, leaf];
  for (const p of path) {
    if (sn === 0) return null;
    if (fn % 2 === 1 || fn === sn) {
      r = nodeHash(p, r, sha256);
      while (fn % 2 === 0 && fn !== 0) [fn, sn] = [fn / 2, Math.floor(sn / 2)];
    } else {
      r = nodeHash(r, p, sha256);
    }
    [fn, sn] = [Math.floor(fn / 2), Math.floor(sn / 2)];
  }
  return sn === 0 ? r : null;
}
