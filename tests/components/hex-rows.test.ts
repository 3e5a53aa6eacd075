import { describe, expect, it } from "vitest";
import { hexRows, runsOf } from "@/components/compare/hex-rows";
import { parseAddress, rangeAt, stepRange } from "@/components/compare/places";

const filled = (length: number, value = 0) => new Uint8Array(length).fill(value);
const options = { fold: true, here: -1, opened: new Set<number>() };

describe("hex rows", () => {
  it("folds equal stretches and keeps one line around a difference", () => {
    const b = filled(16 * 20);
    b[16 * 10 + 3] = 1;
    const rows = hexRows({ a: filled(16 * 20), b, offset: 0x1000, length: 16 * 20 }, options);
    expect(rows.map((r) => (r.kind === "fold" ? `fold ${r.length}` : r.at - 0x1000))).toEqual(["fold 144", 144, 160, 176, "fold 128"]);
  });

  it("shows what is past the end of the shorter image as differing", () => {
    const rows = hexRows({ a: filled(8), b: filled(16), offset: 0, length: 16 }, options);
    expect(rows).toHaveLength(1);
    expect(rows[0]).toMatchObject({ differing: 8, bytes: [[0, 0, 0, 0, 0, 0, 0, 0, null, null, null, null, null, null, null, null], expect.anything()] });
  });

  it("opens a fold on request and folds nothing when asked not to", () => {
    const view = { a: filled(256), b: filled(256), offset: 0, length: 256 };
    expect(hexRows(view, options)).toEqual([{ kind: "fold", start: 0, length: 256 }]);
    expect(hexRows(view, { ...options, opened: new Set([0]) })).toHaveLength(16);
    expect(hexRows(view, { ...options, fold: false })).toHaveLength(16);
  });

  it("keeps every line equally wide wherever bytes differ", () => {
    const bytes = Array.from({ length: 16 }, (_, i) => i);
    for (const differs of [[], [0], [7, 8], [15], [3, 4, 5], bytes]) {
      const text = runsOf(bytes, bytes.map((i) => differs.includes(i))).map((r) => r.text).join("");
      expect(text).toBe("00 01 02 03 04 05 06 07  08 09 0A 0B 0C 0D 0E 0F");
    }
  });

  it("marks neither the gap before nor the gap after a differing run", () => {
    const bytes = Array.from({ length: 16 }, () => 0xff);
    const runs = runsOf(bytes, bytes.map((_, i) => i === 4 || i === 5));
    expect(runs.filter((r) => r.differs).map((r) => r.text)).toEqual(["FF FF"]);
  });
});

describe("places", () => {
  const ranges = [{ start: 10, length: 5 }, { start: 100, length: 1 }];
  it("finds the range of an address", () => {
    expect([0, 10, 12, 99, 100, 500].map((at) => rangeAt(ranges, at))).toEqual([-1, 0, 0, 0, 1, 1]);
  });
  it("goes round the end in both directions", () => {
    expect([0, 10, 100].map((at) => stepRange(ranges, at, 1)?.start)).toEqual([10, 100, 10]);
    expect([0, 10, 12, 100, 300].map((at) => stepRange(ranges, at, -1)?.start)).toEqual([100, 100, 10, 10, 100]);
    expect(stepRange([], 0, 1)).toBeNull();
  });
  it("reads addresses as people type them", () => {
    expect(["0x1F03A", "1f03ah", "1F03A", "126976", "0x1F 03A", "zz", ""].map(parseAddress)).toEqual([0x1f03a, 0x1f03a, 0x1f03a, 126976, 0x1f03a, null, null]);
  });
});
