import { createCellCounters } from "./cells";
import { CELLS, cellsOf } from "./strip";

/** What one image shows by itself. Sizes and counts in bytes. */
export interface ImageFacts {
  sizeBytes: number;
  distinctValues: number;
  /** the most common value, the lowest of several */
  dominantByte: number;
  dominantCount: number;
  ffCount: number;
  zeroCount: number;
  /** 256 strip cells over the image's own size */
  cells: string;
}

/**
 * Streaming inspection: chunks in order, one pass, memory that doesn't grow with the image. `sizeBytes` is the
 * image's whole size; bytes past it are not counted.
 */
export function createInspection(sizeBytes: number): { push(chunk: Uint8Array): void; finish(): ImageFacts } {
  const counters = createCellCounters({ offset: 0, length: sizeBytes, cells: CELLS });
  let at = 0;
  return {
    push(chunk) {
      counters.push(chunk, at);
      at += chunk.length;
    },
    finish() {
      const totals = new Float64Array(256);
      for (let bin = 0; bin < counters.map.bins; bin += 1) {
        const histogram = counters.histogram(bin);
        for (let value = 0; value < 256; value += 1) totals[value] += histogram[value];
      }
      const dominantCount = Math.max(...totals);
      return {
        sizeBytes,
        distinctValues: totals.reduce((n, count) => n + (count > 0 ? 1 : 0), 0),
        dominantByte: totals.indexOf(dominantCount),
        dominantCount,
        ffCount: totals[0xff],
        zeroCount: totals[0x00],
        cells: cellsOf(counters, CELLS),
      };
    },
  };
}

export function inspectImage(bytes: Uint8Array): ImageFacts {
  const inspection = createInspection(bytes.length);
  inspection.push(bytes);
  return inspection.finish();
}

/** More than half of all bytes have one value. */
export function nearlyEmpty(facts: ImageFacts): boolean {
  return facts.dominantCount * 2 > facts.sizeBytes;
}

/** READ-FAULTS F04: at least 99.9 % have one value (a uniform image too). Legitimate for small parameter stores. */
export function nearlyBlank(facts: ImageFacts): boolean {
  return facts.dominantCount >= 0.999 * facts.sizeBytes;
}

/** Every byte has the same value. */
export function isUniform(facts: ImageFacts): boolean {
  return facts.distinctValues === 1;
}
