import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { inspectWhole, nearlyBlank, nearlyEmpty } from "@/lib/core/inspect";
import { address, addressDigits, classifyCell, createStrip, loupeWindow, placeText, rangeText, reduceCells, stripOf } from "@/lib/core/strip";
import { ascii, fill, goldenImage, stream } from "./stream";

const KIB512 = 512 * 1024;

function classOf(bytes: Uint8Array, expected = bytes.length): string {
  const histogram = new Uint32Array(256);
  for (const byte of bytes) histogram[byte] += 1;
  return classifyCell(histogram, bytes.length, expected);
}
const withShare = (n: number, value: number, share: number) => {
  const bytes = stream("cell", n).map((byte) => (byte === value ? 0x80 : byte));
  return bytes.fill(value, 0, Math.ceil(n * share));
};

describe("the class of a cell", () => {
  it.each([
    ["blank at 98.5 % FF", withShare(2000, 0xff, 0.985), "b"],
    ["not blank just below", withShare(2000, 0xff, 0.984), "o"],
    ["zeros at 98.5 % 00", withShare(2000, 0, 0.985), "z"],
    ["text-like", ascii("Drive parameters, revision C\r\n".repeat(20)), "t"],
    ["dense", stream("bench-seed-1", 2048), "d"],
    ["no denser than ordinary in a cell under 256 bytes", stream("bench-seed-1", 255), "o"],
    ["ordinary", Uint8Array.from({ length: 2048 }, (_, i) => (i * 7) % 90 + 128), "o"],
  ])("%s", (_name, bytes, letter) => expect(classOf(bytes)).toBe(letter));
  it("is not read when less than half of it is there", () => {
    expect(classOf(fill(1023, 0xff), 2048)).toBe("n");
    expect(classOf(fill(1024, 0xff), 2048)).toBe("b");
    expect(classOf(new Uint8Array(0), 2048)).toBe("n");
  });
});

describe("strips", () => {
  it("does not depend on how the image is cut into chunks, nor on their order", () => {
    const size = fc.integer({ min: 1, max: 3000 });
    fc.assert(fc.property(size, size, fc.boolean(), (length, step, backwards) => {
      const bytes = stream("strip", length);
      bytes.fill(0xff, 0, length >> 2);
      const strip = createStrip({ offset: 0, length, cells: 256 });
      const starts = Array.from({ length: Math.ceil(length / step) }, (_, i) => i * step);
      for (const at of backwards ? starts.reverse() : starts) strip.push(bytes.subarray(at, at + step), at);
      const cells = strip.finish();
      expect(cells).toHaveLength(256);
      expect(cells).toBe(stripOf(bytes, { offset: 0, length, cells: 256 }));
      expect(cells).not.toContain("n");
    }), { numRuns: 60 });
  });
  it("shows a window as the same cells of the bytes cut out", () => {
    const bytes = goldenImage();
    expect(stripOf(bytes, { offset: 4096, length: 2048, cells: 256 })).toBe(stripOf(bytes.slice(4096, 6144), { offset: 0, length: 2048, cells: 256 }));
  });
  it("shows what a short read left out as not read", () => {
    expect(stripOf(fill(4096, 0), { offset: 0, length: 8192, cells: 256 })).toBe("z".repeat(128) + "n".repeat(128));
  });
  it("repeats bytes where there are more cells than bytes", () => {
    expect(stripOf(Uint8Array.of(0xff, 0), { offset: 0, length: 2, cells: 256 })).toBe("b".repeat(128) + "z".repeat(128));
  });
  it("keeps gaps and data in a thumbnail", () => {
    expect(reduceCells(`${"bbbo"}${"zbbb"}${"bbbb"}${"dono"}`.repeat(16), 64).slice(0, 4)).toBe("ozbn");
    expect(reduceCells("b".repeat(256), 64)).toBe("b".repeat(64));
  });
});

describe("inspection", () => {
  it("counts the golden image", () => {
    const facts = inspectWhole(goldenImage());
    // computed with independent tools
    expect(facts).toMatchObject({ sizeBytes: 8192, dominantByte: 0xff, dominantCount: 4192, ffCount: 4192, zeroCount: 13, distinctValues: 256 });
    expect(nearlyEmpty(facts)).toBe(true);
    expect(nearlyBlank(facts)).toBe(false);
  });
  it("agrees with a naive count", () => {
    fc.assert(fc.property(fc.uint8Array({ minLength: 1, maxLength: 900 }), (bytes) => {
      const facts = inspectWhole(bytes);
      expect(facts.distinctValues).toBe(new Set(bytes).size);
      expect(facts.ffCount).toBe(bytes.filter((byte) => byte === 0xff).length);
      expect(facts.zeroCount).toBe(bytes.filter((byte) => byte === 0).length);
    }));
  });
  it("takes a whole 64 MiB chip in seconds at most", () => {
    const chunk = stream("bench-seed-1", 1 << 20);
    const image = new Uint8Array(64 << 20);
    for (let i = 0; i < 64; i += 1) image.set(chunk.map((value) => value ^ i), i << 20);
    const began = performance.now();
    expect(inspectWhole(image).sizeBytes).toBe(64 << 20);
    // 1 s on an idle machine; room for a busy one
    expect(performance.now() - began).toBeLessThan(8000);
  });
});

describe("addresses and the loupe", () => {
  it("writes addresses as wide as the chip needs", () => {
    expect([addressDigits(KIB512), addressDigits(8192), addressDigits(64 << 20)]).toEqual([5, 4, 7]);
    expect(address(0x1f000, KIB512)).toBe("0x1F000");
    expect(rangeText(0x1f000, 0x1000, KIB512)).toBe("0x1F000–0x1FFFF");
    expect(placeText(0x1f03a, 0x1fff9, KIB512)).toBe("all in 0x1F000–0x1FFFF");
    expect(placeText(0x123, 0x123, KIB512)).toBe("at 0x00123");
    expect(placeText(0, KIB512 - 1, KIB512)).toBe("all in 0x00000–0x7FFFF");
  });
  it("opens on the smallest aligned window, or not at all", () => {
    expect(loupeWindow(KIB512, 0x1f03a, 0x1fff9)).toEqual({ offset: 0x1f000, length: 0x1000 });
    expect(loupeWindow(KIB512, 5, 5)).toEqual({ offset: 0, length: 256 });
    expect(loupeWindow(KIB512, 0, KIB512 / 32)).toBeNull();
    expect(loupeWindow(KIB512, 0, KIB512 - 1)).toBeNull();
  });
  it("still opens on differences that straddle the middle of the chip", () => {
    expect(loupeWindow(KIB512, 0x3ffff, 0x40000)).toEqual({ offset: 0x3ff80, length: 256 });
  });
  it("always holds the differences and never leaves a power of two", () => {
    fc.assert(fc.property(fc.integer({ min: 8, max: 24 }), fc.nat(), fc.nat(), (bits, a, b) => {
      const size = 2 ** bits;
      const [first, last] = [a % size, Math.min(size - 1, (a % size) + (b % Math.max(1, size / 64)))];
      const window = loupeWindow(size, first, last);
      if (!window) return;
      expect(window.offset).toBeLessThanOrEqual(first);
      expect(window.offset + window.length).toBeGreaterThan(last);
      expect(Number.isInteger(Math.log2(window.length)) && window.length >= 256).toBe(true);
      expect(window.offset % (window.length / 2)).toBe(0);
    }));
  });
});
