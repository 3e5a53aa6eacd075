import fc from "fast-check";
import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { crc32Hex, crc32Of, fromHex } from "@/lib/core/digest";
import { encodeIntelHex, parseIntelHex, printIntelHex } from "@/lib/core/intel-hex";
import { addressesOf, FormatError, toImage } from "@/lib/core/text-format";
import { missingOracles, REAL_IMAGES, runTool } from "./text-oracles";
import { ascii, fill, sha256Hex, stream } from "./stream";

/** Values of trade/CHECK-VALUES.md A.3: the 1988 specification as srec_intel(5) restates it, re-computed there with srec_cat and objcopy. */
const W = `:10010000214601360121470136007EFE09D2190140
:100110002146017E17C20001FF5F16002148011928
:10012000194E79234623965778239EDA3F01B2CAA7
:100130003F0156702B5E712B722B732146013421C7
:00000001FF
`;
const END = ":00000001FF\n";
const WINDOW = { base: 0, size: 256, fill: 0xff };

function lineOf(text: string, window = WINDOW): number {
  try {
    parseIntelHex(text, window);
  } catch (error) {
    expect(error).toBeInstanceOf(FormatError);
    expect((error as FormatError).message).toMatch(/\.$/);
    return (error as FormatError).line;
  }
  return -1;
}
/** A record with a right checksum. */
function record(hex: string): string {
  const sum = fromHex(hex).reduce((total, byte) => total + byte, 0);
  return `:${hex}${(-sum & 0xff).toString(16).padStart(2, "0")}\n`.toUpperCase();
}

describe("the worked file", () => {
  it.each([
    ["data only", { base: 0x100, size: 64, fill: 0xff }, "506e38f1", "b73c2747fb2065077879c0b575843ae90e43b3b59cb6a3030525ba83345c5282", 0],
    ["from 0, the rest FF", { base: 0, size: 320, fill: 0xff }, "f741a4bd", "fd2395fda329762dd5cf49ca0eaf99d3d3d823ba3de20f78c1c271a6365a51d3", 256],
    ["from 0, the rest 00", { base: 0, size: 320, fill: 0x00 }, "88240c8a", "4f86898fbab60bf53b98da946cace165300f294f413c32d3c2564167529f191f", 256],
  ])("read as %s", (_name, window, crc, sha, gapBytes) => {
    const image = parseIntelHex(W, window);
    expect([crc32Hex(crc32Of(image.bytes)), sha256Hex(image.bytes)]).toEqual([crc, sha]);
    expect(image).toMatchObject({ records: 5, repeats: 0, gapBytes, gaps: gapBytes ? [{ start: 0, length: gapBytes }] : [] });
  });
  it("tells its addresses as a help", () => expect(addressesOf("intel-hex", W)).toEqual({ first: 0x100, last: 0x13f }));
  it("is the same with CRLF, lower case, blank lines at the end and no last line end", () => {
    const window = { base: 0x100, size: 64, fill: 0 };
    const wanted = sha256Hex(parseIntelHex(W, window).bytes);
    for (const text of [W.replaceAll("\n", "\r\n"), W.toLowerCase(), `${W}\n\r\n\n`, W.trimEnd()]) expect(sha256Hex(parseIntelHex(text, window).bytes)).toBe(wanted);
  });
});

describe("valid records", () => {
  const whole = (text: string, window = WINDOW) => parseIntelHex(text + END, window);
  it("of the specification are taken", () => {
    const gap = whole(":0B0010006164647265737320676170A7\n");
    expect(gap.bytes.subarray(0x10, 0x1b)).toEqual(ascii("address gap"));
    expect(gap.gaps).toEqual([{ start: 0, length: 16 }, { start: 27, length: 229 }]);
    expect(whole(":0300300002337A1E\n").bytes.subarray(0x30, 0x33)).toEqual(fromHex("02337a"));
    expect(whole(":00FFFE0003\n")).toMatchObject({ records: 2, gapBytes: 256 });
    expect(whole(":0400000300003800C1\n").start).toBe("0000:3800");
    expect(whole(":04000005000000CD2A\n").start).toBe("000000CD");
  });
  it.each([[":020000021200EA\n", 0x12000], [":0200000212FEEC\n", 0x12fe0], [":020000040800F2\n", 0x0800_0000], [":02000004FFFFFC\n", 0xffff_0000]])("%s moves the base", (line, base) => {
    expect(whole(`${line}${record("0100000042")}`, { base, size: 1, fill: 0 }).bytes).toEqual(Uint8Array.of(0x42));
  });
  it("wrap inside 64 KiB after type 02, and not after type 04", () => {
    const data = record("04FFFE0001020304");
    const segment = whole(record("020000021000") + data, { base: 0x10000, size: 0x10000, fill: 0 });
    expect([...segment.bytes.subarray(0xfffe), ...segment.bytes.subarray(0, 2)]).toEqual([1, 2, 3, 4]);
    const linear = whole(record("020000040001") + data, { base: 0x1fffe, size: 4, fill: 0 });
    expect([...linear.bytes]).toEqual([1, 2, 3, 4]);
    expect([...whole(data, { base: 0xfffe, size: 4, fill: 0 }).bytes]).toEqual([1, 2, 3, 4]);
  });
  it("wrap inside 4 GiB after type 04", () => {
    expect(addressesOf("intel-hex", record("02000004FFFF") + record("04FFFE0001020304") + END)).toEqual({ first: 0, last: 0xffff_ffff });
  });
  it("keep their base until the next one", () => {
    const text = record("020000040001") + record("0100000001") + record("0100010002") + record("020000040000") + record("0100000003");
    const image = whole(text, { base: 0, size: 0x10002, fill: 0 });
    expect([image.bytes[0], image.bytes[0x10000], image.bytes[0x10001]]).toEqual([3, 1, 2]);
  });
  it("may give a byte twice when it is the same", () => expect(whole(record("020010004142") + record("020011004243"))).toMatchObject({ repeats: 1 }));
});

