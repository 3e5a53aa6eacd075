import fc from "fast-check";
import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { crc32Hex, crc32Of, fromHex } from "@/lib/core/digest";
import { encodeSRecord, parseSRecord, printSRecord } from "@/lib/core/s-record";
import { addressesOf, FormatError, fromImage, toImage } from "@/lib/core/text-format";
import { missingOracles, REAL_IMAGES, runTool } from "./text-oracles";
import { ascii, fill, sha256Hex, stream } from "./stream";

/** The file of the 68000 family programmer's manual, as trade/CHECK-VALUES.md A.4 holds it; digests computed there. */
const M = `S00600004844521B
S1130000285F245F2212226A000424290008237C2A
S11300100002000800082629001853812341001813
S113002041E900084E42234300182342000824A952
S107003000144ED492
S5030004F8
S9030000FC
`;
const END = "S9030000FC\n";
const WINDOW = { base: 0, size: 64, fill: 0xff };

function lineOf(text: string): number {
  try {
    parseSRecord(text, WINDOW);
  } catch (error) {
    expect(error).toBeInstanceOf(FormatError);
    expect((error as FormatError).message).toMatch(/\.$/);
    return (error as FormatError).line;
  }
  return -1;
}
/** A record with right count and checksum: `record(1, "0000", "41")`. */
function record(type: number, address: string, data = ""): string {
  const hex = (address.length / 2 + data.length / 2 + 1).toString(16).padStart(2, "0") + address + data;
  const sum = fromHex(hex).reduce((total, byte) => total + byte, 0);
  return `S${type}${hex}${(~sum & 0xff).toString(16).padStart(2, "0")}\n`.toUpperCase();
}

describe("the worked file", () => {
  it("gives the published bytes", () => {
    const image = parseSRecord(M, { base: 0, size: 52, fill: 0xff });
    expect([crc32Hex(crc32Of(image.bytes)), sha256Hex(image.bytes)]).toEqual(["1900d751", "3c294e25e13c0829339bffc842d3a0b6f0fa15d412e7c506d4314807ae75e32d"]);
    expect(image).toMatchObject({ records: 7, start: "0000", gaps: [], gapBytes: 0, repeats: 0 });
    expect(addressesOf("s-record", M)).toEqual({ first: 0, last: 51 });
  });
  it("is the same with CRLF, lower-case digits and blank lines at the end", () => {
    for (const text of [M.replaceAll("\n", "\r\n"), M.toLowerCase().replaceAll("s", "S"), `${M}\n\n`, M.trimEnd()]) {
      expect(crc32Hex(crc32Of(parseSRecord(text, { base: 0, size: 52, fill: 0 }).bytes))).toBe("1900d751");
    }
  });
});

describe("valid records", () => {
  const first16 = parseSRecord(M, WINDOW).bytes.subarray(0, 16);
  it.each([["S214000000285F245F2212226A000424290008237C29", "S804000000FB"], ["S31500000000285F245F2212226A000424290008237C28", "S70500000000FA"]])("with longer addresses: %s", (line, end) => {
    expect(parseSRecord(`${line}\n${end}\n`, { base: 0, size: 16, fill: 0 }).bytes).toEqual(first16);
  });
  it("of the published greeting", () => {
    expect(parseSRecord("S110000048656C6C6F2C20576F726C640A9D\nS5030001FB\nS9030000FC\n", { base: 0, size: 13, fill: 0 }).bytes).toEqual(ascii("Hello, World\n"));
  });
  it("may give a byte twice when it is the same, and say where a program begins", () => {
    expect(parseSRecord(record(1, "0010", "4142") + record(1, "0011", "4243") + record(9, "1234"), WINDOW)).toMatchObject({ repeats: 1, start: "1234" });
  });
  it("may end with a right count alone, as srec_cat writes them", () => {
    expect(parseSRecord(record(1, "0000", "4142") + record(5, "0001"), WINDOW)).toMatchObject({ records: 2, gapBytes: 62 });
  });
  it("may hold no data", () => expect(parseSRecord(record(1, "0000") + END, WINDOW)).toMatchObject({ gapBytes: 64 }));
});

describe("refuses, with the line", () => {
  it.each([
    ["a count that is not the number of data records", M.replace("S5030004F8", "S5030003F9"), 6],
    ["a wrong checksum", M.replace("237C2A", "237C2B"), 2],
    ["a count byte that is not the line's", M.replace("S1130000", "S1120000"), 2],
    ["the end before the data's end", END + M, 2],
    ["two bytes for one address", record(1, "0000", "41") + record(1, "0000", "42") + END, 2],
    ["overlapping S1 and S2", record(1, "0000", "4142") + record(2, "000001", "43") + END, 2],
    ["the reserved S4", record(4, "0000", "41") + END, 1],
    ["a type that is a letter", `SX030000FC\n${END}`, 1],
    ["no S", `${record(1, "0000", "41")}1130000\n${END}`, 2],
    ["a lower-case s", M.toLowerCase(), 1],
    ["no hex", `S1G30000FC\n${END}`, 1],
    ["an odd number of digits", `S9030000F\n`, 1],
    ["an S alone", `S\n${END}`, 1],
    ["a type alone", `S1\n${END}`, 1],
    ["too few bytes for the address", `S10200FD\n${END}`, 1],
    ["an end with data", record(9, "0000", "41"), 1],
    ["a count with data", record(5, "0000", "41") + END, 1],
    ["data after the count", record(5, "0000") + record(1, "0000", "41") + END, 2],
    ["neither count nor end", record(1, "0000", "41"), 1],
    ["nothing at all", "", 1],
    ["a blank line between records", `${record(1, "0000", "41")}\n${END}`, 2],
    ["an address past the image", record(1, "0040", "41") + END, 1],
    ["a count byte too small, with a right checksum", `S1040000414278\n${END}`, 1],
    ["data past the last 16-bit address", record(1, "FFFF", "4142") + END, 1],
  ])("%s", (_name, text, line) => expect(lineOf(text)).toBe(line));
  it("data past the last 16-bit address although the image would hold it", () => {
    const window = { base: 0xfff0, size: 64, fill: 0 };
    expect(() => parseSRecord(record(1, "FFFF", "4142") + END, window)).toThrow("Line 1 runs past the last address that an S1 record can name.");
    expect(parseSRecord(record(1, "FFFE", "4142") + END, window).gapBytes).toBe(62);
  });
  it("says what was found and what to do", () => {
    expect(() => parseSRecord(M.replace("S5030004F8", "S5030003F9"), WINDOW)).toThrow("Line 6 counts 3 data records, and 4 came before it. A part of the text is missing: save it again.");
  });
  it("an image larger than 64 MiB before anything is read", () => {
    expect(() => parseSRecord("", { base: 0, size: 2 ** 30, fill: 0 })).toThrow("at most 67108864 bytes (64 MiB)");
  });
});

