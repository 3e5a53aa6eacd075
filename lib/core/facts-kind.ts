import { crc32Of } from "./digest";
import { HEX_TEXT_SHARE } from "./thresholds";

export type TextKind = "intel-hex" | "s-record" | "hex-text";
export type ContainerKind = "zip" | "gzip" | "7z" | "pdf" | "elf";

const TAB = 9;
const LF = 10;
const CR = 13;

const isHexDigit = (c: number) => (c >= 48 && c <= 57) || (c >= 65 && c <= 70) || (c >= 97 && c <= 102);

/** A record line: its mark, then hex digits alone, at least `least` of them. */
function recordLines(bytes: Uint8Array, mark: number, least: number): boolean {
  let lines = 0;
  for (let at = 0; at < bytes.length; ) {
    let end = at;
    while (end < bytes.length && bytes[end] !== LF && bytes[end] !== CR) end += 1;
    if (end > at) {
      if (bytes[at] !== mark || end - at < least + 1) return false;
      for (let i = at + 1; i < end; i += 1) if (!isHexDigit(bytes[i])) return false;
      lines += 1;
    }
    at = end + 1;
  }
  return lines > 0;
}

/** F24: text that stands for an image. Stops at the first byte that is no text. */
export function textKindOf(bytes: Uint8Array): TextKind | null {
  let digits = 0;
  let marks = 0;
  for (let i = 0; i < bytes.length; i += 1) {
    const c = bytes[i];
    if (c === LF || c === CR || c === TAB || c === 32) continue;
    if (c < 32 || c > 126) return null;
    if (isHexDigit(c)) digits += 1;
    else marks += 1;
  }
  // S, a digit, then at least 8 more; a colon, then at least 10
  if (bytes[0] === 58 && recordLines(bytes, 58, 10)) return "intel-hex";
  if (bytes[0] === 83 && recordLines(bytes, 83, 9)) return "s-record";
  return digits > HEX_TEXT_SHARE * (digits + marks) ? "hex-text" : null;
}

const view = (bytes: Uint8Array) => new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
const starts = (bytes: Uint8Array, ...magic: number[]) => magic.every((value, i) => bytes[i] === value);

/** The end record lies in the last 64 KiB, its comment ends the file, and the directory lies before it. */
function zipParses(bytes: Uint8Array): boolean {
  const data = view(bytes);
  for (let at = bytes.length - 22; at >= Math.max(0, bytes.length - 22 - 0xffff); at -= 1) {
    if (data.getUint32(at, true) !== 0x06054b50) continue;
    if (at + 22 + data.getUint16(at + 20, true) === bytes.length && data.getUint32(at + 16, true) + data.getUint32(at + 12, true) <= at) return true;
  }
  return false;
}

/** The start header's own checksum, and a next header inside the file. */
function sevenZipParses(bytes: Uint8Array): boolean {
  if (bytes.length < 32 || bytes[4] !== 0x27 || bytes[5] !== 0x1c) return false;
  return view(bytes).getUint32(8, true) === crc32Of(bytes.subarray(12, 32));
}

function pdfParses(bytes: Uint8Array): boolean {
  const end = String.fromCharCode(...bytes.subarray(Math.max(0, bytes.length - 1024)));
  return bytes[4] === 0x2d && bytes[5] >= 48 && bytes[5] <= 57 && end.includes("%%EOF");
}

/** Class, byte order, version and header size belong together, and the program table lies inside the file. */
function elfParses(bytes: Uint8Array): boolean {
  if (bytes.length < 64 || (bytes[4] !== 1 && bytes[4] !== 2) || (bytes[5] !== 1 && bytes[5] !== 2) || bytes[6] !== 1) return false;
  const little = bytes[5] === 1;
  const data = view(bytes);
  const [size, wanted] = bytes[4] === 1 ? [data.getUint16(40, little), 52] : [data.getUint16(52, little), 64];
  const table = bytes[4] === 1 ? data.getUint32(28, little) : Number(data.getBigUint64(32, little));
  return size === wanted && table <= bytes.length;
}

/** The first bytes of a gzip file (RFC 1952). */
export function beginsAsGzip(bytes: Uint8Array): boolean {
  return starts(bytes, 0x1f, 0x8b);
}

/**
 * F25: an archive or document by its first bytes, and whether the rest of it holds together; of a gzip file that is
 * whether it unpacks, which the caller says.
 */
export function containerOf(bytes: Uint8Array, gunzips: boolean): { kind: ContainerKind; parses: boolean } | null {
  if (starts(bytes, 0x50, 0x4b, 3, 4)) return { kind: "zip", parses: zipParses(bytes) };
  if (beginsAsGzip(bytes)) return { kind: "gzip", parses: gunzips };
  if (starts(bytes, 0x37, 0x7a, 0xbc, 0xaf)) return { kind: "7z", parses: sevenZipParses(bytes) };
  if (starts(bytes, 0x25, 0x50, 0x44, 0x46)) return { kind: "pdf", parses: pdfParses(bytes) };
  if (starts(bytes, 0x7f, 0x45, 0x4c, 0x46)) return { kind: "elf", parses: elfParses(bytes) };
  return null;
}
