import { describe, expect, it } from "vitest";
import { compareImages } from "@/lib/core/compare";
import { loneImage, shares, threeWay, threeWayText } from "@/lib/core/compare-three";
import { stream } from "./stream";

const SIZE = 4096;
const good = stream("compare-three", SIZE);
const changed = (changes: [number, number][], length = SIZE) => {
  const bytes = good.slice(0, length);
  for (const [at, value] of changes) bytes[at] ^= value;
  return bytes;
};
const three = (a: Uint8Array, b: Uint8Array, c: Uint8Array) => threeWay(compareImages(a, b), compareImages(a, c), compareImages(b, c));

/** The same, byte by byte. */
function slowly(a: Uint8Array, b: Uint8Array, c: Uint8Array): (0 | 1 | 2 | null | "equal")[] {
  return Array.from({ length: Math.max(a.length, b.length, c.length) }, (_, i) => {
    const [x, y, z] = [a[i], b[i], c[i]];
    if (x === y && y === z) return "equal";
    return y === z ? 0 : x === z ? 1 : x === y ? 2 : null;
  });
}

describe("three images", () => {
  it("say at every byte the same as a look at each byte, whatever overlaps", () => {
    for (let seed = 1; seed < 60; seed += 1) {
      const at = (k: number) => (seed * 37 + k * k * 11) % 90;
      const images = [0, 1, 2].map((who) => changed(Array.from({ length: seed % 23 }, (_, k): [number, number] => [at(k * 3 + who * (seed % 5)), 1 + ((k + who) % 3)]), seed % 7 === 0 && who === 1 ? SIZE - 30 : SIZE));
      const [a, b, c] = images;
      const result = three(a, b, c);
      const told: (0 | 1 | 2 | null | "equal")[] = new Array<"equal">(SIZE).fill("equal");
      for (const part of result.parts) told.fill(part.alone, part.start, part.start + part.length);
      expect(told).toEqual(slowly(a, b, c));
      const { alone, none } = shares(result);
      expect(alone[0] + alone[1] + alone[2] + none).toBe(result.differingBytes);
      for (const [i, range] of result.ranges.entries()) if (i > 0) expect(range.start).toBeGreaterThan(result.ranges[i - 1].start + result.ranges[i - 1].length);
    }
  });

  it("say who stands alone", () => {
    const odd = three(good, changed([[10, 1], [11, 1], [900, 4]]), good);
    expect(odd).toMatchObject({ ranges: [{ start: 10, length: 2 }, { start: 900, length: 1 }], differingBytes: 3, truncated: false });
    expect(loneImage(odd)).toBe(1);
    expect(threeWayText(odd, ["Read 1", "Read 2", "Read 3"], SIZE)).toBe("3 bytes differ in 2 ranges, all in 0x00A–0x384. In each of them Read 2 stands alone.");
    const mixed = three(changed([[5, 1], [6, 1]]), changed([[6, 2], [70, 1]]), good);
    expect(mixed.parts).toEqual([{ start: 5, length: 1, alone: 0 }, { start: 6, length: 1, alone: null }, { start: 70, length: 1, alone: 1 }]);
    expect(threeWayText(mixed, ["Read 1", "Read 2", "Read 3"], SIZE)).toMatch(/^3 bytes differ in 2 ranges, .*\. Read 1 stands alone in 1 byte, Read 2 stands alone in 1 byte and in 1 byte no two agree\.$/);
    expect(threeWayText(three(good, good, good), ["Read 1", "Read 2", "Read 3"], SIZE)).toBe("Read 1, Read 2 and Read 3 are equal in all 4,096 bytes.");
  });

  it("claim nothing past the address that every list of ranges reaches", () => {
    const [ab, ac, bc] = [{ ranges: [{ start: 1, length: 1 }, { start: 5, length: 2 }], truncated: true }, { ranges: [{ start: 1, length: 1 }, { start: 5, length: 9 }, { start: 40, length: 1 }], truncated: false }, { ranges: [], truncated: false }];
    expect(threeWay(ab, ac, bc)).toEqual({ ranges: [{ start: 1, length: 1 }, { start: 5, length: 2 }], parts: [{ start: 1, length: 1, alone: 0 }, { start: 5, length: 2, alone: 0 }], differingBytes: 3, truncated: true });
  });
});
