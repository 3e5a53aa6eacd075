import { createCellCounters, type CellCounters, type CellWindow } from "./cells";

/** The image strip of DESIGN.md section 6: 256 cells, each one letter. */
export const CELLS = 256;

/** b blank (FF), z zeros (00), t text-like, o ordinary, d dense, n not read */
export type CellClass = "b" | "z" | "t" | "o" | "d" | "n";

const FILL_SHARE = 0.985;
const TEXT_SHARE = 0.85;
const DENSE_BITS = 7.55;
const DENSE_MIN_BYTES = 256;

/** Shannon entropy in bits a byte. */
function entropyBits(histogram: Uint32Array, length: number): number {
  let sum = 0;
  for (let value = 0; value < 256; value += 1) {
    const n = histogram[value];
    if (n > 0) sum += n * Math.log2(n);
  }
  return Math.log2(length) - sum / length;
}

/** Printable: space to tilde, tab, line feed, carriage return. */
function printableCount(histogram: Uint32Array): number {
  let n = histogram[0x09] + histogram[0x0a] + histogram[0x0d];
  for (let value = 0x20; value <= 0x7e; value += 1) n += histogram[value];
  return n;
}

/** Class of one cell. `length`: bytes that are there, `expected`: bytes the cell should have. */
export function classifyCell(histogram: Uint32Array, length: number, expected: number): CellClass {
  if (length === 0 || length * 2 < expected) return "n";
  if (histogram[0xff] >= FILL_SHARE * length) return "b";
  if (histogram[0x00] >= FILL_SHARE * length) return "z";
  if (printableCount(histogram) >= TEXT_SHARE * length) return "t";
  if (expected >= DENSE_MIN_BYTES && entropyBits(histogram, length) >= DENSE_BITS) return "d";
  return "o";
}

/** The letters of counters that are full. */
export function cellsOf(counters: CellCounters, cells: number): string {
  const { map } = counters;
  const letters = Array.from({ length: map.bins }, (_, bin) =>
    classifyCell(counters.histogram(bin), counters.seen(bin), map.binStart(bin + 1) - map.binStart(bin)));
  let out = "";
  for (let cell = 0; cell < cells; cell += 1) out += map.bins === 0 ? "n" : letters[map.binOfCell(cell)];
  return out;
}

/**
 * Strip of the window [offset, offset + length) of an image. Chunks come in any order, each with the absolute
 * address of its first byte; cells of which less than half came are "n".
 */
export function createStrip(window: CellWindow): { push(chunk: Uint8Array, at: number): void; finish(): string } {
  const counters = createCellCounters(window);
  return { push: counters.push, finish: () => cellsOf(counters, window.cells) };
}

export function stripOf(bytes: Uint8Array, window: CellWindow): string {
  const strip = createStrip(window);
  strip.push(bytes, 0);
  return strip.finish();
}

/**
 * What wins when cells are joined for a thumbnail: a gap first, then what carries most, fill last. A thumbnail
 * may thin out blank space, but never hide that something is missing or that there is data.
 */
const STRIKING = "ndtozb";

/** Thumbnail: `to` cells out of many, the most striking class of each group. */
export function reduceCells(cells: string, to = 64): string {
  let out = "";
  for (let i = 0; i < to; i += 1) {
    const from = Math.floor((i * cells.length) / to);
    const group = cells.slice(from, Math.max(from + 1, Math.floor(((i + 1) * cells.length) / to)));
    out += [...STRIKING].find((letter) => group.includes(letter)) ?? "n";
  }
  return out;
}

const LOUPE_PART = 32;
const LOUPE_MIN_BYTES = 256;

/**
 * The loupe's window when all differences, first to last address, lie within 1/32 of the chip: the smallest
 * power of two around them, aligned to its size. Differences that straddle such a border get a window aligned to
 * half its size instead, or they would have none. At least 256 bytes, so that a cell is a byte or more.
 */
export function loupeWindow(sizeBytes: number, first: number, last: number): { offset: number; length: number } | null {
  const span = last - first + 1;
  const part = sizeBytes / LOUPE_PART;
  if (span > part) return null;
  for (const { steps, most } of [{ steps: 1, most: part }, { steps: 2, most: 2 * part }]) {
    for (let length = LOUPE_MIN_BYTES; length <= Math.max(LOUPE_MIN_BYTES, most) && length < sizeBytes; length *= 2) {
      const offset = Math.floor(first / (length / steps)) * (length / steps);
      if (last < offset + length) return { offset, length };
    }
  }
  return null;
}

/** Hex digits of an address: 5 for 512 KiB, 4 for 8 KiB. */
export function addressDigits(sizeBytes: number): number {
  return Math.max(2, Math.max(0, sizeBytes - 1).toString(16).length);
}

/** `address(0x1F000, 524288)` is "0x1F000". */
export function address(n: number, sizeBytes: number): string {
  return `0x${n.toString(16).toUpperCase().padStart(addressDigits(sizeBytes), "0")}`;
}

/** `rangeText(0x1F000, 4096, 524288)` is "0x1F000–0x1FFFF"; one byte is its address alone. */
export function rangeText(start: number, length: number, sizeBytes: number): string {
  if (length <= 1) return address(start, sizeBytes);
  return `${address(start, sizeBytes)}–${address(start + length - 1, sizeBytes)}`;
}

/** Where differences lie, for a sentence: "at 0x00123" or "all in 0x1F000–0x1FFFF" (the loupe's window, if any). */
export function placeText(first: number, last: number, sizeBytes: number): string {
  // a read longer than its chip differs past the chip's end
  const size = Math.max(sizeBytes, last + 1);
  if (first === last) return `at ${address(first, size)}`;
  const { offset, length } = loupeWindow(size, first, last) ?? { offset: first, length: last - first + 1 };
  return `all in ${rangeText(offset, Math.min(length, size - offset), size)}`;
}
