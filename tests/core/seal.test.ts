import { createHash } from "node:crypto";
import { describe, expect, it } from "vitest";
import { inLeafOrder, leafText, parseSeal, proofHolds, type SealLeaf, sealProof, sealRoot, sealText } from "@/lib/core/seal";

const sha256 = (bytes: Uint8Array) => createHash("sha256").update(bytes).digest();
const hex = (text: string) => sha256(Buffer.from(text)).toString("hex");
const chain = (n: number) => `0b6a07e1-8853-4f70-8a00-${String(n).padStart(12, "0")}`;
const leavesOf = (n: number): SealLeaf[] => Array.from({ length: n }, (_, i) => ({ drive: chain(i), head: hex(`head ${i}`), seq: i + 1 }));
const facts = { number: 12, at: "2026-11-03T09:14:05.123456Z", chains: 3, root: hex("root"), prev: hex("prev") };

describe("a seal's text", () => {
  it("is six lines, each with its newline, as CUSTODY.md writes them", () => {
    expect(sealText(facts)).toBe(`twinread-seal/1\n12\n2026-11-03T09:14:05.123456Z\n3\n${hex("root")}\n${hex("prev")}\n`);
    expect(parseSeal(sealText(facts))).toEqual(facts);
  });

  it("is taken to the letter: nothing that differs in one character passes for the same seal", () => {
    const text = sealText(facts);
    for (let at = 0; at < text.length; at += 1) {
      for (const other of ["", "0", "G", "\r\n", " "]) {
        const changed = text.slice(0, at) + other + text.slice(at + 1);
        if (changed !== text) expect(parseSeal(changed), JSON.stringify(changed)).not.toEqual(facts);
      }
    }
    for (const odd of [text.slice(0, -1), `${text}\n`, `\ufeff${text}`, text.replace("\n12\n", "\n012\n"), text.replace("Z\n", "+00:00\n"), text.toUpperCase(), ""]) expect(parseSeal(odd)).toBeNull();
  });
});

describe("a seal's root", () => {
  // RFC 9162, 2.1.1, over the canonical leaves, written down a second time
  const tree = (data: Buffer[]): Buffer => {
    if (data.length === 1) return sha256(Buffer.concat([Buffer.from([0]), data[0]]));
    const k = 2 ** Math.ceil(Math.log2(data.length) - 1);
    return sha256(Buffer.concat([Buffer.from([1]), tree(data.slice(0, k)), tree(data.slice(k))]));
  };

  it("is the RFC's tree over leaves in canonical JSON, ordered by chain", () => {
    expect(leafText({ drive: chain(1), head: hex("h"), seq: 7 })).toBe(`{"drive":"${chain(1)}","head":"${hex("h")}","seq":7}`);
    for (const n of [1, 2, 3, 5, 8, 13]) {
      const shuffled = [...leavesOf(n)].reverse();
      expect(inLeafOrder(shuffled)).toEqual(leavesOf(n));
      expect(sealRoot(inLeafOrder(shuffled), sha256)).toBe(tree(leavesOf(n).map((leaf) => Buffer.from(leafText(leaf)))).toString("hex"));
    }
  });

  it("is another when any head, number or chain is", () => {
    const root = sealRoot(leavesOf(6), sha256);
    const others = [
      leavesOf(5), leavesOf(7), [...leavesOf(6)].reverse(), leavesOf(6).map((leaf, i) => (i === 3 ? { ...leaf, seq: 99 } : leaf)),
      leavesOf(6).map((leaf, i) => (i === 3 ? { ...leaf, head: hex("x") } : leaf)), leavesOf(6).map((leaf, i) => (i === 3 ? { ...leaf, drive: chain(99) } : leaf)),
    ];
    for (const other of others) expect(sealRoot(other, sha256)).not.toBe(root);
  });
});

describe("an inclusion proof", () => {
  const leaves = leavesOf(7);
  const seal = { ...facts, chains: 7, root: sealRoot(leaves, sha256) };

  it("leads from each leaf to the root, and from nothing else", () => {
    const { proofs, chains, seal: number } = sealProof(12, leaves, leaves.map((leaf) => leaf.drive), sha256);
    expect([number, chains, proofs.length]).toEqual([12, 7, 7]);
    for (const proof of proofs) {
      expect(proofHolds(seal, proof, sha256)).toBe(true);
      for (const wrong of [
        { ...proof, seq: proof.seq + 1 }, { ...proof, head: hex("x") }, { ...proof, drive: chain(99) }, { ...proof, index: (proof.index + 1) % 7 }, { ...proof, index: -1 },
        { ...proof, path: proof.path.slice(1) }, { ...proof, path: [...proof.path, hex("x")] }, { ...proof, path: proof.path.map((step) => step.toUpperCase().replace(/^./, "g")) },
      ]) expect(proofHolds(seal, wrong, sha256)).toBe(false);
      expect(proofHolds({ ...seal, chains: 8 }, { ...proof, index: 7 }, sha256)).toBe(false);
      expect(proofHolds({ ...seal, root: hex("another root") }, proof, sha256)).toBe(false);
    }
  });

  it("is not made for a chain that the seal does not hold", () => {
    expect(() => sealProof(12, leaves, [chain(99)], sha256)).toThrow(/says nothing of/);
  });
});
