import { isPowerOfTwo, sizeText, withCommas } from "@/lib/core/quantity";

const UNIT_BYTES: Record<string, number> = { "": 1, b: 1, byte: 1, bytes: 1, kib: 1024, mib: 1_048_576, kbit: 128, mbit: 131_072 };

/** "512 KiB", "4 Mbit", "524,288" and "0x80000" are all 524288. Null when it is no size this understands. */
export function sizeFromText(text: string): number | null {
  const bare = text.trim().replace(/,(?=\d{3})/g, "");
  if (/^0x[0-9a-f]{1,8}$/i.test(bare)) return Number(bare);
  const match = /^(\d{1,9})\s*([a-z]*)$/i.exec(bare);
  const unit = match ? UNIT_BYTES[match[2].toLowerCase()] : undefined;
  return match && unit !== undefined ? Number(match[1]) * unit : null;
}

/** "524,288 bytes, 512 KiB, 4 Mbit" while it is typed; otherwise how to type it. */
export function sizeHint(text: string): string {
  const bytes = sizeFromText(text);
  if (bytes === null || bytes < 1) return "Bytes, or with a unit: 512 KiB, 4 Mbit. Chip markings count bits: divide by 8 for bytes.";
  const bits = bytes * 8;
  const inBits = bits % 1_048_576 === 0 ? `, ${bits / 1_048_576} Mbit` : bits % 1024 === 0 ? `, ${bits / 1024} Kbit` : "";
  const inBytes = `${withCommas(bytes)} ${bytes === 1 ? "byte" : "bytes"}`;
  return `${inBytes}${sizeText(bytes) === inBytes ? "" : `, ${sizeText(bytes)}`}${inBits}`;
}

/** A note, not a refusal: such chips are rare and a mistyped size is not. */
export function sizeNote(text: string): string | null {
  const bytes = sizeFromText(text);
  return bytes !== null && bytes > 0 && !isPowerOfTwo(bytes) ? "Not a power of two, which is rare for a memory chip. Check the marking; every read must have exactly this size." : null;
}