describe("printing", () => {
  it("gives known lines", () => {
    expect(printSRecord(ascii("Hello, World\n"))).toBe("S0030000FC\nS110000048656C6C6F2C20576F726C640A9D\nS5030001FB\nS9030000FC\n");
    expect(printSRecord(fill(1, 0), { base: 0xffffff })).toMatch(/^S2/m);
    expect(printSRecord(fill(2, 0), { base: 0xffffff })).toMatch(/^S3.*\n(S3.*\n)S5030002FA\nS70500000000FA\n/m);
    expect(printSRecord(new Uint8Array(0))).toBe("S0030000FC\nS5030000FC\nS9030000FC\n");
  });
  it("leaves out a count that 16 bits don't hold", () => {
    const bytes = fill(16 * 65_536, 7);
    expect(printSRecord(bytes.subarray(16))).toMatch(/\nS503FFFFFE\nS80/);
    expect(printSRecord(bytes)).not.toMatch(/\nS[56]/);
    expect(parseSRecord(encodeSRecord(bytes), { base: 0, size: bytes.length, fill: 0 })).toMatchObject({ gapBytes: 0, records: 65_538 });
  });
  it("refuses addresses past FFFFFFFF", () => expect(() => printSRecord(fill(2, 0), { base: 0xffff_ffff })).toThrow(FormatError));
  it("and parsing give the image back, from any base", () => {
    fc.assert(fc.property(fc.uint8Array({ maxLength: 300 }), fc.oneof(fc.integer({ min: 0, max: 0x30000 }), fc.integer({ min: 0xfffff0, max: 0x1000010 }), fc.integer({ min: 0xffff_0000, max: 0xffff_fe00 })), (bytes, base) => {
      const image = toImage("s-record", encodeSRecord(bytes, { base }), { base, size: bytes.length + 7, fill: 0x5a });
      expect(image.bytes.subarray(0, bytes.length)).toEqual(bytes);
      expect(image).toMatchObject({ gapBytes: 7, repeats: 0 });
    }));
  });
});

it("throws nothing but its own error, whatever comes", () => {
  const shred = fc.oneof(fc.uint8Array(), fc.string().map(ascii), fc.tuple(fc.nat(M.length), fc.nat(M.length), fc.string({ maxLength: 4 })).map(([from, to, text]) => ascii(M.slice(0, from) + text + M.slice(to))));
  fc.assert(fc.property(shred, (bytes) => {
    try {
      parseSRecord(bytes, WINDOW);
    } catch (error) {
      expect(error).toBeInstanceOf(FormatError);
    }
  }), { numRuns: 500 });
});

it("leaves a raw image as it is", () => {
  const bytes = stream("raw", 100);
  expect(toImage("raw", bytes)).toMatchObject({ bytes, records: 0, gapBytes: 0 });
  expect(fromImage("raw", bytes)).toBe(bytes);
});

describe.skipIf(missingOracles.length > 0)("two independent programs", () => {
  const images: [string, Uint8Array][] = [
    ["64 bytes", stream("bench-seed-1", 64)], ["one byte", Uint8Array.of(7)], ["512 KiB", stream("bench-seed-1", 524_288)], ["65,537 bytes", stream("odd", 65_537)],
    ["over 65,535 lines", stream("long", 1_048_600)],
    ...REAL_IMAGES.map((file): [string, Uint8Array] => [file, new Uint8Array(readFileSync(file))]),
  ];
  it.each(images)("read what is printed: %s", (_name, bytes) => {
    const text = encodeSRecord(bytes);
    const wanted = sha256Hex(bytes);
    expect(sha256Hex(runTool("srec_cat", text, (from, to) => [from, "-motorola", "-o", to, "-binary"]))).toBe(wanted);
    expect(sha256Hex(runTool("objcopy", text, (from, to) => ["-I", "srec", "-O", "binary", from, to]))).toBe(wanted);
  });
  it.each(images)("print what is read: %s", (_name, bytes) => {
    const wanted = sha256Hex(bytes);
    const texts = [
      runTool("objcopy", bytes, (from, to) => ["-I", "binary", "-O", "srec", from, to]),
      runTool("objcopy", bytes, (from, to) => ["-I", "binary", "-O", "srec", "--srec-forceS3", from, to]),
      runTool("srec_cat", bytes, (from, to) => [from, "-binary", "-o", to, "-motorola"]),
    ];
    for (const text of texts) expect(sha256Hex(parseSRecord(text, { base: 0, size: bytes.length, fill: 0 }).bytes)).toBe(wanted);
  });
});
