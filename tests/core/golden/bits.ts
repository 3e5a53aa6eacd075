/** Edits of an image as a stream of bits, most significant bit first. */

export function bitsOf(bytes: Uint8Array): number[] {
  return [...bytes].flatMap((byte) => [7, 6, 5, 4, 3, 2, 1, 0].map((bit) => (byte >> bit) & 1));
}

/** Cut or filled up with 1 to `size` bytes. */
function pack(bits: readonly number[], size: number): Uint8Array {
  const out = new Uint8Array(size);
  for (let i = 0; i < size * 8; i += 1) out[i >> 3] |= (bits[i] ?? 1) << (7 - (i & 7));
  return out;
}

/** From bit `at` on `count` bits are gone; the end is filled with 1. */
export function loseBits(bytes: Uint8Array, at: number, count: number): Uint8Array {
  const bits = bitsOf(bytes);
  bits.splice(at, count);
  return pack(bits, bytes.length);
}

/** The bit before bit `at` is there `count` times more. */
export function gainBits(bytes: Uint8Array, at: number, count: number): Uint8Array {
  const bits = bitsOf(bytes);
  bits.splice(at, 0, ...new Array<number>(count).fill(bits[at - 1]));
  return pack(bits, bytes.length);
}

/** One bit of 0 before all others. */
export function dummyZero(bytes: Uint8Array): Uint8Array {
  return pack([0, ...bitsOf(bytes)], bytes.length);
}

export const reversedByte = (byte: number) => Number.parseInt(byte.toString(2).padStart(8, "0").split("").reverse().join(""), 2);

export function joined(...parts: (Uint8Array | readonly number[])[]): Uint8Array {
  return Uint8Array.from(parts.flatMap((part) => [...part]));
}
