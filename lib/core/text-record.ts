import type { Range } from "./words";

/** Why a text image can't be used, with the line (from 1) where it was seen; 0 when the question itself doesn't fit. */
export class FormatError extends Error {
  constructor(readonly line: number, reason: string) {
    super(line > 0 ? `Line ${line} ${reason}` : reason);
    this.name = "FormatError";
  }
}

/** Largest image that a text may expand to, in bytes; the same bound as for a read. */
export const MAX_EXPANDED_BYTES = 64 * 1024 * 1024;
/** Stretches without data that are listed; what lies past them is still counted. */
export const GAPS_KEPT = 10_000;

export interface ImageWindow {
  /** address, in the text's own counting, of the image's first byte */
  base: number;
  /** bytes of the image, 1 to 64 MiB */
  size: number;
  /** value of every byte that the text doesn't give */
  fill: number;
}

export interface TextImage {
  bytes: Uint8Array<ArrayBuffer>;
  /** lines that are records, the last one included */
  records: number;
  /** where a program would begin, as the text says; of no meaning for the image */
  start?: string;
  /** stretches of the image that the text doesn't give, filled */
  gaps: Range[];
  gapBytes: number;
  /** bytes that the text gives more than once, always with the same value */
  repeats: number;
}

/** Called with data and the address of its first byte; `values` is reused by the next record. */
export type OnData = (address: number, values: Uint8Array, from: number, to: number, line: number) => void;

const HEX_VALUE = new Int8Array(256).fill(-1);
for (let i = 0; i < 16; i += 1) {
  HEX_VALUE["0123456789ABCDEF".charCodeAt(i)] = i;
  HEX_VALUE["0123456789abcdef".charCodeAt(i)] = i;
}

export const asBytes = (text: string | Uint8Array) => (typeof text === "string" ? new TextEncoder().encode(text) : text);

/** One line's hex digits as bytes, from `from` to `to`, into `into`. Returns the number of bytes. */
export function hexLine(text: Uint8Array, from: number, to: number, into: Uint8Array, line: number): number {
  for (let i = from; i < to; i += 1) {
    if (HEX_VALUE[text[i]] < 0) throw new FormatError(line, `holds a character that is no hex digit, at place ${i - from + 2}. Save the text again and send it unchanged.`);
  }
  if ((to - from) % 2 !== 0) throw new FormatError(line, "has an odd number of hex digits: a part of it is missing. Save the text again.");
  const count = (to - from) / 2;
  if (count > into.length) throw new FormatError(line, "is longer than a record can be. Check that it is this kind of text.");
  for (let i = 0; i < count; i += 1) into[i] = (HEX_VALUE[text[from + 2 * i]] << 4) | HEX_VALUE[text[from + 2 * i + 1]];
  return count;
}

/**
 * Calls `onLine` for each line without its end (LF or CRLF); blank lines are allowed at the end only. Returns the number
 * of lines that hold something.
 */
export function eachLine(text: Uint8Array, onLine: (from: number, to: number, line: number) => void): number {
  let line = 0;
  let blank = 0;
  for (let from = 0; from < text.length; ) {
    const found = text.indexOf(0x0a, from);
    const next = found < 0 ? text.length : found;
    const to = next > from && text[next - 1] === 0x0d ? next - 1 : next;
    line += 1;
    if (to > from) {
      if (blank > 0) throw new FormatError(blank, "is blank, and records follow. Save the text again.");
      onLine(from, to, line);
    } else if (blank === 0) blank = line;
    from = next + 1;
  }
  return blank > 0 ? blank - 1 : line;
}

export const hexOf = (n: number, digits = 2) => n.toString(16).toUpperCase().padStart(digits, "0");

