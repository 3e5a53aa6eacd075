import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { crc32Hex, crc32Of, fromHex } from "@/lib/core/digest";
import { DISPUTED_KEPT, voteBits, voteByte } from "@/lib/core/composite-vote";
import { ascii, fill, sha256Hex, stream } from "./stream";

/** The worked example of trade/MAJORITY.md D.3. */
const R1 = fromHex("554c495155452d444154412d30303030");
const R2 = fromHex("554e49515545ff444154412d30303031");
const R3 = fromHex("5546495155452d444154412d30303033");
const VOTED = ascii("UNIQUE-DATA-0001");

describe("the worked example", () => {
  it("is made of the published reads", () => {
    expect([R1, R2, R3].map((read) => crc32Hex(crc32Of(read)))).toEqual(["327b0ee4", "b61ed097", "cc7d2248"]);
    expect([R1, R2, R3].map(sha256Hex)).toEqual([
      "adcbefbeaca00c728cfa8b042db8c6f433129e7d28662ce560761e6aab45bcb7",
      "bc8592dd627a25f320928df68a281d9ff7f2c7f01865230b12a40259e3f78d53",
      "cb0c28686dcfab0e3c0dbfe8096ac0ba5f477e136be48c7b0fc4dcb7f3b77b3a",
    ]);
  });
  it("gives the published image although no two reads agree", () => {
    const vote = voteBits([R1, R2, R3]);
    expect(vote.bytes).toEqual(VOTED);
    expect(crc32Hex(crc32Of(vote.bytes))).toBe("edfa8fe3");
    expect(sha256Hex(vote.bytes)).toBe("f9210ace0c5ef23784f197c9dddf0e0b4a0faae0dfadcb2d27ea06eebc4c0e89");
    expect(vote.disputed.map(({ at, values, chosen, support, margin, standing }) => [at, values, chosen, support, margin, standing])).toEqual([
      [1, [0x4c, 0x4e, 0x46], 0x4e, 1, 1, "weak"],
      [6, [0x2d, 0xff, 0x2d], 0x2d, 2, 1, "weak"],
      [15, [0x30, 0x31, 0x33], 0x31, 1, 1, "weak"],
    ]);
    expect(vote.counts).toEqual({ firm: 0, weak: 3, constructed: 0, undecided: 0 });
    expect(vote.ranges).toEqual([{ start: 1, length: 1 }, { start: 6, length: 1 }, { start: 15, length: 1 }]);
  });
  it("stays the same and gets firm with two more reads", () => {
    const vote = voteBits([R1, R2, R3, VOTED, VOTED]);
    expect(vote.bytes).toEqual(VOTED);
    expect(vote.disputed.map(({ at, support, margin, standing }) => [at, support, margin, standing])).toEqual([[1, 3, 3, "firm"], [6, 4, 3, "firm"], [15, 3, 3, "firm"]]);
    expect(vote.bitsAtMargin[5]).toBe(8 * 13 + vote.disputed.flatMap((one) => one.margins).filter((margin) => margin === 5).length);
  });
});

it("calls a byte constructed that no read holds", () => {
  expect(voteByte(0, [1, 2, 4])).toMatchObject({ chosen: 0, support: 0, standing: "constructed" });
});
it("never chooses where as many vote for as against", () => {
  expect(voteByte(0, [0xf0, 0xf0, 0xf1, 0xf1])).toMatchObject({ margin: 0, standing: "undecided", margins: [4, 4, 4, 4, 4, 4, 4, 0] });
  expect(voteByte(0, [0xf0, 0xf0, 0xf0, 0xf1])).toMatchObject({ margin: 2, chosen: 0xf0, standing: "weak" });
});
it("refuses one image, and images of different lengths", () => {
  expect(() => voteBits([R1])).toThrow(RangeError);
  expect(() => voteBits([R1, R2, R3.subarray(1)])).toThrow(RangeError);
});
it("counts on past the list", () => {
  const size = DISPUTED_KEPT + 5;
  const vote = voteBits([fill(size, 0), fill(size, 1), fill(size, 1)]);
  expect(vote).toMatchObject({ disputedBytes: size, truncated: true, minorityVotes: size });
  expect(vote.disputed).toHaveLength(DISPUTED_KEPT);
  expect(vote.bytes.every((byte) => byte === 1)).toBe(true);
});

it("equals a vote taken bit by bit in the simplest way, at any length and alignment", () => {
  fc.assert(fc.property(fc.integer({ min: 1, max: 70 }), fc.integer({ min: 2, max: 7 }), fc.integer({ min: 0, max: 3 }), fc.integer({ min: 0, max: 1e6 }), (length, count, shift, seed) => {
    const base = stream(`vote-${seed}`, length);
    const reads = Array.from({ length: count }, (_, k) => {
      const noise = stream(`noise-${seed}-${k}`, length);
      const store = new Uint8Array(length + 4);
      store.set(base.map((byte, i) => (noise[i] < 40 ? byte ^ (1 << (noise[i] & 7)) : byte)), shift);
      return store.subarray(shift, shift + length);
    });
    const vote = voteBits(reads);
    const differing = [...base.keys()].filter((i) => reads.some((read) => read[i] !== reads[0][i]));
    expect(vote.disputed.map((one) => one.at)).toEqual(differing);
    for (let bit = 0; bit < 8 * length; bit += 1) {
      const ones = reads.filter((read) => (read[bit >> 3] >> (bit & 7)) & 1).length;
      expect((vote.bytes[bit >> 3] >> (bit & 7)) & 1).toBe(2 * ones > count ? 1 : 0);
    }
    expect(vote.bitsAtMargin.reduce((sum, n) => sum + n, 0)).toBe(8 * length);
    expect(Object.values(vote.counts).reduce((sum, n) => sum + n, 0)).toBe(vote.disputedBytes);
    expect(reads.every((read) => read.length === length)).toBe(true);
  }), { numRuns: 150 });
});
