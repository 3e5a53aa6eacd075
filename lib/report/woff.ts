import { inflateSync } from "node:zlib";

const HEAD = 44;
const ENTRY = 20;

/**
 * The plain font inside a WOFF 1.0 file (W3C Recommendation "WOFF File Format 1.0", sections 3 to 5). Font libraries
 * read WOFF too, but unpack a table again for each glyph they take from it.
 */
export function sfntOf(woff: Buffer): Buffer {
  if (woff.toString("latin1", 0, 4) !== "wOFF") throw new RangeError("Not a WOFF 1.0 file.");
  const count = woff.readUInt16BE(12);
  const tables = Array.from({ length: count }, (_, i) => {
    const at = HEAD + i * ENTRY;
    const [offset, packed, length] = [woff.readUInt32BE(at + 4), woff.readUInt32BE(at + 8), woff.readUInt32BE(at + 12)];
    const bytes = woff.subarray(offset, offset + packed);
    return { tag: woff.subarray(at, at + 4), checksum: woff.subarray(at + 16, at + 20), data: packed < length ? inflateSync(bytes) : bytes };
  });
  const power = Math.floor(Math.log2(count));
  const head = Buffer.alloc(12 + count * 16);
  woff.copy(head, 0, 4, 8);
  head.writeUInt16BE(count, 4);
  head.writeUInt16BE(2 ** power * 16, 6);
  head.writeUInt16BE(power, 8);
  head.writeUInt16BE(count * 16 - 2 ** power * 16, 10);
  const parts: Buffer[] = [head];
  let at = head.length;
  tables.forEach(({ tag, checksum, data }, i) => {
    const entry = 12 + i * 16;
    tag.copy(head, entry);
    checksum.copy(head, entry + 4);
    head.writeUInt32BE(at, entry + 8);
    head.writeUInt32BE(data.length, entry + 12);
    parts.push(data, Buffer.alloc(-data.length & 3));
    at += data.length + (-data.length & 3);
  });
  return Buffer.concat(parts);
}
