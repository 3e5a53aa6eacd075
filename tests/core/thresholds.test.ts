import { describe, expect, it } from "vitest";
import { compareImages } from "@/lib/core/compare";
import { diagnosePair, type Diagnosis } from "@/lib/core/diagnose-pair";
import { inspectWhole } from "@/lib/core/inspect";
import { pageWrap, protectedPart } from "@/lib/core/read-back-writes";
import { singleFindings } from "@/lib/core/single-findings";
import { joined, loseBits } from "./golden/bits";
import { wrapPages } from "./golden/recipes";
import { fill, stream } from "./stream";

/** Where a threshold of thresholds.ts decides, from both of its sides. */
const good = stream("bench-seed-1", 16_384);
const size = good.length;

function between(a: Uint8Array, b: Uint8Array): Diagnosis {
  return diagnosePair(a, b, inspectWhole(a), inspectWhole(b), { nameA: "Read 1", nameB: "Read 2", sizeBytes: Math.min(a.length, b.length) }).diagnosis;
}
function edited(edit: (bytes: Uint8Array) => void, from = good): Uint8Array {
  const out = from.slice();
  edit(out);
  return out;
}
const code = (edit: (bytes: Uint8Array) => void) => between(good, edited(edit)).code;
const said = (bytes: Uint8Array, sizeBytes = bytes.length) => singleFindings(inspectWhole(bytes), { sizeBytes, sizeSource: "marking" }).map((one) => one.code);
/** every byte of a stretch, by more than one bit */
const spoil = (b: Uint8Array, from: number, length: number) => { for (let i = from; i < from + length; i += 1) b[i] ^= 0x5a; };

describe("a short period", () => {
  const id = (n: number) => Uint8Array.from({ length: n }, (_, i) => [0x20, 0x40, 0x13][i % 3]);
  it("must make up a sixteenth of the chip", () => {
    expect(said(joined(id(300), fill(3796, 0xff)))).toContain("short-period");
    expect(said(joined(id(240), fill(3856, 0xff)))).not.toContain("short-period");
  });
  it("must hold for 98 % of the pairs", () => {
    // each byte that is off spoils two pairs
    const off = (n: number) => edited((b) => { for (let i = 0; i < n; i += 1) b[100 + i * 65] ^= 0x80; }, id(4096));
    expect(said(off(35))).toContain("short-period");
    expect(said(off(60))).not.toContain("short-period");
  });
});

describe("what is added to an image", () => {
  const advice = (over: number) => singleFindings(inspectWhole(good.subarray(0, 8192 + over)), { sizeBytes: 8192, sizeSource: "marking" }).find((one) => one.code === "extra-bytes")?.advice;
  it("is a header or a trailer up to 4 KiB, beyond that as well a larger chip", () => {
    expect(advice(4096)).not.toContain("larger chip");
    expect(advice(4097)).toContain("larger chip");
  });
  it("is found by 64 bytes of the image, unless they stand in it again and again", () => {
    const behind = (length: number) => between(good, joined(...Array.from({ length: 66 }, () => good.subarray(0, length)), good)).code;
    expect(behind(32)).toBe("extra-bytes");
    expect(behind(64)).toBe("different-length");
  });
});

