import {
  SHIFT_FEW_WINDOWS, SHIFT_LEAST_SHARE, SHIFT_LEAST_WINDOWS, SHIFT_MOST_BITS, SHIFT_SAMPLED_WINDOWS, SHIFT_SMALL_WINDOW, SHIFT_WINDOW, SHIFT_WINDOW_VALUES,
} from "./thresholds";

/** From the first difference on, b holds a's bits `bits` places earlier (positive: b lost bits). */
export interface Shift {
  bits: number;
  /** windows of a that were looked for, and those found at this shift */
  windows: number;
  matched: number;
}

function tellsSomething(bytes: Uint8Array, from: number, length: number): boolean {
  const seen: number[] = [];
  for (let i = from; i < from + length; i += 1) {
    if (!seen.includes(bytes[i])) seen.push(bytes[i]);
    if (seen.length >= SHIFT_WINDOW_VALUES) return true;
  }
  return false;
}

/** Starts of windows from `first` on with something in them, evenly thinned out. */
function windowsFrom(a: Uint8Array, first: number, length: number): number[] {
  const all = Math.floor((a.length - first) / length);
  const step = Math.max(1, Math.ceil(all / (4 * SHIFT_SAMPLED_WINDOWS)));
  const starts: number[] = [];
  for (let n = 0; n < all; n += step) {
    const from = first + n * length;
    if (tellsSomething(a, from, length)) starts.push(from);
  }
  const thin = Math.ceil(starts.length / SHIFT_SAMPLED_WINDOWS);
  return thin > 1 ? starts.filter((_, n) => n % thin === 0) : starts;
}

/** Whether the window of a at `from` stands in `other`, `bits` bits earlier. */
function standsAt(a: Uint8Array, other: Uint8Array, from: number, length: number, bits: number): boolean {
  const at = from * 8 - bits;
  const start = Math.floor(at / 8);
  const up = at - start * 8;
  if (start < 0 || start + length + (up > 0 ? 1 : 0) > other.length) return false;
  if (up === 0) {
    for (let i = 0; i < length; i += 1) if (other[start + i] !== a[from + i]) return false;
    return true;
  }
  for (let i = 0; i < length; i += 1) {
    if ((((other[start + i] << up) | (other[start + i + 1] >> (8 - up))) & 0xff) !== a[from + i]) return false;
  }
  return true;
}

/** Shifts in the order of their size, so that the smallest of equals wins. */
const SHIFTS = Array.from({ length: SHIFT_MOST_BITS }, (_, n) => [n + 1, -(n + 1)]).flat();

function search(a: Uint8Array, b: Uint8Array, first: number, length: number): { starts: number; best: Shift } {
  const starts = windowsFrom(a, first, length);
  const found = new Map<number, number>();
  for (const from of starts) {
    // what did not move proves no shift, nor does a pattern that fits its own neighbourhood
    if (standsAt(a, b, from, length, 0)) continue;
    for (const bits of SHIFTS) {
      if (standsAt(a, b, from, length, bits) && !standsAt(a, a, from, length, bits)) found.set(bits, (found.get(bits) ?? 0) + 1);
    }
  }
  const best: Shift = { bits: 0, windows: starts.length, matched: 0 };
  for (const bits of SHIFTS) {
    const matched = found.get(bits) ?? 0;
    if (matched > best.matched) Object.assign(best, { bits, matched });
  }
  return { starts: starts.length, best };
}

/**
 * F10 F11: at least 20 % (and 2) of the telling windows after the first difference stand in b at one shift of up to
 * 128 bits either way. Also tells how many windows there were: below 2 the images are too sparse to tell.
 */
export function findShift(a: Uint8Array, b: Uint8Array, first: number): { shift: Shift | null; windows: number } {
  let { starts, best } = search(a, b, first, SHIFT_WINDOW);
  if (starts < SHIFT_FEW_WINDOWS) {
    const small = search(a, b, first, SHIFT_SMALL_WINDOW);
    if (small.best.matched >= best.matched) ({ starts, best } = small);
  }
  const enough = best.matched >= SHIFT_LEAST_WINDOWS && best.matched >= SHIFT_LEAST_SHARE * starts;
  return { shift: enough ? best : null, windows: starts };
}

/** F21: b is a behind 4 bytes, the read command and an address. */
export function isCommandEcho(a: Uint8Array, b: Uint8Array): boolean {
  if (b.length < 8 || b[0] !== 0x03 || a.length !== b.length) return false;
  for (let i = 4; i < b.length; i += 1) if (b[i] !== a[i - 4]) return false;
  return true;
}