describe("refuses, with the line", () => {
  const good = ":0B0010006164647265737320676170A7\n";
  it.each([
    ["a wrong checksum", `${good}:0B0010006164647265737320676170A8\n${END}`, 2],
    ["an odd number of digits", `:0B001000616464726573732067617\n${END}`, 1],
    ["no checksum", `:0B0010006164647265737320676170\n${END}`, 1],
    ["no colon", `${good}${good};0B0010006164647265737320676170A7\n${END}`, 3],
    ["a type that doesn't exist", `${record("02000006AAAA")}${END}`, 1],
    ["no hex", `${good}:000000q1ff\n`, 2],
    ["no hex after the record", `:00000001FF \n`, 1],
    ["data after the end", `${END}${good}`, 2],
    ["a second end", `${good}${END}${END}`, 3],
    ["no end", good, 1],
    ["nothing at all", "", 1],
    ["blank lines only", "\n\n", 1],
    ["a blank line between records", `${good}\n${END}`, 2],
    ["a base of three bytes", `${record("03000004000000")}${END}`, 1],
    ["a segment of one byte", `${record("0100000200")}${END}`, 1],
    ["a start of two bytes", `${record("020000050000")}${END}`, 1],
    ["an end with data", record("0100000100"), 1],
    ["a length that is not the line's", `:0C0010006164647265737320676170A6\n${END}`, 1],
    ["more bytes than announced, with a right checksum", `${record("010000004142")}${END}`, 1],
    ["two bytes for one address", `${record("0100100041")}${record("0100100042")}${END}`, 2],
    ["a byte past the image", `${record("0200FF004142")}${END}`, 1],
    ["a record of 300 bytes", `:FF${"00".repeat(299)}\n${END}`, 1],
    ["a colon alone", `:\n${END}`, 1],
    ["characters beyond ASCII", `${good}:０0000001FF\n`, 2],
  ])("%s", (_name, text, line) => expect(lineOf(text)).toBe(line));
  it("says what was found and what to do", () => {
    expect(() => parseIntelHex(record("00000006") + END, WINDOW)).toThrow("Line 1 is a record of type 06; types 00 to 05 exist.");
    expect(() => parseIntelHex(`${good}:0B0010006164647265737320676170A8\n`, WINDOW)).toThrow("Line 2 has the checksum A8, and its bytes give A7. Save the text again and send it unchanged.");
    expect(() => parseIntelHex(W, { base: 0, size: 256, fill: 0 })).toThrow("Line 1 gives address 0100, and the image runs from 0000 to 00FF. Check base and size.");
    expect(() => parseIntelHex(W, { base: 0x108, size: 256, fill: 0 })).toThrow("Line 1 gives address 0100, and the image runs from 0108 to 0207. Check base and size.");
  });
});

describe("expansion", () => {
  it("is bounded before memory is taken", () => {
    for (const size of [64 * 1024 * 1024 + 1, 2 ** 40, Infinity, NaN, 0, -1, 1.5]) expect(lineOf(W, { base: 0, size, fill: 0 })).toBe(0);
    for (const base of [-1, 2 ** 32, 0.5, NaN]) expect(lineOf(W, { base, size: 1, fill: 0 })).toBe(0);
    for (const value of [-1, 256, 0.5]) expect(lineOf(W, { base: 0, size: 1, fill: value })).toBe(0);
  });
  it("takes no more than the image for a text that names the ends of 4 GiB", () => {
    const bomb = record("0100000001") + record("02000004FFFF") + record("01FFFF0002") + END;
    const before = process.memoryUsage().arrayBuffers;
    expect(lineOf(bomb, { base: 0, size: 1024, fill: 0 })).toBe(3);
    expect(addressesOf("intel-hex", bomb)).toEqual({ first: 0, last: 0xffff_ffff });
    expect(process.memoryUsage().arrayBuffers - before).toBeLessThan(1024 * 1024);
  });
});

