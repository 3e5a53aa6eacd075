import { encodeIntelHex, parseIntelHex, walkIntelHex } from "./intel-hex";
import { encodeSRecord, parseSRecord, walkSRecord } from "./s-record";
import type { ImageWindow, TextImage } from "./text-record";
import type { Format } from "./words";

export { FormatError, MAX_EXPANDED_BYTES, type ImageWindow, type TextImage } from "./text-record";

/** Written after the file's own name when an image is handed out. */
export const FORMAT_ENDING: Record<Format, string> = { "raw": "bin", "intel-hex": "hex", "s-record": "srec" };

/**
 * The image that a file as uploaded holds. `raw` is the file itself; a text is expanded to exactly `size` bytes from
 * `base`, what it leaves out being `fill`. Throws FormatError with the line.
 */
export function toImage(format: "raw", file: Uint8Array): TextImage;
export function toImage(format: Format, file: Uint8Array, window: ImageWindow): TextImage;
export function toImage(format: Format, file: Uint8Array, window?: ImageWindow): TextImage {
  if (format === "raw" || !window) return { bytes: new Uint8Array(file), records: 0, gaps: [], gapBytes: 0, repeats: 0 };
  return format === "intel-hex" ? parseIntelHex(file, window) : parseSRecord(file, window);
}

/** The file in which an image is handed out. `base`: address of the first byte, 0 when left out; raw has none. */
export function fromImage(format: Format, bytes: Uint8Array, options: { base?: number } = {}): Uint8Array {
  if (format === "raw") return bytes;
  return format === "intel-hex" ? encodeIntelHex(bytes, options) : encodeSRecord(bytes, options);
}

/**
 * Lowest and highest address that a text gives, as a help for base and size; null when it gives no byte at all. Takes no
 * memory for the image. Throws FormatError as toImage does.
 */
export function addressesOf(format: Exclude<Format, "raw">, file: string | Uint8Array): { first: number; last: number } | null {
  let first = Infinity;
  let last = -1;
  const walk = format === "intel-hex" ? walkIntelHex : walkSRecord;
  walk(file, (address, _values, from, to) => {
    if (to === from) return;
    first = Math.min(first, address);
    last = Math.max(last, address + to - from - 1);
  });
  return last < 0 ? null : { first, last };
}