describe("a slip", () => {
  const firstOf = (a: Uint8Array, b: Uint8Array) => compareImages(a, b).first!;
  /** from `tail` bytes before the end on, a byte is lost */
  const slipped = (tail: number) => loseBits(good, (size - tail) * 8, 8);
  /** `length` bytes in the middle stand a byte earlier */
  const moved = (from: number, length: number) => edited((b) => b.set(good.subarray(from + 1, from + 1 + length), from));
  it("is looked for in windows of 64 bytes; of 16 where there are fewer than 8", () => {
    for (const tail of [8192, 640, 530]) {
      const bad = slipped(tail);
      expect(between(good, bad)).toMatchObject({ code: "byte-slip", counts: { windows: Math.floor((size - firstOf(good, bad)) / 64) } });
    }
    for (const tail of [500, 320]) {
      const bad = slipped(tail);
      expect(between(good, bad)).toMatchObject({ code: "byte-slip", counts: { windows: Math.floor((size - firstOf(good, bad)) / 16) } });
    }
  });
  it("is a fifth of them at least", () => {
    expect(between(good, moved(4096, 3072)).code).toBe("byte-slip");
    expect(between(good, moved(4096, 1856)).code).toBe("foreign-blocks");
  });
  it("is two of them at least", () => {
    expect(between(good, moved(size - 640, 128))).toMatchObject({ code: "byte-slip", counts: { windows: 10, matched: 2 } });
    expect(between(good, moved(size - 640, 64)).code).toBe("foreign-blocks");
    expect(between(good, moved(size - 80, 48))).toMatchObject({ code: "byte-slip", counts: { windows: 5, matched: 2 } });
    expect(between(good, moved(size - 80, 32)).code).toBe("foreign-blocks");
  });
  it("takes 4,096 windows of a large image", () => {
    const large = stream("large", 1 << 20);
    expect(between(large, loseBits(large, 0, 8))).toMatchObject({ code: "byte-slip", counts: { windows: 4096 } });
  });
  it("is no slip in windows of fewer than 4 values", () => {
    const of = (values: number) => good.map((value) => 0x11 * (value % values));
    expect(between(of(5), loseBits(of(5), 4096 * 8, 8)).code).toBe("byte-slip");
    expect(between(of(3), loseBits(of(3), 4096 * 8, 8)).code).not.toMatch(/slip/);
  });
});

describe("stretches that differ", () => {
  it("bridge 8 equal bytes, not 9", () => {
    const two = (gap: number) => between(good, edited((b) => { b[5000] ^= 1; b[5001 + gap] ^= 1; })).counts;
    expect([two(8), two(9)]).toMatchObject([{ segments: 1 }, { segments: 2 }]);
  });
  it("are lost contact where 95 % of one side is one fill value", () => {
    const mixed = (others: number) => code((b) => { b.fill(0xff, 5000, 5100); for (let i = 0; i < others; i += 1) b[5001 + 2 * i] = good[5001 + 2 * i] ^ 0x5a; });
    expect([mixed(4), mixed(40)]).toEqual(["lost-contact", "foreign-blocks"]);
  });
  it("are flips where nine in ten bytes are off by one bit", () => {
    const flips = (single: number, more: number) => code((b) => {
      for (let i = 0; i < single; i += 1) b[1003 + 50 * i] ^= 1 << (i % 8);
      for (let i = 0; i < more; i += 1) b[8003 + 50 * i] ^= 0x5a;
    });
    expect([flips(18, 2), flips(17, 3), flips(12, 8)]).toEqual(["random-flips", "unclassified", "unclassified"]);
  });
  it("are foreign from 32 bytes on", () => {
    expect([20, 31, 32, 40].map((length) => code((b) => spoil(b, 5003, length)))).toEqual(["unclassified", "unclassified", "foreign-blocks", "foreign-blocks"]);
  });
  it("are foreign when they are off by more than 1.25 bits a byte", () => {
    const block = (pattern: readonly number[]) => code((b) => { for (let i = 0; i < 300; i += 1) b[5003 + i] ^= pattern[i % pattern.length]; });
    expect(block([3])).toBe("foreign-blocks");
    // 1.2 and 1.3 bits, fewer than nine in ten off by one bit
    expect(block([1, 2, 4, 8, 3])).toBe("unclassified");
    expect(block([1, 2, 4, 8, 16, 32, 64, 3, 3, 3])).toBe("foreign-blocks");
  });
  it("are foreign where at least half of them are long", () => {
    const beside = (small: number) => code((b) => { spoil(b, 1003, 300); for (let i = 0; i < small; i += 1) spoil(b, 2003 + 40 * i, 2); });
    expect([beside(100), beside(225)]).toEqual(["foreign-blocks", "unclassified"]);
  });
  it("are a buffer's edge within 8 bytes of a multiple of 256", () => {
    const from = (residue: number) => code((b) => [1, 4, 16, 32].forEach((block) => spoil(b, 256 * block + residue, 2)));
    expect([0, 7, 249].map(from)).toEqual(["buffer-edge", "buffer-edge", "buffer-edge"]);
    expect([8, 128, 248].map(from)).toEqual(["unclassified", "unclassified", "unclassified"]);
  });
  it("are a buffer's edge up to 64 bytes", () => {
    const edges = (length: number) => code((b) => [256, 1024, 4096, 8192].forEach((at) => spoil(b, at, length)));
    expect([edges(50), edges(64), edges(65)]).toEqual(["buffer-edge", "buffer-edge", "foreign-blocks"]);
  });
});

