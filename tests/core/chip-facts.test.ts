import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { chipIdFacts, pastedHex, sizeContradiction } from "@/lib/core/chip-id";
import { fromHex } from "@/lib/core/digest";
import { nameHelp, nameReadings } from "@/lib/core/name-digits";
import { densityBytes, parseSfdp, SfdpError } from "@/lib/core/sfdp";
import { fill } from "./stream";

/** Values of trade/CHECK-VALUES.md A.6 (JEP106 parity, RDID practice, JESD216). */
const KIB = 1024;
const MIB = 1024 * KIB;
const id = (text: string) => chipIdFacts(pastedHex(text));

/** The page's smallest dump: edition 1.6, one table of 16 words at 0x30, 512 KiB. */
function dump(over: Record<number, number> = {}): Uint8Array {
  const bytes = fill(0x70, 0xff);
  bytes.set(fromHex("53464450060100ff00060110300000ff"));
  bytes.set(fromHex("ffff3f00"), 0x34);
  for (const [at, value] of Object.entries(over)) bytes[Number(at)] = value;
  return bytes;
}
const hex = (bytes: Uint8Array) => Buffer.from(bytes).toString("hex");

describe("the three-byte id", () => {
  it.each(["FF FF FF", "00 00 00", "9f9f9f"])("%s is no answer", (text) => {
    expect(id(text)).toMatchObject({ answered: false, plausible: false, proposedBytes: null });
    expect(id(text).sentence).toMatch(/the chip didn't answer/);
  });
  it.each([0x01, 0x1c, 0x1f, 0x20, 0x9d, 0xbf, 0xc2, 0xc8, 0xef, 0x7f])("first byte %i has odd parity", (first) => {
    expect(chipIdFacts(Uint8Array.of(first, 0x40, 0x13))).toMatchObject({ answered: true, plausible: true, proposedBytes: 512 * KIB });
  });
  it.each([0x00, 0xff, 0x03, 0xee])("first byte %i looks like a bad contact", (first) => {
    expect(chipIdFacts(Uint8Array.of(first, 0x40, 0x13))).toMatchObject({ answered: true, plausible: false, proposedBytes: null });
  });
  it("may have two equal bytes", () => expect(id("EF EF 13")).toMatchObject({ answered: true, plausible: true }));
  it("proposes a size by common practice", () => {
    const table = [64, 128, 256, 512, KIB, 2 * KIB, 4 * KIB, 8 * KIB, 16 * KIB, 32 * KIB].map((n) => n * KIB);
    expect(table.map((_, i) => chipIdFacts(Uint8Array.of(0xef, 0x40, 0x10 + i)).proposedBytes)).toEqual(table);
    expect(id("EF 40 13").sentence).toBe("Id EF 40 13: plausible; by common practice 512 KiB. Confirm it against the marking.");
  });
  it("proposes 64 MiB for 20 (from memory), and nothing outside the table", () => {
    expect(id("EF 40 20").proposedBytes).toBe(64 * MIB);
    for (const code of [0x00, 0x0f, 0x1a, 0x1f, 0x21, 0xfe]) expect(chipIdFacts(Uint8Array.of(0xef, 0x40, code)).proposedBytes).toBeNull();
  });
  it("is taken as people paste it", () => {
    for (const text of ["ef4013", "EF:40:13", "0xEF, 0x40, 0x13", " ef-40-13\n"]) expect(id(text).text).toBe("EF 40 13");
    for (const text of ["ef40", "ef4", "ef40zz", "ef401300"]) expect(() => id(text)).toThrow(RangeError);
  });
});

describe("the chip's own table", () => {
  it("tells edition, tables and size", () => expect(parseSfdp(dump())).toEqual({ revision: "1.6", tables: 1, words: 16, pointer: 0x30, sizeBytes: 512 * KIB }));
  it.each([[0x003fffff, 512 * KIB], [0x007fffff, MIB], [0x00ffffff, 2 * MIB], [0x07ffffff, 16 * MIB], [0x80000020, 512 * MIB], [0x80000017, MIB]])("density %i", (word, bytes) => {
    expect(densityBytes(word)).toBe(bytes);
  });
  it("refuses a density that no chip has", () => {
    for (const word of [0x8000004f, 0xffffffff, 0x80000002, 0x00000002]) expect(() => densityBytes(word)).toThrow(SfdpError);
  });
  it.each([
    ["another signature", dump({ 0: 0x54 }), true], ["another edition", dump({ 5: 2 }), true], ["no basic table first", dump({ 8: 0x01 }), true],
    ["another maker's table first", dump({ 15: 0x01 }), true], ["a table of 8 words", dump({ 11: 8 }), true], ["a table past the dump", dump({ 13: 1 }), true],
    ["too little", dump().slice(0, 12), true], ["nothing", new Uint8Array(0), true], ["all FF", fill(256, 0xff), false], ["all 00", fill(256, 0), false],
  ])("refuses %s", (_name, bytes, answered) => {
    let caught: unknown;
    try {
      parseSfdp(bytes);
    } catch (error) {
      caught = error;
    }
    expect(caught).toBeInstanceOf(SfdpError);
    expect((caught as SfdpError).answered).toBe(answered);
  });
  it("needs the dump up to the size, and no more", () => {
    expect(parseSfdp(dump().slice(0, 0x38)).sizeBytes).toBe(512 * KIB);
    expect(() => parseSfdp(dump().slice(0, 0x37))).toThrow("The dump ends before the size is told. Read 112 bytes or more.");
  });
  it("throws nothing but its own error", () => {
    fc.assert(fc.property(fc.uint8Array({ maxLength: 200 }), fc.boolean(), (noise, signed) => {
      const bytes = signed ? Uint8Array.from([...fromHex("5346445006010000"), ...noise]) : noise;
      try {
        parseSfdp(bytes);
      } catch (error) {
        expect(error).toBeInstanceOf(SfdpError);
      }
    }));
  });
});

describe("a size against what the chip says", () => {
  const chip = { sizeBytes: 512 * KIB, sizeSource: "typed" as const };
  it("is contradicted by the id or the table", () => {
    expect(sizeContradiction(chip, "EF 40 14", null)).toEqual({
      source: "id", bytes: MIB, message: "Its id says 1 MiB, and the chip is recorded with 512 KiB as typed.",
      advice: "An id gives a size by common practice only. Look at the marking, then correct the size and read again, or say why the recorded size stands.",
    });
    expect(sizeContradiction({ sizeBytes: MIB, sizeSource: "marking" }, null, hex(dump()))).toMatchObject({ source: "sfdp", bytes: 512 * KIB, message: "Its own table says 512 KiB, and the chip is recorded with 1 MiB by its marking." });
  });
  it("goes by the table before the id", () => {
    expect(sizeContradiction(chip, "EF 40 14", hex(dump()))).toBeNull();
    expect(sizeContradiction({ ...chip, sizeBytes: MIB }, "EF 40 14", hex(dump()))).toMatchObject({ source: "sfdp" });
  });
  it("is not contradicted by what can't be read or tells no size", () => {
    for (const text of ["FF FF FF", "00 00 00", "EF 40 7F", "nonsense", "EF", ""]) expect(sizeContradiction(chip, text, null)).toBeNull();
    for (const text of [hex(fill(64, 0xff)), "5346", "nonsense", ""]) expect(sizeContradiction(chip, null, text)).toBeNull();
    expect(sizeContradiction(chip, "EF 40 14", "nonsense")).toMatchObject({ source: "id" });
    expect(sizeContradiction(chip, "EF 40 13", null)).toBeNull();
    expect(sizeContradiction(chip, null, null)).toBeNull();
  });
});

/** The table of A.6, from memory of data-sheet-class facts as the page says. */
describe("the digits of a name", () => {
  const sizes = (marking: string) => nameReadings(marking).map((one) => one.bytes);
  it.each([
    ["25X05", [64 * KIB]], ["25Q10", [128 * KIB]], ["25Q20", [256 * KIB]], ["25Q40CL", [512 * KIB]], ["25Q80", [MIB]], ["25Q16", [2 * MIB]], ["25Q32", [4 * MIB]], ["25Q64", [8 * MIB]],
    ["25LC010", [128]], ["25AA020", [256]], ["25LC040A", [512]], ["25LC080", [KIB]], ["25LC160", [2 * KIB]], ["25LC320", [4 * KIB]], ["25LC640", [8 * KIB]],
    ["24C01", [128]], ["24C02", [256]], ["24LC04", [512]], ["24C08", [KIB]], ["24LC16B", [2 * KIB]], ["24C32", [4 * KIB]], ["24LC64", [8 * KIB]], ["24C128", [16 * KIB]], ["24C256", [32 * KIB]], ["24C512", [64 * KIB]],
    ["93C46", [128]], ["93LC56", [256]], ["93C66", [512]], ["93C76", [KIB]], ["93C86", [2 * KIB]],
  ])("%s", (marking, bytes) => expect(sizes(marking)).toEqual(bytes));
  it("can mean two sizes a thousandfold apart, and then nothing is chosen", () => {
    expect(sizes("XY 25 L 256 E")).toEqual([32 * KIB, 32 * MIB]);
    expect(sizes("25Q128")).toEqual([16 * KIB, 16 * MIB]);
    // 512 as flash is beyond the page's table
    expect(sizes("25LC512")).toEqual([64 * KIB, 64 * MIB]);
    expect(nameHelp("25L256")).toBe("The name can mean 32 KiB if it is a 25-series EEPROM (256 = 256 Kbit) or 32 MiB if it is a 25-series flash (256 = 256 Mbit). The name alone can't tell: ask the chip for its id or table.");
  });
  it("say nothing where they follow no family", () => {
    for (const marking of ["", "BX 40-3179", "26Q40", "25Q41", "93C47", "24C1024", "25", "93"]) expect(nameHelp(marking), marking).toBeNull();
    expect(nameHelp("93C46")).toBe("The name suggests 128 bytes if it is a 93-series EEPROM (46 = 1 Kbit). Check it against the chip's id or table.");
  });
});
