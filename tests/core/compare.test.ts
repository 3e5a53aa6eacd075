import { execFileSync } from "node:child_process";
import { mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import path from "node:path";
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { compareImages, createComparison, createWindowLane, RANGES_KEPT, type Comparison } from "@/lib/core/compare";
import { crc32Hex, crc32Of } from "@/lib/core/digest";
import { goldenImage, stream } from "./stream";

function naive(a: Uint8Array, b: Uint8Array) {
  const size = Math.max(a.length, b.length);
  const differing: number[] = [];
  let [zeroToOne, oneToZero] = [0, 0];
  for (let i = 0; i < size; i += 1) {
    if (a[i] !== b[i]) differing.push(i);
    if (i >= a.length || i >= b.length) continue;
    for (let bit = 0; bit < 8; bit += 1) {
      const [x, y] = [(a[i] >> bit) & 1, (b[i] >> bit) & 1];
      if (x < y) zeroToOne += 1;
      if (x > y) oneToZero += 1;
    }
  }
  const ranges: { start: number; length: number }[] = [];
  for (const at of differing) {
    const open = ranges.at(-1);
    if (open && open.start + open.length === at) open.length += 1;
    else ranges.push({ start: at, length: 1 });
  }
  return { differingBytes: differing.length, zeroToOne, oneToZero, ranges, first: differing[0] ?? null, last: differing.at(-1) ?? null };
}

/** Two images that share most bytes. */
const pair = fc.tuple(fc.uint8Array({ minLength: 1, maxLength: 600 }), fc.array(fc.tuple(fc.nat(700), fc.nat(255)), { maxLength: 40 }), fc.nat(20))
  .map(([a, edits, cut]) => {
    const b = a.slice(0, Math.max(1, a.length - cut));
    for (const [at, value] of edits) if (at < b.length) b[at] = value;
    return [a, b] as const;
  });

describe("comparison", () => {
  it("agrees with a naive loop, in any chunks and at any alignment", () => {
    fc.assert(fc.property(pair, fc.integer({ min: 1, max: 600 }), fc.nat(7), fc.nat(7), ([a, b], step, shiftA, shiftB) => {
      const [heldA, heldB] = [new Uint8Array(a.length + shiftA), new Uint8Array(b.length + shiftB)];
      heldA.set(a, shiftA);
      heldB.set(b, shiftB);
      const common = Math.min(a.length, b.length);
      const comparison = createComparison(a.length, b.length);
      for (let at = 0; at < common; at += step) {
        const end = Math.min(at + step, common);
        comparison.push(heldA.subarray(shiftA + at, shiftA + end), heldB.subarray(shiftB + at, shiftB + end));
      }
      const found = comparison.finish();
      expect(found).toMatchObject(naive(a, b));
      expect(found).toEqual(compareImages(a, b));
      expect(found.equal).toBe(a.length === b.length && a.every((byte, i) => byte === b[i]));
      if (Math.max(a.length, b.length) >= 256) expect(found.cells.reduce((x, y) => x + y)).toBe(found.differingBytes);
    }), { numRuns: 300 });
  });
  it("is symmetric: only the direction of the bits swaps", () => {
    fc.assert(fc.property(pair, ([a, b]) => {
      const [there, back] = [compareImages(a, b), compareImages(b, a)];
      const swapped: Comparison = {
        ...back, sizeA: back.sizeB, sizeB: back.sizeA, zeroToOne: back.oneToZero, oneToZero: back.zeroToOne, fillInA: back.fillInB, fillInB: back.fillInA,
      };
      expect(there).toEqual(swapped);
    }));
  });
  it("counts what cmp counts", () => {
    const folder = mkdtempSync(path.join(tmpdir(), "twinread-cmp-"));
    try {
      const a = stream("bench-seed-1", 65_536);
      const b = a.slice();
      stream("edits", 900).forEach((value, i) => { b[(i * 7919) % b.length] = value; });
      writeFileSync(path.join(folder, "a"), a);
      writeFileSync(path.join(folder, "b"), b);
      let listed = "";
      try {
        execFileSync("cmp", ["-l", path.join(folder, "a"), path.join(folder, "b")]);
      } catch (error) {
        // cmp ends with 1 when files differ; its list is on standard output
        listed = String((error as { stdout: Buffer }).stdout);
      }
      const lines = listed.trim().split("\n").map((line) => Number(line.trim().split(/\s+/)[0]) - 1);
      const found = compareImages(a, b);
      expect(found.differingBytes).toBe(lines.length);
      expect([found.first, found.last]).toEqual([lines[0], lines.at(-1)]);
      expect(found.ranges.flatMap((range) => Array.from({ length: range.length }, (_, i) => range.start + i))).toEqual(lines);
    } finally {
      rmSync(folder, { recursive: true });
    }
  });
  it("keeps 10,000 ranges, says that it left some off, and still counts all", () => {
    const a = new Uint8Array(40_000);
    const b = a.map((_, i) => i % 2);
    const found = compareImages(a, b);
    expect(found.ranges).toHaveLength(RANGES_KEPT);
    expect(found).toMatchObject({ truncated: true, differingBytes: 20_000, first: 1, last: 39_999 });
    const exact = compareImages(new Uint8Array(20_000), new Uint8Array(20_000).map((_, i) => i % 2));
    expect(exact).toMatchObject({ truncated: false });
  });
  it("passes over 64 MiB of equal bytes in seconds at most", () => {
    const chunk = stream("bench-seed-1", 1 << 20);
    const twin = chunk.slice();
    const comparison = createComparison(64 << 20, 64 << 20);
    const began = performance.now();
    for (let i = 0; i < 64; i += 1) comparison.push(chunk, twin);
    expect(comparison.finish().equal).toBe(true);
    expect(performance.now() - began).toBeLessThan(4000);
  });
  it("fills a window's lane with the differences of the window alone", () => {
    const a = goldenImage();
    const b = a.slice();
    b.fill(0x55, 0x300, 0x340);
    b[0x1000] ^= 1;
    const lane = createWindowLane({ offset: 0x300, length: 256, cells: 256 });
    for (let at = 0; at < 8192; at += 1000) lane.push(a.subarray(at, at + 1000), b.subarray(at, at + 1000), at);
    const cells = lane.finish();
    expect(cells).toHaveLength(256);
    expect(cells.reduce((x, y) => x + y)).toBe(a.slice(0x300, 0x340).filter((byte) => byte !== 0x55).length);
  });
});

describe("injected faults on the golden image", () => {
  const good = goldenImage();
  const changed = (edit: (bytes: Uint8Array) => void) => {
    const bytes = good.slice();
    edit(bytes);
    return bytes;
  };
  // counts computed with independent tools; a byte that already holds the fill does not differ
  it.each([
    ["a burst of FF", changed((b) => b.fill(0xff, 0x300, 0x340)), "7fd248db", 63, 270, 0],
    ["a burst of 00", changed((b) => b.fill(0x00, 0x300, 0x340)), "5a8d28ee", 64, 0, 242],
    ["one flipped bit", changed((b) => { b[0x123] ^= 0x10; }), "0211aad0", 1, 0, 1],
    ["an inverted image", good.map((byte) => ~byte), "c2a91241", 8192, 16_089, 49_447],
  ])("%s", (_name, bad, crc, bytes, up, down) => {
    expect(crc32Hex(crc32Of(bad))).toBe(crc);
    const found = compareImages(good, bad);
    expect(found).toMatchObject({ differingBytes: bytes, zeroToOne: up, oneToZero: down });
  });
});
