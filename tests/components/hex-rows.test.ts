import { describe, expect, it } from "vitest";
import { foldLines, hexLines, type HexWindow, runsOf } from "@/components/compare/hex-rows";
import { firstReads, parseAddress, rangeAt, stepRange } from "@/components/compare/places";
import type { ReadView } from "@/lib/views";

const filled = (length: number, value = 0) => new Uint8Array(length).fill(value);
const hexRows = (view: HexWindow, how: Parameters<typeof foldLines>[1]) => foldLines(hexLines(view), how);
const options = { fold: true, here: -1, opened: new Set<number>() };

describe("hex rows", () => {
  it("folds equal stretches and keeps one line around a difference", () => {
    const b = filled(16 * 20);
    b[16 * 10 + 3] = 1;
    const rows = hexRows({ alone: 1, images: [filled(16 * 20), b], offset: 0x1000, length: 16 * 20 }, options);
    expect(rows.map((r) => (r.kind === "fold" ? `fold ${r.length}` : r.at - 0x1000))).toEqual(["fold 144", 144, 160, 176, "fold 128"]);
  });

  it("shows what is past the end of the shorter image as differing", () => {
    const rows = hexRows({ alone: 1, images: [filled(8), filled(16)], offset: 0, length: 16 }, options);
    expect(rows).toHaveLength(1);
    expect(rows[0]).toMatchObject({ differing: 8, bytes: [[0, 0, 0, 0, 0, 0, 0, 0, null, null, null, null, null, null, null, null], expect.anything()] });
  });

  it("opens a fold on request and folds nothing when asked not to", () => {
    const view = { alone: 1, images: [filled(256), filled(256)], offset: 0, length: 256 };
    expect(hexRows(view, options)).toEqual([{ kind: "fold", start: 0, length: 256 }]);
    expect(hexRows(view, { ...options, opened: new Set([0]) })).toHaveLength(16);
    expect(hexRows(view, { ...options, fold: false })).toHaveLength(16);
  });

  it("keeps every line equally wide wherever bytes differ", () => {
    const bytes = Array.from({ length: 16 }, (_, i) => i);
    for (const differs of [[], [0], [7, 8], [15], [3, 4, 5], bytes]) {
      const text = runsOf(bytes, bytes.map((i) => (differs.includes(i) ? "odd" : "equal"))).map((r) => r.text).join("");
      expect(text).toBe("00 01 02 03 04 05 06 07  08 09 0A 0B 0C 0D 0E 0F");
    }
  });

  it("marks neither the gap before nor the gap after a differing run", () => {
    const bytes = Array.from({ length: 16 }, () => 0xff);
    const runs = runsOf(bytes, bytes.map((_, i) => (i === 4 || i === 5 ? "odd" : "equal")));
    expect(runs.filter((r) => r.mark !== "equal").map((r) => r.text)).toEqual(["FF FF"]);
  });
});

describe("three reads", () => {
  it("mark at each byte who stands alone and what the others hold; each, where no two agree", () => {
    const [a, b, c] = [filled(16), filled(16), filled(16)];
    [b[2], c[5], a[9], b[9]] = [1, 1, 1, 2];
    const [line] = hexRows({ images: [a, b, c], offset: 0, length: 16, alone: 0 }, options);
    if (line.kind !== "line") throw new TypeError("the line differs, so it is not folded");
    expect([2, 5, 9].map((i) => line.marks.map((marks) => marks[i]))).toEqual([["other", "odd", "other"], ["other", "other", "odd"], ["odd", "odd", "odd"]]);
    expect(line.differing).toBe(3);
    expect(runsOf([1, 2, 3], ["odd", "other", "equal"]).filter((run) => run.mark !== "equal").map((run) => run.text)).toEqual(["01", "02"]);
  });

  it("are what is shown first where three counted ones disagree", () => {
    const read = (number: number, sha256: string, counted = true) => ({ number, sha256, counted, stage: "before" }) as ReadView;
    expect(firstReads([read(1, "a"), read(2, "b"), read(3, "a"), read(4, "c")], "before")).toEqual([1, 3, 4]);
    expect(firstReads([read(1, "a"), read(2, "b"), read(3, "c")], "before")).toEqual([1, 2, 3]);
    expect(firstReads([read(1, "a"), read(2, "b"), read(3, "a", false)], "before")).toEqual([1, 2]);
    expect(firstReads([read(1, "a"), read(2, "a"), read(3, "a")], "before")).toEqual([1, 2]);
    expect(firstReads([read(1, "a"), read(2, "b", false)], "before")).toEqual([1, 2]);
    expect(firstReads([read(1, "a")], "before")).toBeNull();
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
