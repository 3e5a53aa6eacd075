/** Bits lost or gained in a stream, most significant bit first; fast enough for images of several MiB. */

/** From bit `at` on, the bits stand `count` places earlier; the end is filled with 1. */
export function lostBits(bytes: Uint8Array, at: number, count: number): Uint8Array {
  const bit = (i: number) => (i < bytes.length * 8 ? (bytes[i >> 3] >> (7 - (i & 7))) & 1 : 1);
  const out = bytes.slice();
  const from = at >> 3;
  for (let i = from; i < bytes.length; i += 1) {
    const source = i * 8 + count;
    if (i > from) {
      const [whole, up] = [source >> 3, source & 7];
      out[i] = (((bytes[whole] ?? 0xff) << 8) | (bytes[whole + 1] ?? 0xff)) >> (8 - up);
      continue;
    }
    let value = 0;
    for (let k = 0; k < 8; k += 1) value |= bit(i * 8 + k < at ? i * 8 + k : source + k) << (7 - k);
    out[i] = value;
  }
  return out;
}

/** The bit before bit `at` (at > 0) comes `count` times more; what no longer fits is lost. */
export function gainedBits(bytes: Uint8Array, at: number, count: number): Uint8Array {
  const bit = (i: number) => (bytes[i >> 3] >> (7 - (i & 7))) & 1;
  const out = bytes.slice();
  const from = at >> 3;
  const settled = (at + count + 7) >> 3;
  for (let i = from; i < bytes.length; i += 1) {
    if (i >= settled) {
      const source = i * 8 - count;
      out[i] = ((bytes[source >> 3] << 8) | (bytes[(source >> 3) + 1] ?? 0)) >> (8 - (source & 7));
      continue;
    }
    let value = 0;
    for (let k = 0; k < 8; k += 1) {
      const here = i * 8 + k;
      value |= bit(here < at ? here : here < at + count ? at - 1 : here - count) << (7 - k);
    }
    out[i] = value;
  }
  return out;
}
