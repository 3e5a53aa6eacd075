import { createHash } from "node:crypto";
import { describe, expect, it } from "vitest";
import { fromHex, toHex } from "@/lib/core/digest";
import { inclusionPath, leafHash, merkleRoot, rootFromPath } from "@/lib/core/merkle";

const sha256 = (bytes: Uint8Array) => createHash("sha256").update(bytes).digest();
// the eight leaves that implementations of RFC 6962 and RFC 9162 test with; leaves and roots from memory, and the
// roots made again below from the RFC's own recursive definition
const LEAVES = ["", "00", "10", "2021", "3031", "40414243", "5051525354555657", "606162636465666768696a6b6c6d6e6f"].map(fromHex);
const ROOTS = [
  "6e340b9cffb37a989ca544e6bb780a2c78901d3fb33738768511a30617afa01d",
  "fac54203e7cc696cf0dfcb42c92a1d9dbaf70ad9e621f4bd8d98662f00e3c125",
  "aeb6bcfe274b70a14fb067a5e5578264db0fa9b51af5e0ba159158f329e06e77",
  "d37ee418976dd95753c1c73862b9398fa2a2cf9b4ff0fdfe8b30cd95209614b7",
  "4e3bbb1f7b478dcfe71fb631631519a3bca12c9aefca1612bfce4c13a86264d4",
  "76e67dadbcdf1e10e1b74ddc608abd2f98dfb16fbce75277b5232a127f2087ef",
  "ddb89be403809e325750d3d263cd78929c2942b7942a34b77e122c9594a74c8c",
  "5dc9da79a70659a9ad559cb701ded9a2ab9d823aad2f4960cfe370eff4604328",
];

/** RFC 9162, 2.1.1, word by word: MTH(D[0:k]) and MTH(D[k:n]) behind 0x01. */
function definition(data: Uint8Array[]): Buffer {
  if (data.length === 0) return sha256(new Uint8Array());
  if (data.length === 1) return sha256(Buffer.concat([Buffer.from([0]), data[0]]));
  let k = 1;
  while (2 * k < data.length) k *= 2;
  return sha256(Buffer.concat([Buffer.from([1]), definition(data.slice(0, k)), definition(data.slice(k))]));
}

describe("the tree of RFC 9162", () => {
  it("has the digest of nothing for a tree of no leaves", () => {
    expect(toHex(merkleRoot([], sha256))).toBe("e3b0c44298fc1c149afbf4c8996fb92427ae41e4649b934ca495991b7852b855");
  });
  it.each(ROOTS.map((root, i) => [i + 1, root] as const))("has the known root over %i leaves", (n, root) => {
    expect(toHex(merkleRoot(LEAVES.slice(0, n).map((leaf) => leafHash(leaf, sha256)), sha256))).toBe(root);
  });
  it("is the RFC's recursive definition for every size up to 40, and every path leads to its root and to no other place", () => {
    const data = Array.from({ length: 40 }, (_, i) => Buffer.from(`leaf ${i}`));
    for (let n = 1; n <= data.length; n += 1) {
      const leaves = data.slice(0, n).map((leaf) => leafHash(leaf, sha256));
      const root = toHex(merkleRoot(leaves, sha256));
      expect(root).toBe(definition(data.slice(0, n)).toString("hex"));
      for (let i = 0; i < n; i += 1) {
        const path = inclusionPath(leaves, i, sha256);
        const led = (index: number, size = n, steps = path) => {
          const found = rootFromPath(leaves[i], index, size, steps, sha256);
          return found && toHex(found);
        };
        expect(led(i)).toBe(root);
        for (let other = 0; other < n; other += 1) if (other !== i) expect(led(other)).not.toBe(root);
        expect(led(i, n, [...path, root === "" ? path[0] : fromHex(root)])).not.toBe(root);
        if (path.length > 0) expect(led(i, n, path.slice(1))).not.toBe(root);
      }
    }
  });
  it("refuses a leaf that is not there", () => {
    expect(() => inclusionPath([], 0, sha256)).toThrow(RangeError);
    expect(rootFromPath(new Uint8Array(32), 1, 1, [], sha256)).toBeNull();
    expect(rootFromPath(new Uint8Array(32), 0, 2, [], sha256)).toBeNull();
  });
});
