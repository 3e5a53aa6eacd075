import { describe, expect, it } from "vitest";
import { cellWords, foldAgrees, stackSummary } from "@/components/strip/cell-words";
import { lanePaths, stripPaths } from "@/lib/core/strip-path";
import { nextDifference } from "@/components/strip/strip-grid";
import type { StripStackView } from "@/lib/views";

const SIZE = { width: 1, height: 32 };

describe("strip paths", () => {
  it("draws one path per class that occurs, and none for the others", () => {
    expect(stripPaths("oobb", SIZE).map((p) => p.cls)).toEqual(["o", "b"]);
  });

  it("joins neighbours of one class, so that a strip stays short", () => {
    expect(stripPaths("dddd", SIZE)[0].d).toBe("M0 0h4v32h-4z");
  });

  it("keeps cells apart when a gap is asked for (paper has no overlay)", () => {
    expect(stripPaths("dd", { width: 2, height: 8, gap: 0.5 })[0].d).toBe("M0 0h1.5v8h-1.5zM2 0h1.5v8h-1.5z");
  });

  it("draws ones high and zeros low", () => {
    const paths = Object.fromEntries(stripPaths("bz", SIZE).map((p) => [p.cls, p.d]));
    expect(paths).toEqual({ b: "M0 0h1v3h-1z", z: "M1 29h1v3h-1z" });
  });
});

describe("lanes", () => {
  it("is one unbroken line where both reads are equal", () => {
    expect(lanePaths(null, 64, { width: 1, height: 16 })).toEqual({ equal: "M0 7.5h64v1h-64z", differ: "" });
  });

  it("makes a tick higher the more bytes differ, and never hides a single one", () => {
    const heights = [...lanePaths([1, 16, 128], 3, { width: 1, height: 16 }).differ.matchAll(/v([\d.]+)/g)].map((m) => Number(m[1]));
    expect(heights).toEqual([7.2, 11.52, 16]);
  });
});

const cells = (letter: string) => letter.repeat(256);
const counts = Array.from({ length: 256 }, (_, i) => (i === 62 ? 131 : i === 63 ? 83 : 0));
const stack: StripStackView = {
  sizeBytes: 524_288, offset: 0, cellBytes: 2048, loupe: null,
  rows: [{ readId: "a", name: "Read 1", note: "", cells: cells("o") }, { readId: "b", name: "Read 2", note: "", cells: cells("o") }],
  lanes: [{ differingBytes: 214, cells: counts }],
};

describe("what a cell says", () => {
  it("names the addresses, the classes and the bytes that differ", () => {
    expect(cellWords(stack, 62, stack.sizeBytes)).toEqual({ span: "0x1F000–0x1F7FF", says: "all: ordinary data", differs: "131 bytes differ" });
  });

  it("says equal where nothing differs", () => {
    expect(cellWords(stack, 0, stack.sizeBytes).differs).toBe("equal");
  });

  it("goes round to the next and the previous difference", () => {
    expect([nextDifference(stack, 0, 1), nextDifference(stack, 63, 1), nextDifference(stack, 62, -1), nextDifference(stack, -1, 1)]).toEqual([62, 62, 63, 62]);
  });

  it("never folds reads into one strip where a byte differs", () => {
    expect([0, 1].map((segment) => foldAgrees(stack, segment))).toEqual([false, true]);
  });

  it("puts the picture into words", () => {
    expect(stackSummary(stack)).toBe("2 strips of 256 cells each. Read 1 and Read 2 differ in 214 bytes, in 2 cells of 256.");
  });
});
