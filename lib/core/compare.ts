import { addRun, mapCells, spreadBins, type CellWindow } from "./cells";
import { CELLS } from "./strip";
import type { Range } from "./words";

/** Ranges kept; what lies past them is still counted. */
export const RANGES_KEPT = 10_000;

/** Two images byte by byte. Counts in bytes, bits from A to B. Bytes past the shorter image count as differing. */
export interface Comparison {
  sizeA: number;
  sizeB: number;
  equal: boolean;
  differingBytes: number;
  /** bits 0 in A and 1 in B, over the common part */
  zeroToOne: number;
  oneToZero: number;
  /** maximal runs of consecutive differing bytes, in order */
  ranges: Range[];
  truncated: boolean;
  first: number | null;
  last: number | null;
  /** differing bytes in each of 256 cells over the longer image */
  cells: number[];
  /** differing bytes of the common part where A holds FF or 00; where B does; where both do (one FF, one 00) */
  fillInA: number;
  fillInB: number;
  fillInBoth: number;
}

const ONES = Uint8Array.from({ length: 256 }, (_, n) => n.toString(2).replaceAll("0", "").length);

function viewOf(bytes: Uint8Array): DataView {
  return new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
}

/** First differing index from `from` on, or `length`. Steps over equal stretches by words; needs no alignment. */
function nextDifference(a: Uint8Array, b: Uint8Array, viewA: DataView, viewB: DataView, from: number, length: number): number {
  let i = from;
  const words = length - 3;
  while (i < words && viewA.getInt32(i, true) === viewB.getInt32(i, true)) i += 4;
  while (i < length && a[i] === b[i]) i += 1;
  return i;
}

/** First equal index from `from` on, or `length`. */
function endOfRun(a: Uint8Array, b: Uint8Array, from: number, length: number): number {
  let i = from;
  while (i < length && a[i] !== b[i]) i += 1;
  return i;
}

export function createComparison(sizeA: number, sizeB: number): { push(a: Uint8Array, b: Uint8Array): void; finish(): Comparison } {
  const size = Math.max(sizeA, sizeB);
  const map = mapCells({ offset: 0, length: size, cells: CELLS });
  const counts = new Float64Array(map.bins);
  const ranges: Range[] = [];
  let [at, differingBytes, zeroToOne, oneToZero, fillInA, fillInB, fillInBoth] = [0, 0, 0, 0, 0, 0, 0];
  let truncated = false;
  let first: number | null = null;
  let last: number | null = null;

  function addDifference(start: number, end: number): void {
    addRun(counts, map, start, end);
    differingBytes += end - start;
    const open = ranges[ranges.length - 1];
    // a run that goes on from one chunk into the next is one range
    if (open && !truncated && open.start + open.length === start) open.length += end - start;
    else if (ranges.length < RANGES_KEPT) ranges.push({ start, length: end - start });
    else truncated = true;
    first ??= start;
    last = end - 1;
  }

  return {
    push(a, b) {
      const length = Math.min(a.length, b.length);
      const viewA = viewOf(a);
      const viewB = viewOf(b);
      for (let i = nextDifference(a, b, viewA, viewB, 0, length); i < length; ) {
        const end = endOfRun(a, b, i, length);
        addDifference(at + i, at + end);
        for (; i < end; i += 1) {
          const [x, y] = [a[i], b[i]];
          zeroToOne += ONES[~x & y & 0xff];
          oneToZero += ONES[x & ~y & 0xff];
          const [inA, inB] = [x === 0xff || x === 0, y === 0xff || y === 0];
          if (inA) fillInA += 1;
          if (inB) fillInB += 1;
          if (inA && inB) fillInBoth += 1;
        }
        i = nextDifference(a, b, viewA, viewB, i, length);
      }
      at += length;
    },
    finish() {
      const shorter = Math.min(sizeA, sizeB);
      if (shorter < size) addDifference(shorter, size);
      return {
        sizeA, sizeB, equal: differingBytes === 0, differingBytes, zeroToOne, oneToZero, ranges, truncated,
        first, last, cells: spreadBins(counts, map, CELLS), fillInA, fillInB, fillInBoth,
      };
    },
  };
}

export function compareImages(a: Uint8Array, b: Uint8Array): Comparison {
  const comparison = createComparison(a.length, b.length);
  comparison.push(a, b);
  return comparison.finish();
}

/**
 * Differing bytes a cell of a window. `push` takes the same stretch of both images with its absolute address;
 * where one of the two ends early the rest counts as differing.
 */
export function createWindowLane(window: CellWindow): { push(a: Uint8Array, b: Uint8Array, at: number): void; finish(): number[] } {
  const map = mapCells(window);
  const counts = new Float64Array(map.bins);
  const add = (from: number, to: number) => {
    const [start, end] = [Math.max(from - window.offset, 0), Math.min(to - window.offset, window.length)];
    if (start < end) addRun(counts, map, start, end);
  };
  return {
    push(a, b, at) {
      const length = Math.min(a.length, b.length);
      const viewA = viewOf(a);
      const viewB = viewOf(b);
      for (let i = nextDifference(a, b, viewA, viewB, 0, length); i < length; ) {
        const end = endOfRun(a, b, i, length);
        add(at + i, at + end);
        i = nextDifference(a, b, viewA, viewB, end, length);
      }
      add(at + length, at + Math.max(a.length, b.length));
    },
    finish: () => spreadBins(counts, map, window.cells),
  };
}
