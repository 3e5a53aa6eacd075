/** F12 F13 F14: images that hold the same bytes in another order, or every byte changed in the same way. Exact. */

const REVERSED = Uint8Array.from({ length: 256 }, (_, n) => Number.parseInt(n.toString(2).padStart(8, "0").split("").reverse().join(""), 2));

export function sameHistogram(a: Uint8Array, b: Uint8Array): boolean {
  if (a.length !== b.length) return false;
  const counts = new Int32Array(256);
  for (let i = 0; i < a.length; i += 1) {
    counts[a[i]] += 1;
    counts[b[i]] -= 1;
  }
  return counts.every((n) => n === 0);
}

/**
 * Width in bits of the units whose bytes changed places: 16 and 32 bits with the bytes reversed, or 32 bits with the
 * halves exchanged. A last unit that is not whole stays as it is.
 */
export function swappedWidth(a: Uint8Array, b: Uint8Array): 16 | 32 | null {
  for (const [flip, unit, width] of [[1, 2, 16], [3, 4, 32], [2, 4, 32]] as const) {
    const whole = a.length - (a.length % unit);
    let i = 0;
    while (i < whole && b[i] === a[i ^ flip]) i += 1;
    if (i < whole || whole === 0) continue;
    while (i < a.length && a[i] === b[i]) i += 1;
    if (i === a.length) return width;
  }
  return null;
}

/** Start of the least rotation: two candidates race, the loser jumps past what was compared. Linear, no memory. */
function leastRotation(bytes: Uint8Array): number {
  const n = bytes.length;
  let i = 0;
  let j = 1;
  let k = 0;
  while (i < n && j < n && k < n) {
    let x = i + k;
    let y = j + k;
    if (x >= n) x -= n;
    if (y >= n) y -= n;
    if (bytes[x] === bytes[y]) {
      k += 1;
      continue;
    }
    if (bytes[x] > bytes[y]) i += k + 1;
    else j += k + 1;
    if (i === j) j += 1;
    k = 0;
  }
  return Math.min(i, j);
}

/** r such that b[i] = a[(i + r) mod n] for all i, or null. 0 < r < n. */
export function rotationOf(a: Uint8Array, b: Uint8Array): number | null {
  const n = a.length;
  if (n < 2) return null;
  const r = (leastRotation(a) - leastRotation(b) + n) % n;
  if (r === 0) return null;
  for (let i = 0, at = r; i < n; i += 1) {
    if (b[i] !== a[at]) return null;
    at += 1;
    if (at === n) at = 0;
  }
  return r;
}

export function isInverted(a: Uint8Array, b: Uint8Array): boolean {
  for (let i = 0; i < a.length; i += 1) if ((a[i] ^ b[i]) !== 0xff) return false;
  return true;
}

export function isBitReversed(a: Uint8Array, b: Uint8Array): boolean {
  for (let i = 0; i < a.length; i += 1) if (REVERSED[a[i]] !== b[i]) return false;
  return true;
}

/** Whether b is what is read of a while address line `line` is stuck: low, high or null. */
export function stuckLine(a: Uint8Array, b: Uint8Array, line: number): "low" | "high" | null {
  const mask = 2 ** line;
  let [low, high] = [true, true];
  for (let i = 0; i < a.length && (low || high); i += 1) {
    if (low && b[i] !== a[(i & mask) === 0 ? i : i - mask]) low = false;
    if (high && b[i] !== a[(i & mask) === 0 ? i + mask : i]) high = false;
  }
  return low ? "low" : high ? "high" : null;
}
