import { describe, expect, it } from "vitest";
import { layOut, LINE, rowsBetween, topOf, type HexAsked } from "@/components/compare/hex-layout";
import { asHex, markLine, runsOf } from "@/components/compare/hex-rows";
import { firstReads, parseAddress, rangeAt, stepRange } from "@/components/compare/places";
import type { ReadView } from "@/lib/views";

const filled = (length: number, value = 0) => Array.from({ length }, () => value);
const heights = { line: 22, fold: 34, head: 29 };
const asked = (more: Partial<HexAsked>): HexAsked => ({ sizeBytes: 16 * 20, ranges: [], truncated: false, fold: true, here: 0, opened: [], heights, ...more });
const rowsOf = (more: Partial<HexAsked>) => {
  const layout = layOut(asked(more));
  return rowsBetween(layout, 0, layout.height).map((row) => (row.kind === "fold" ? `fold ${row.length}` : row.at));
};

describe("hex layout", () => {
  it("folds equal stretches and keeps one line around a difference and around where one is", () => {
    expect(rowsOf({ ranges: [{ start: 16 * 10 + 3, length: 1 }] })).toEqual([0, 16, "fold 112", 144, 160, 176, "fold 128"]);
  });

  it("folds no single line, neither between two differences nor at an end", () => {
    expect(rowsOf({ sizeBytes: 16 * 8, here: 16 * 2, ranges: [{ start: 16 * 6, length: 1 }] })).toEqual([0, 16, 32, 48, 64, 80, 96, 112]);
  });

  it("opens a fold on request, folds nothing when asked not to, and nothing past the last range that is known", () => {
    expect(rowsOf({ sizeBytes: 256, here: 0, opened: [{ start: 32, length: 224 }] })).toHaveLength(16);
    expect(rowsOf({ sizeBytes: 256, fold: false })).toHaveLength(16);
    expect(rowsOf({ sizeBytes: 16 * 12, ranges: [{ start: 16 * 5, length: 1 }], truncated: true })).toEqual([0, 16, "fold 32", 64, 80, 96, 112, 128, 144, 160, 176]);
    expect(rowsOf({ sizeBytes: 0 })).toEqual([]);
  });

  it("gives the last line the bytes that are left", () => {
    const layout = layOut(asked({ sizeBytes: 37, fold: false }));
    expect(rowsBetween(layout, 0, layout.height).map(({ length }) => length)).toEqual([16, 16, 5]);
  });

  it("draws of 64 MiB what is seen and no more, each row below the one before, at the height of its address", () => {
    const sizeBytes = 64 * 1024 * 1024;
    const ranges = Array.from({ length: 10_000 }, (_, i) => ({ start: i * 6700 + 5, length: 1 + (i % 40) }));
    for (const fold of [true, false]) {
      const layout = layOut(asked({ sizeBytes, ranges, fold, here: 0x200_0000 }));
      for (let from = 0; from < layout.height; from += Math.floor(layout.height / 97)) {
        const rows = rowsBetween(layout, from, from + 700);
        expect(rows.length).toBeLessThanOrEqual(34);
        rows.forEach((row, i) => {
          const next = rows[i + 1];
          expect(topOf(layout, row.at + row.length - 1)).toBe(row.top);
          if (next) expect([next.at, next.row, next.top]).toEqual([row.at + row.length, row.row + 1, row.top + heights[row.kind]]);
        });
        expect(rows[0].top).toBeLessThanOrEqual(from);
      }
      const rows = ranges.every(({ start, length }) => rowsBetween(layout, topOf(layout, start), topOf(layout, start + length) + 1).every(({ kind }) => kind === "line"));
      expect(rows, "a byte that differs is never folded away").toBe(true);
      expect(layout.rows).toBe(fold ? rowsBetween(layout, 0, layout.height).length : sizeBytes / LINE);
    }
  });
});

describe("hex rows", () => {
  it("show what is past the end of the shorter image as differing", () => {
    const line = markLine([[...filled(8), ...Array.from({ length: 8 }, () => null)], filled(16)], 1);
    expect(line.differing).toBe(8);
    expect(runsOf(line.bytes[0], line.marks[0]).map((run) => run.text).join("")).toBe("00 00 00 00 00 00 00 00  -- -- -- -- -- -- -- --");
  });

  it("keeps every line equally wide wherever bytes differ or were searched for", () => {
    const bytes = Array.from({ length: 16 }, (_, i) => i);
    for (const differs of [[], [0], [7, 8], [15], [3, 4, 5], bytes]) {
      for (const found of [[0, 0], [-3, 2], [7, 9], [14, 40], [0, 16]] as const) {
        const runs = runsOf(bytes, bytes.map((i) => (differs.includes(i) ? "odd" : "equal")), found);
        expect(runs.map((r) => r.text).join("")).toBe("00 01 02 03 04 05 06 07  08 09 0A 0B 0C 0D 0E 0F");
        const hits = runs.filter((run) => run.found).flatMap((run) => run.text.trim().split(/ +/));
        expect(hits.map((pair) => Number.parseInt(pair, 16))).toEqual(bytes.filter((i) => i >= found[0] && i < found[1]));
      }
    }
  });

  it("marks neither the gap before nor the gap after a differing run", () => {
    const bytes = filled(16, 0xff);
    const runs = runsOf(bytes, bytes.map((_, i) => (i === 4 || i === 5 ? "odd" : "equal")));
    expect(runs.filter((r) => r.mark !== "equal").map((r) => r.text)).toEqual(["FF FF"]);
  });

  it("go to the clipboard as pairs, 16 a line", () => {
    expect(asHex(Uint8Array.from({ length: 18 }, (_, i) => i * 9))).toBe("00 09 12 1B 24 2D 36 3F 48 51 5A 63 6C 75 7E 87\n90 99");
  });
});

describe("three reads", () => {
  it("mark at each byte who stands alone and what the others hold; each, where no two agree", () => {
    const [a, b, c] = [filled(16), filled(16), filled(16)];
    [b[2], c[5], a[9], b[9]] = [1, 1, 1, 2];
    const line = markLine([a, b, c], 0);
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