describe("noise", () => {
  const noise = stream("noise", 131_072);
  /** bytes of which a share, in turn a block each, lies in the lower and in the upper half; both halves equal over two blocks */
  const biased = (share: number, block: number) => noise.subarray(0, 65_536).map((value, i) => {
    const often = noise[65_536 + i] < share * 256;
    return (value & 0x7f) | ((Math.floor(i / block) % 2 === 0) === often ? 0 : 0x80);
  });
  const chiSquare = (bytes: Uint8Array) => Number(inspectWhole(bytes).whole?.chiSquare);
  it("is even in every 4 KiB, by entropy to 0.05 bits", () => {
    for (const image of [biased(0.65, 4096), biased(0.65, 2048), biased(0.61, 4096)]) {
      expect(chiSquare(image)).toBeGreaterThan(205.42);
      expect(chiSquare(image)).toBeLessThan(310.46);
    }
    // 0.066 bits short in each 4 KiB; the same with 2 KiB in turn; 0.035 bits short
    expect(said(biased(0.65, 4096))).toEqual([]);
    expect(said(biased(0.65, 2048))).toEqual(["noise-like"]);
    expect(said(biased(0.61, 4096))).toEqual(["noise-like"]);
  });
  it("is neither more nor less even than chance allows", () => {
    const skewed = edited((b) => { for (let i = 0; i < 230; i += 1) b[5 + i * 280] = 7; }, noise.slice(0, 65_536));
    expect(chiSquare(skewed)).toBeGreaterThan(320);
    expect(chiSquare(skewed)).toBeLessThan(600);
    expect(said(skewed)).toEqual([]);
    const even = joined(noise.subarray(0, 32_768), Uint8Array.from({ length: 32_768 }, (_, i) => (i * 77 + (i >> 8)) & 0xff));
    expect(chiSquare(even)).toBeGreaterThan(105);
    expect(chiSquare(even)).toBeLessThan(200);
    expect(said(even)).toEqual([]);
  });
});

describe("a write", () => {
  const old = stream("bench-seed-2", size);
  it("wraps in pages of 4 bytes to 4 KiB", () => {
    expect(pageWrap(wrapPages(good, old, 8, 4), good, old)).toEqual({ tool: 8, chip: 4 });
    expect(pageWrap(wrapPages(good, old, 4, 2), good, old)).toBeNull();
    expect(pageWrap(wrapPages(good, old, 4096, 256), good, old)).toEqual({ tool: 4096, chip: 256 });
    expect(pageWrap(wrapPages(good, old, 8192, 256), good, old)).toBeNull();
  });
  it("is kept from parts of a 64th, not of less", () => {
    const kept = (from: number) => protectedPart(edited((b) => b.set(old.subarray(from), from)), good, old);
    expect(kept(size - size / 64)).toEqual({ start: size - size / 64, length: size / 64 });
    expect(kept(size - size / 128)).toBeNull();
  });
});
