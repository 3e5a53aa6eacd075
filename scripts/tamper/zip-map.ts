/** What each byte of a stored ZIP archive is (APPNOTE 6.3): for naming what a flipped one was. */
export interface ZipPart {
  start: number;
  length: number;
  /** "local header: CRC-32", "content", "directory: offset" */
  name: string;
  /** the entry's path; "" for the archive's end */
  path: string;
}

const LOCAL: [string, number][] = [
  ["signature", 4], ["version needed", 2], ["flags", 2], ["method", 2], ["time", 2], ["date", 2], ["CRC-32", 4], ["packed size", 4], ["size", 4], ["name length", 2], ["extra length", 2],
];
const DIRECTORY: [string, number][] = [
  ["signature", 4], ["made by", 2], ["version needed", 2], ["flags", 2], ["method", 2], ["time", 2], ["date", 2], ["CRC-32", 4], ["packed size", 4], ["size", 4], ["name length", 2],
  ["extra length", 2], ["comment length", 2], ["disk", 2], ["internal attributes", 2], ["external attributes", 4], ["offset", 4],
];
const END: [string, number][] = [["signature", 4], ["disk", 2], ["directory's disk", 2], ["entries here", 2], ["entries", 2], ["directory size", 4], ["directory offset", 4], ["comment length", 2]];
const DESCRIPTOR: [string, number][] = [["signature", 4], ["CRC-32", 4], ["packed size", 4], ["size", 4]];

/** The parts of a sound archive without comments, in their order. */
export function zipParts(zip: Buffer): ZipPart[] {
  const parts: ZipPart[] = [];
  const end = zip.length - 22;
  const put = (start: number, prefix: string, fields: [string, number][], path: string): number => fields.reduce((at, [name, length]) => {
    parts.push({ start: at, length, name: `${prefix}: ${name}`, path });
    return at + length;
  }, start);
  let at = zip.readUInt32LE(end + 16);
  for (const last = end; at < last; ) {
    const [nameLength, extraLength, commentLength] = [28, 30, 32].map((offset) => zip.readUInt16LE(at + offset));
    const [flags, packed, local] = [zip.readUInt16LE(at + 8), zip.readUInt32LE(at + 20), zip.readUInt32LE(at + 42)];
    const path = zip.toString("utf8", at + 46, at + 46 + nameLength);
    at = put(put(at, "directory", DIRECTORY, path), "directory", [["name", nameLength], ["extra", extraLength], ["comment", commentLength]], path);
    const [localName, localExtra] = [zip.readUInt16LE(local + 26), zip.readUInt16LE(local + 28)];
    const content = put(put(local, "local header", LOCAL, path), "local header", [["name", localName], ["extra", localExtra]], path);
    parts.push({ start: content, length: packed, name: "content", path });
    if (flags & 8) put(content + packed, "data descriptor", DESCRIPTOR, path);
  }
  put(end, "end of directory", END, "");
  return parts.filter((part) => part.length > 0).sort((a, b) => a.start - b.start);
}
