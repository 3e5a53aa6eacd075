import { gainedBits, lostBits } from "./bit-edits";
import type { Random } from "./random";

/** One kind of fault, put into a real image. */
export interface Injection {
  name: string;
  /** the code that is right */
  code: string;
  /** null where the image can't have it */
  make(image: Uint8Array, random: Random): Uint8Array | null;
  /** the image shows it by itself: a set in which every read has it must not be ready */
  alone?: boolean;
}

const isFill = (value: number) => value === 0xff || value === 0;
const reversedByte = (byte: number) => Number.parseInt(byte.toString(2).padStart(8, "0").split("").reverse().join(""), 2);

/** A place whose next `length` bytes are hardly fill; faults in padding can't be seen, or look like something else. */
function placeInData(image: Uint8Array, random: Random, length: number): number {
  let best = 0;
  let most = -1;
  for (let tries = 0; tries < 300; tries += 1) {
    const at = random.below(image.length - length);
    let data = 0;
    for (let i = at; i < at + length; i += 1) if (!isFill(image[i])) data += 1;
    if (data >= 0.9 * length) return at;
    if (data > most) [best, most] = [at, data];
  }
  return best;
}

function edited(image: Uint8Array, edit: (out: Uint8Array) => void): Uint8Array {
  const out = image.slice();
  edit(out);
  return out;
}

function joined(one: Uint8Array, two: Uint8Array): Uint8Array {
  const out = new Uint8Array(one.length + two.length);
  out.set(one);
  out.set(two, one.length);
  return out;
}

function bursts(value: number) {
  return (image: Uint8Array, random: Random) => edited(image, (out) => {
    for (let n = 0; n < 5; n += 1) {
      const length = 16 + random.below(241);
      const at = placeInData(image, random, length);
      out.fill(value, at, at + length);
    }
  });
}

/** Single bits of one value, or of any, at places spread over the image. */
function flips(count: (image: Uint8Array) => number, value: 0 | 1 | null) {
  return (image: Uint8Array, random: Random) => edited(image, (out) => {
    for (let [n, tries] = [0, 0]; n < count(image) && tries < 200_000; tries += 1) {
      const [at, bit] = [random.below(image.length), random.below(8)];
      if (out[at] !== image[at] || (value !== null && ((image[at] >> bit) & 1) !== value)) continue;
      out[at] ^= 1 << bit;
      n += 1;
    }
  });
}

/** Not in the last 4 KiB: a slip with nothing behind it can't be told. */
const slipPlace = (image: Uint8Array, random: Random) => 8 + placeInData(image.subarray(0, Math.max(1024, image.length - 4096)), random, 256);

const topLine = (image: Uint8Array) => Math.ceil(Math.log2(image.length)) - 1;

function stuck(high: boolean) {
  return (image: Uint8Array, random: Random) => {
    const line = 6 + random.below(topLine(image) - 5);
    const mask = 2 ** line;
    if (high && image.length % (2 * mask) !== 0) return null;
    return image.map((_, i) => image[high ? i | mask : i & ~mask]);
  };
}

function noise(out: Uint8Array, at: number, length: number, random: Random): void {
  for (let i = at; i < at + length; i += 1) out[i] = 1 + random.below(254);
}

export const INJECTIONS: Injection[] = [
  { name: "flips, 1 bit in 10,000", code: "random-flips", make: flips((image) => Math.max(8, Math.round(image.length * 8e-4)), null) },
  { name: "200 flips 0 to 1", code: "one-way-flips", make: flips(() => 200, 0) },
  { name: "200 flips 1 to 0", code: "one-way-flips", make: flips(() => 200, 1) },
  { name: "5 bursts of FF", code: "lost-contact", make: bursts(0xff) },
  { name: "5 bursts of 00", code: "lost-contact", make: bursts(0x00) },
  { name: "1 to 7 bits lost", code: "bit-slip", make: (image, random) => lostBits(image, slipPlace(image, random) * 8 + random.below(8), 1 + random.below(7)) },
  { name: "1 to 7 bits gained", code: "bit-slip", make: (image, random) => gainedBits(image, slipPlace(image, random) * 8 + random.below(8), 1 + random.below(7)) },
  { name: "a dummy bit before all", code: "bit-slip", make: (image) => { const out = gainedBits(image, 1, 1); out[0] &= 0x7f; return out; } },
  { name: "1 to 4 bytes lost", code: "byte-slip", make: (image, random) => lostBits(image, slipPlace(image, random) * 8, 8 * (1 + random.below(4))) },
  { name: "1 to 4 bytes gained", code: "byte-slip", make: (image, random) => gainedBits(image, slipPlace(image, random) * 8, 8 * (1 + random.below(4))) },
  { name: "command echo", code: "command-echo", make: (image) => edited(image, (out) => { out.copyWithin(4, 0, image.length - 4); out.set([3, 0, 0, 0]); }) },
  { name: "rotated", code: "rotated", make: (image, random) => { const r = 64 + random.below(image.length - 128); return joined(image.subarray(r), image.subarray(0, r)); } },
  { name: "16-bit swap", code: "byte-swapped", make: (image) => image.map((value, i) => image[i ^ 1] ?? value) },
  { name: "32-bit swap", code: "byte-swapped", make: (image) => image.map((value, i) => image[i ^ 3] ?? value) },
  { name: "bits reversed", code: "bit-reversed", make: (image) => image.map(reversedByte) },
  { name: "inverted", code: "inverted", make: (image) => image.map((value) => ~value) },
  { name: "all FF", code: "blank", alone: true, make: (image) => new Uint8Array(image.length).fill(0xff) },
  { name: "all 00", code: "all-zero", alone: true, make: (image) => new Uint8Array(image.length) },
  { name: "an id over and over", code: "short-period", alone: true, make: (image, random) => { const id = [random.below(256), 0x40, 0x13]; return image.map((_, i) => id[i % 3]); } },
  { name: "address line low", code: "address-line", make: stuck(false) },
  { name: "address line high", code: "address-line", make: stuck(true) },
  { name: "3 foreign blocks of 256", code: "foreign-blocks", make: (image, random) => edited(image, (out) => { for (let n = 0; n < 3; n += 1) noise(out, placeInData(image, random, 256), 256, random); }) },
  { name: "6 slips at buffer edges", code: "buffer-edge", make: (image, random) => edited(image, (out) => {
    for (let n = 0; n < 6; n += 1) { const at = 512 * (1 + random.below(Math.floor(image.length / 512) - 1)); for (let i = 0; i < 6; i += 1) out[at + i] ^= 0x5a + n; }
  }) },
  { name: "first 4 bytes", code: "edge-bytes", make: (image, random) => edited(image, (out) => { for (let i = 0; i < 4; i += 1) out[i] ^= 1 + random.below(255); }) },
  { name: "cut short", code: "too-short", alone: true, make: (image, random) => image.slice(0, 1 + random.below(image.length - 1)) },
  { name: "padded", code: "padded", alone: true, make: (image) => joined(image, new Uint8Array(512).fill(0xff)) },
  { name: "64 bytes before", code: "extra-bytes", alone: true, make: (image) => joined(new Uint8Array(64), image) },
  { name: "read twice over", code: "repeats-within", alone: true, make: (image) => joined(image, image) },
];
