import CRC32 from "crc-32";

/**
 * CRC-32 of bytes (IEEE 802.3, RFC 1952: reflected 0xEDB88320), unsigned. For a stream hand the result so far
 * over as `previous`. An error check for people and tools that speak it; equality is decided by SHA-256.
 */
export function crc32Of(bytes: Uint8Array, previous = 0): number {
  // the package answers a signed number
  return CRC32.buf(bytes, previous) >>> 0;
}

/** 8 lower-case hex digits; the screen shows them in upper case. */
export function crc32Hex(n: number): string {
  return (n >>> 0).toString(16).padStart(8, "0");
}

const HEX = Array.from({ length: 256 }, (_, n) => n.toString(16).padStart(2, "0"));

/** Lower-case hex, two digits a byte. */
export function toHex(bytes: Uint8Array): string {
  let out = "";
  for (let i = 0; i < bytes.length; i += 1) out += HEX[bytes[i]];
  return out;
}

/** Bytes of hex text, any case. Throws a RangeError on an odd count or a character that is no hex digit. */
export function fromHex(hex: string): Uint8Array<ArrayBuffer> {
  if (hex.length % 2 !== 0 || !/^[0-9a-f]*$/i.test(hex)) throw new RangeError("Not hex: use pairs of 0-9 and a-f.");
  const out = new Uint8Array(hex.length / 2);
  for (let i = 0; i < out.length; i += 1) out[i] = Number.parseInt(hex.slice(2 * i, 2 * i + 2), 16);
  return out;
}

/** First 8 digits, ellipsis, last 8 (DESIGN.md section 3). */
export function shortDigest(sha256: string): string {
  return `${sha256.slice(0, 8)}…${sha256.slice(-8)}`;
}

/** All 64 digits in groups of 8, for where a person must compare. */
export function groupsOf8(sha256: string): string[] {
  return sha256.match(/.{1,8}/g) ?? [];
}
