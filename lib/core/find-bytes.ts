/** At most these many bytes are searched for at a time. */
export const MOST_SOUGHT = 64;

export type Way = "next" | "previous";

export interface Needle {
  bytes: Uint8Array;
  /** how a text was written as bytes, or that bytes were asked for */
  as: "bytes" | "utf-8" | "utf-16le";
}

export interface Found {
  /** address of its first byte */
  at: number;
  length: number;
  as: Needle["as"];
  /** it lies beyond the image's end or start, from where the search began */
  around: boolean;
}

/** Bytes of an image from an address, at most so many. */
export type Reader = (offset: number, length: number) => Promise<Uint8Array>;

const PIECE = 1_048_576;

/** "DE AD be-ef" as bytes: pairs of hex digits with or without anything between; null where it isn't that. */
export function hexPairs(text: string): Uint8Array | null {
  const digits = text.replace(/0x/gi, "").replace(/[\s,;:_-]/g, "");
  if (!/^(?:[0-9a-f]{2})+$/i.test(digits)) return null;
  return Uint8Array.from(digits.match(/../g) ?? [], (pair) => Number.parseInt(pair, 16));
}

/** A text as firmware holds it: one byte a character, or two with the low byte first. */
export function textNeedles(text: string): Needle[] {
  const wide = new Uint8Array(text.length * 2);
  for (let i = 0; i < text.length; i += 1) new DataView(wide.buffer).setUint16(i * 2, text.charCodeAt(i), true);
  return [{ bytes: new TextEncoder().encode(text), as: "utf-8" }, { bytes: wide, as: "utf-16le" }];
}

/** The nearest place of any needle that begins at `from` or after it and before `to`; null when there is none. */
async function onwards(read: Reader, needles: readonly Needle[], from: number, to: number): Promise<Omit<Found, "around"> | null> {
  const longest = Math.max(...needles.map(({ bytes }) => bytes.length));
  for (let at = from; at < to; at += PIECE) {
    const piece = Buffer.from(await read(at, Math.min(PIECE, to - at) + longest - 1));
    const places = needles.map((needle) => ({ needle, place: piece.indexOf(needle.bytes) })).filter(({ place }) => place >= 0 && at + place < to);
    if (places.length > 0) {
      const { needle, place } = places.reduce((first, other) => (other.place < first.place ? other : first));
      return { at: at + place, length: needle.bytes.length, as: needle.as };
    }
  }
  return null;
}

/** The same from behind: the nearest place that begins before `to` and not before `from`. */
async function backwards(read: Reader, needles: readonly Needle[], from: number, to: number): Promise<Omit<Found, "around"> | null> {
  const longest = Math.max(...needles.map(({ bytes }) => bytes.length));
  for (let end = to; end > from; end -= PIECE) {
    const start = Math.max(from, end - PIECE);
    const piece = Buffer.from(await read(start, end - start + longest - 1));
    const places = needles.map((needle) => ({ needle, place: piece.lastIndexOf(needle.bytes, end - start - 1) })).filter(({ place }) => place >= 0);
    if (places.length > 0) {
      const { needle, place } = places.reduce((first, other) => (other.place > first.place ? other : first));
      return { at: start + place, length: needle.bytes.length, as: needle.as };
    }
  }
  return null;
}

/**
 * The next place from an address on (that address included), or the previous one before it; past the end, or the start,
 * the search goes on from the other one. Reads 1 MiB at a time.
 * @returns null where the image holds it nowhere
 */
export async function findBytes(read: Reader, sizeBytes: number, needles: readonly Needle[], from: number, way: Way): Promise<Found | null> {
  const [first, rest]: [number, number][] = way === "next" ? [[from, sizeBytes], [0, Math.min(from, sizeBytes)]] : [[0, Math.min(from, sizeBytes)], [from, sizeBytes]];
  const search = way === "next" ? onwards : backwards;
  const near = await search(read, needles, ...first);
  if (near) return { ...near, around: false };
  const far = await search(read, needles, ...rest);
  return far && { ...far, around: true };
}
