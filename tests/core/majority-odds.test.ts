import { describe, expect, it } from "vitest";
import {
  allRightChance, bitErrorAtMargin, byteConfidence, directionDecides, errorRateAtMost, errorRateFrom, expectedWrongBits,
  identicalChance, readsNeeded, sameWrongByteChance, voteBitError, wrongThoughIdentical,
} from "@/lib/core/majority-odds";

/** Every number is one of trade/MAJORITY.md D.2, computed there with exact fractions. */
const close = (found: number, wanted: number, digits: number) => expect(Math.abs(found / wanted - 1)).toBeLessThan(0.51 * 10 ** (1 - digits));
const KIB = 8 * 1024;
const KIB512 = 512 * KIB;

describe("the chance of a wrong bit after the vote", () => {
  it.each([
    [0.1, [2.8e-2, 8.56e-3, 2.728e-3, 8.9092e-4], 5],
    [0.01, [2.98e-4, 9.8506e-6, 3.416698e-7, 1.218536857e-8], 5],
    [0.001, [2.998e-6, 9.985006e-9, 3.491606998e-11, 1.255805397e-13], 7],
    [1e-4, [2.9998e-8, 9.99850006e-12, 3.49916007e-15, 1.259580054e-18], 9],
    [1e-5, [2.99998e-10, 9.999850001e-15, 3.499916001e-19, 1.259958001e-23], 10],
  ])("p = %s", (p, wanted, digits) => wanted.forEach((value, i) => close(voteBitError(3 + 2 * i, p), value, digits)));
  it("is that of one read for one read, and undefined for an even number", () => {
    expect(voteBitError(1, 0.001)).toBeCloseTo(0.001, 15);
    for (const n of [0, 2, 4, 2.5, -3]) expect(() => voteBitError(n, 0.001)).toThrow(RangeError);
  });
});

describe("a whole image", () => {
  it.each([
    [KIB512, 1e-3, 3, 12.57452, 3.459e-6], [KIB512, 1e-3, 5, 0.04188015, 0.958984707], [KIB512, 1e-3, 7, 1.464486e-4, 0.999853562],
    [KIB512, 1e-4, 3, 0.1258207, 0.881772905], [KIB512, 1e-4, 5, 4.193675e-5, 0.999958064],
    [8 * KIB, 1e-3, 3, 0.1964769, 0.821620046], [8 * KIB, 1e-3, 5, 6.543774e-4, 0.999345837],
  ])("%i bits at p = %s, %i reads", (bits, p, reads, wrong, right) => {
    close(expectedWrongBits(bits, reads, p), wrong, 7);
    close(allRightChance(bits, reads, p), right, right < 1e-3 ? 4 : 9);
  });
  it("needs as many reads as the table says", () => {
    const table: [number, number[]][] = [
      [1024, [11, 7, 5, 3, 3]], [4096, [13, 7, 5, 5, 3]], [8 * KIB, [15, 9, 5, 5, 3]], [64 * KIB, [15, 9, 7, 5, 5]],
      [KIB512, [17, 9, 7, 5, 5]], [2 * KIB512, [17, 11, 7, 5, 5]], [8 * KIB512, [17, 11, 7, 5, 5]],
    ];
    for (const [bits, wanted] of table) expect([1e-2, 1e-3, 1e-4, 1e-5, 1e-6].map((p) => readsNeeded(bits, p))).toEqual(wanted);
    expect(readsNeeded(KIB512, 0.49)).toBeNull();
  });
});

describe("the margin", () => {
  it("of one vote is worth one read, whatever the number of voters", () => close(bitErrorAtMargin(1, 1e-3), 1e-3, 12));
  it("carries the confidence", () => {
    close(bitErrorAtMargin(2, 1e-3), 1.002002e-6, 7);
    close(bitErrorAtMargin(3, 1e-3), 1.003006009e-9, 10);
    close(bitErrorAtMargin(5, 1e-3), 1.005015035e-15, 10);
    expect(byteConfidence([1, 3, 3, 3, 3, 3, 3, 3], 1e-3)).toBeCloseTo(0.998999993, 9);
  });
});

describe("two independent reads", () => {
  it("that are identical may both be wrong", () => {
    close(wrongThoughIdentical(KIB512, 1e-7), 4.194305e-8, 7);
    close(wrongThoughIdentical(KIB512, 1e-6), 4.194304e-6, 7);
    close(wrongThoughIdentical(KIB512, 1e-6, 2), 4.194304e-6, 7);
    close(wrongThoughIdentical(8 * KIB, 1e-5), 6.55371e-6, 7);
    // the page's 4.194317e-12 is the third power of p/(1-p), times N
    close(wrongThoughIdentical(KIB512, 1e-6, 3), 4.194317e-12, 7);
    close(identicalChance(KIB512, 1e-7), 0.432202608, 9);
    expect((1 - 1e-7) ** KIB512).toBeCloseTo(0.657421167, 9);
    close(sameWrongByteChance(1e-3), 7.888752762e-6, 10);
    close(sameWrongByteChance(1e-2), 6.952448886e-4, 10);
  });
  it("tell how often a bit is wrong", () => {
    close(errorRateFrom(12, KIB512), 1.430514e-6, 7);
    close(errorRateFrom(84, KIB512), 1.001368e-5, 7);
    expect(errorRateFrom(KIB512, KIB512)).toBe(0.5);
    close(errorRateAtMost(KIB512), 3.571191e-7, 7);
    close(errorRateAtMost(8 * KIB), 2.285562e-5, 7);
    close(errorRateAtMost(1024), 1.462762e-3, 7);
  });
});

it("calls a direction only where chance would not", () => {
  const least: [number, number][] = [[8, 8], [9, 9], [10, 10], [11, 12], [13, 15], [17, 20], [20, 25], [23, 30], [29, 40], [35, 50]];
  for (const [most, flips] of least) {
    expect(directionDecides(most, flips), `${most} of ${flips}`).toBe(true);
    expect(directionDecides(flips - most, flips)).toBe(true);
    if (most < flips || flips === 8) expect(directionDecides(most - 1, flips), `${most - 1} of ${flips}`).toBe(false);
  }
  for (let flips = 0; flips <= 7; flips += 1) expect(directionDecides(flips, flips)).toBe(false);
});
