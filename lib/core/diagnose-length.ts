import type { Cause } from "./diagnose-cause";
import type { ImageFacts } from "./inspect";
import { HEADER_SEARCH, SHIFT_SMALL_WINDOW, SHIFT_WINDOW_VALUES } from "./thresholds";

function prefixEqual(shorter: Uint8Array, longer: Uint8Array, at: number): boolean {
  for (let i = 0; i < shorter.length; i += 1) if (shorter[i] !== longer[at + i]) return false;
  return true;
}

/** Start of the first stretch that isn't much the same throughout; 0 when there is none. */
function firstTelling(bytes: Uint8Array, length: number): number {
  for (let from = 0; from + length <= bytes.length; from += length) {
    if (new Set(bytes.subarray(from, from + length)).size >= SHIFT_WINDOW_VALUES) return from;
  }
  return 0;
}

/** More candidates than this are a pattern, not a place. */
const MOST_CANDIDATES = 64;

/** F09: where the longer image holds the whole of the shorter one, past its own start; null if nowhere. */
function containedAt(shorter: Uint8Array, longer: Uint8Array): number | null {
  const over = longer.length - shorter.length;
  const length = Math.min(shorter.length >= 4 * HEADER_SEARCH ? HEADER_SEARCH : SHIFT_SMALL_WINDOW, shorter.length);
  const from = firstTelling(shorter, length);
  let candidates = 0;
  for (let offset = 1; offset <= over; offset += 1) {
    let i = 0;
    while (i < length && shorter[from + i] === longer[from + offset + i]) i += 1;
    if (i < length) continue;
    if (prefixEqual(shorter, longer, offset)) return offset;
    candidates += 1;
    if (candidates > MOST_CANDIDATES) return null;
  }
  return null;
}

function repeatsItself(longer: Uint8Array, period: number): boolean {
  for (let i = period; i < longer.length; i += 1) if (longer[i] !== longer[i - period]) return false;
  return true;
}

/**
 * F07 F08 F09: reads of two sizes. Which one is off follows from the chip's size; where neither has it, from what the
 * longer one holds past the shorter one's end.
 */
export function lengthCause(a: Uint8Array, b: Uint8Array, facts: readonly [ImageFacts, ImageFacts], chipBytes: number): Cause {
  const aShorter = a.length < b.length;
  const [shorter, longer] = aShorter ? [a, b] : [b, a];
  const [shortSide, longSide] = aShorter ? (["a", "b"] as const) : (["b", "a"] as const);
  const over = longer.length - shorter.length;
  const counts = { shorterBytes: shorter.length, longerBytes: longer.length };
  const faulty = shorter.length === chipBytes ? longSide : longer.length === chipBytes ? shortSide : null;
  if (prefixEqual(shorter, longer, 0)) {
    if (faulty === shortSide) return { code: "too-short", confidence: "certain", faulty, counts };
    const endRun = (aShorter ? facts[1] : facts[0]).whole?.endRun ?? 0;
    if (endRun >= over) return { code: "padded", confidence: "certain", faulty: longSide, counts };
    // a chip read past its end starts again from 0
    if (over >= shorter.length / 2 && repeatsItself(longer, shorter.length)) return { code: "repeats-within", confidence: "certain", faulty: longSide, counts };
    if (faulty === longSide) return { code: "extra-bytes", confidence: "certain", faulty, counts };
    return { code: "too-short", confidence: "unsure", faulty: shortSide, counts };
  }
  const at = containedAt(shorter, longer);
  if (at !== null) return { code: "extra-bytes", confidence: "certain", faulty: longSide, counts: { ...counts, offset: at } };
  return { code: "different-length", confidence: "certain", faulty, counts };
}
