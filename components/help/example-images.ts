import { joined as joinedBytes } from "@/lib/core/bytes";

/** Small made-up images for the examples of the findings page: the same every time, of no real chip. */
export const EXAMPLE_BYTES = 8192;

/** Bytes as uneven as firmware is: random ones, with runs of small values between them. */
export function dataLike(seed: number, length: number): Uint8Array<ArrayBuffer> {
  const out = new Uint8Array(length);
  let state = seed >>> 0;
  for (let i = 0; i < length; i += 1) {
    // xorshift, 32 bits
    state ^= state << 13;
    state ^= state >>> 17;
    state ^= state << 5;
    state >>>= 0;
    out[i] = state & 1 ? (state >>> 8) & 0xff : (state >>> 8) & 0x3f;
  }
  return out;
}

/** The image that all others are spoiled from: data, text, blank space. */
export function goodImage(): Uint8Array<ArrayBuffer> {
  const image = new Uint8Array(EXAMPLE_BYTES).fill(0xff);
  image.set(dataLike(0x2545f491, 3000), 0);
  image.set(new TextEncoder().encode("EXAMPLE IMAGE OF NO REAL CHIP 0001"), 4096);
  image.set(dataLike(0x9e3779b9, 1000), 5000);
  return image;
}

export function edited(image: Uint8Array, edit: (bytes: Uint8Array) => void): Uint8Array {
  const bytes = image.slice();
  edit(bytes);
  return bytes;
}

export const joined = (...parts: Uint8Array[]): Uint8Array => joinedBytes(parts);

/** From bit `from` on `count` bits are gone; the end is filled with ones. */
export function bitsLost(image: Uint8Array, from: number, count: number): Uint8Array {
  const bit = (at: number) => (at < image.length * 8 ? (image[at >> 3] >> (7 - (at & 7))) & 1 : 1);
  const out = new Uint8Array(image.length);
  for (let i = 0; i < image.length * 8; i += 1) out[i >> 3] |= bit(i < from ? i : i + count) << (7 - (i & 7));
  return out;
}

export function bitsReversed(byte: number): number {
  let out = 0;
  for (let bit = 0; bit < 8; bit += 1) out |= ((byte >> bit) & 1) << (7 - bit);
  return out;
}