describe("printing", () => {
  it("gives the published lines", () => {
    expect(printIntelHex(stream("bench-seed-1", 64))).toBe(`:100000000B6A07E18853F70CE27D25A8D34E99B718
:100010005FB2309F1A76BDF07D186CC3CB11D4A4AB
:10002000192B979E92C66C273451EB4DC169B0B520
:10003000FC5B5B069DF15EA0F44CF39A2DE909D3BD
${END}`);
    expect(printIntelHex(stream("bench-seed-1", 524_288))).toContain("\n:020000040001F9\n");
    expect(printIntelHex(new Uint8Array(0))).toBe(END);
  });
  it("never lets a line cross 64 KiB", () => {
    expect(printIntelHex(fill(17, 0), { base: 0xfff8 })).toBe(`:08FFF8000000000000000000${"01"}\n:020000040001F9\n:090000000000000000000000${"00F7"}\n${END}`);
  });
  it("refuses addresses past FFFFFFFF", () => {
    expect(() => printIntelHex(fill(2, 0), { base: 0xffff_ffff })).toThrow(FormatError);
    expect(printIntelHex(fill(1, 0), { base: 0xffff_ffff })).toContain(":01FFFF0000");
  });
  it("and parsing give the image back, from any base", () => {
    fc.assert(fc.property(fc.uint8Array({ maxLength: 300 }), fc.oneof(fc.integer({ min: 0, max: 0x30000 }), fc.integer({ min: 0xffff_0000, max: 0xffff_fe00 })), fc.integer({ min: 0, max: 255 }), (bytes, base, value) => {
      const image = toImage("intel-hex", encodeIntelHex(bytes, { base }), { base, size: bytes.length + 7, fill: value });
      expect(image.bytes.subarray(0, bytes.length)).toEqual(bytes);
      expect(image.bytes.subarray(bytes.length)).toEqual(fill(7, value));
      expect(image).toMatchObject({ gapBytes: 7, repeats: 0 });
    }));
  });
});

it("throws nothing but its own error, whatever comes", () => {
  const shred = fc.oneof(fc.uint8Array(), fc.string().map(ascii), fc.tuple(fc.nat(W.length), fc.nat(W.length), fc.string({ maxLength: 4 })).map(([from, to, text]) => ascii(W.slice(0, from) + text + W.slice(to))));
  fc.assert(fc.property(shred, (bytes) => {
    try {
      parseIntelHex(bytes, { base: 0, size: 512, fill: 0 });
    } catch (error) {
      expect(error).toBeInstanceOf(FormatError);
    }
  }), { numRuns: 500 });
});

describe.skipIf(missingOracles.length > 0)("two independent programs", () => {
  const images: [string, Uint8Array][] = [
    ["64 bytes", stream("bench-seed-1", 64)], ["one byte", Uint8Array.of(7)], ["512 KiB", stream("bench-seed-1", 524_288)], ["70,001 bytes", stream("odd", 70_001)],
    ...REAL_IMAGES.map((file): [string, Uint8Array] => [file, new Uint8Array(readFileSync(file))]),
  ];
  it.each(images)("read what is printed: %s", (_name, bytes) => {
    const text = encodeIntelHex(bytes);
    const wanted = sha256Hex(bytes);
    expect(sha256Hex(runTool("srec_cat", text, (from, to) => [from, "-intel", "-o", to, "-binary"]))).toBe(wanted);
    expect(sha256Hex(runTool("objcopy", text, (from, to) => ["-I", "ihex", "-O", "binary", from, to]))).toBe(wanted);
  });
  it.each(images)("print what is read, with types 04 and 02: %s", (_name, bytes) => {
    const window = { base: 0, size: bytes.length, fill: 0 };
    const wanted = sha256Hex(bytes);
    const texts = [
      runTool("objcopy", bytes, (from, to) => ["-I", "binary", "-O", "ihex", from, to]),
      runTool("srec_cat", bytes, (from, to) => [from, "-binary", "-o", to, "-intel"]),
      ...(bytes.length < 1_048_576 ? [runTool("srec_cat", bytes, (from, to) => [from, "-binary", "-o", to, "-intel", "-address-length=3"])] : []),
    ];
    for (const text of texts) expect(sha256Hex(parseIntelHex(text, window).bytes)).toBe(wanted);
  });
  it("place data at the same addresses, from any base", () => {
    for (const base of [0, 1, 0xfff3, 0x10000, 0x123_4567]) {
      const bytes = stream(`base-${base}`, 100);
      const text = runTool("srec_cat", bytes, (from, to) => [from, "-binary", "-offset", String(base), "-o", to, "-intel"]);
      expect(parseIntelHex(text, { base, size: 100, fill: 0 })).toMatchObject({ bytes, gapBytes: 0 });
      const back = runTool("srec_cat", encodeIntelHex(bytes, { base }), (from, to) => [from, "-intel", "-offset", String(-base), "-o", to, "-binary"]);
      expect(back).toEqual(bytes);
    }
  });
  it("wrap after type 02 alike", () => {
    const text = ascii(record("020000021000") + record("08FFFC000102030405060708") + END);
    const wanted = runTool("srec_cat", text, (from, to) => ["-disable-sequence-warnings", from, "-intel", "-offset", "-0x10000", "-fill", "0", "0", "0x10000", "-o", to, "-binary"]);
    expect(sha256Hex(parseIntelHex(text, { base: 0x10000, size: 0x10000, fill: 0 }).bytes)).toBe(sha256Hex(wanted));
  });
});