/** Refuses a window that no image can have. The size is bounded here, before any memory is taken. */
export function checkWindow({ base, size, fill }: ImageWindow): void {
  if (!Number.isSafeInteger(size) || size < 1) throw new FormatError(0, "The image's size is a whole number of bytes, 1 or more.");
  if (size > MAX_EXPANDED_BYTES) throw new FormatError(0, `An image holds at most ${MAX_EXPANDED_BYTES} bytes (64 MiB). Give the chip's own size.`);
  if (!Number.isSafeInteger(base) || base < 0 || base > 0xffffffff) throw new FormatError(0, "The base is an address from 0 to FFFFFFFF.");
  if (!Number.isInteger(fill) || fill < 0 || fill > 255) throw new FormatError(0, "The fill is one byte, 00 to FF.");
}

/** Takes the data of a text into an image, and keeps account of what is missing and what comes twice. */
export function createImageFill(window: ImageWindow): { put: OnData; finish(): Pick<TextImage, "bytes" | "gaps" | "gapBytes" | "repeats"> } {
  checkWindow(window);
  const { base, size, fill } = window;
  const bytes = new Uint8Array(size).fill(fill);
  const given = new Uint8Array((size + 7) >> 3);
  let repeats = 0;

  function put(address: number, values: Uint8Array, from: number, to: number, line: number): void {
    const at = address - base;
    if (at < 0 || at + to - from > size) {
      const outside = at < 0 ? address : Math.max(address, base + size);
      const last = base + size - 1;
      throw new FormatError(line, `gives address ${hexOf(outside, 4)}, and the image runs from ${hexOf(base, 4)} to ${hexOf(last, 4)}. Check base and size.`);
    }
    for (let i = from; i < to; i += 1) {
      const offset = at + i - from;
      const bit = 1 << (offset & 7);
      if (given[offset >> 3] & bit) {
        if (bytes[offset] !== values[i]) throw new FormatError(line, `gives ${hexOf(values[i])} for address ${hexOf(base + offset, 4)}, and an earlier line ${hexOf(bytes[offset])}. Find out which of the two was read; nothing is chosen.`);
        repeats += 1;
      }
      given[offset >> 3] |= bit;
      bytes[offset] = values[i];
    }
  }

  function finish() {
    const gaps: Range[] = [];
    let gapBytes = 0;
    let start = -1;
    for (let at = 0; at <= size; at += 1) {
      // whole groups of eight that are all given or all missing
      if ((at & 7) === 0 && at + 8 <= size) {
        const group = given[at >> 3];
        if ((group === 0xff && start < 0) || (group === 0 && start >= 0)) {
          at += 7;
          continue;
        }
      }
      const missing = at < size && (given[at >> 3] & (1 << (at & 7))) === 0;
      if (missing && start < 0) start = at;
      if (!missing && start >= 0) {
        gapBytes += at - start;
        if (gaps.length < GAPS_KEPT) gaps.push({ start, length: at - start });
        start = -1;
      }
    }
    return { bytes, gaps, gapBytes, repeats };
  }

  return { put, finish };
}

/** Collects ASCII text without building a string for each line. */
export function createTextSink(expectedBytes: number): { record(mark: string, values: Uint8Array, length: number): void; finish(): Uint8Array<ArrayBuffer> } {
  let text = new Uint8Array(Math.max(64, expectedBytes));
  let length = 0;
  const digits = Uint8Array.from({ length: 16 }, (_, i) => "0123456789ABCDEF".charCodeAt(i));
  return {
    record(mark, values, count) {
      const needed = length + mark.length + 2 * count + 1;
      if (needed > text.length) {
        const larger = new Uint8Array(2 * needed);
        larger.set(text.subarray(0, length));
        text = larger;
      }
      for (let i = 0; i < mark.length; i += 1) text[length++] = mark.charCodeAt(i);
      for (let i = 0; i < count; i += 1) {
        text[length++] = digits[values[i] >> 4];
        text[length++] = digits[values[i] & 15];
      }
      text[length++] = 0x0a;
    },
    finish: () => text.subarray(0, length),
  };
}
