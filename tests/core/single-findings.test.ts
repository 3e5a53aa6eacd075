import { describe, expect, it } from "vitest";
import { inspectWhole } from "@/lib/core/inspect";
import { singleFindings, type ChipOfImage } from "@/lib/core/single-findings";
import { joined, loseBits } from "./golden/bits";
import { ascii, fill, stream } from "./stream";

function alone(bytes: Uint8Array, chip: Partial<ChipOfImage> = {}) {
  return singleFindings(inspectWhole(bytes), { sizeBytes: bytes.length, sizeSource: "marking", ...chip });
}
const said = (bytes: Uint8Array, chip: Partial<ChipOfImage> = {}) => alone(bytes, chip).map((one) => `${one.code} ${one.severity}`);
/** ordinary content: noise with some structure, so that it isn't noise-like */
const plain = (n: number) => stream("plain", n).map((value, i) => (i % 5 === 0 ? value & 0xf1 : value));

describe("repeats", () => {
  const times = (n: number, size = 2048) => Uint8Array.from({ length: n * size }, (_, i) => plain(size)[i % size]);
  it("asks for a reason where one half equals the other, blocks at four copies unless the size is confirmed", () => {
    expect(said(times(2))).toEqual(["repeats-within reason"]);
    expect(said(times(4))).toEqual(["repeats-within blocks"]);
    expect(said(times(4), { sizeSource: "id" })).toEqual(["repeats-within reason"]);
    expect(said(times(4), { sizeSource: "sfdp" })).toEqual(["repeats-within reason"]);
    expect(said(times(3))).toEqual(["repeats-within reason"]);
  });
  it("blocks where the size isn't the chip's", () => expect(said(times(2), { sizeBytes: 2048 })).toEqual(["extra-bytes blocks", "repeats-within blocks"]));
  it("says half in the words of the bench", () => {
    expect(alone(times(2))[0].message).toBe("Second half repeats the first.");
    expect(alone(times(4))[0]).toMatchObject({ message: "The first 2 KiB repeat to the end.", ranges: [{ start: 2048, length: 6144 }] });
  });
  it("blocks on a stuck line in dense content, notes a second copy in an empty chip", () => {
    expect(said(plain(16_384).map((_, i, all) => all[i & ~0x400]))).toEqual(["address-line blocks"]);
    const kept = (copies: number[]) => {
      const image = fill(65_536, 0xff);
      for (const at of copies) image.set(plain(1024), at);
      return image;
    };
    expect(said(kept([0x1000, 0x1400]))).toEqual(["address-line note"]);
    expect(said(kept([0x1000, 0x1400, 0x3000, 0x3400]))).toEqual(["address-line reason"]);
    expect(said(kept([0x1000, 0x1400, 0x3000, 0x3400, 0x5000, 0x5400, 0x7000, 0x7400]))).toEqual(["address-line blocks"]);
    expect(said(kept([0x1000, 0x3800]))).toEqual([]);
  });
  it("asks for a reason where nearly all pairs are equal", () => {
    const image = plain(16_384).map((_, i, all) => all[i & ~0x400]);
    image[0x700] ^= 1;
    expect(said(image)).toEqual(["address-line reason"]);
  });
  it("blocks an id over and over and says nothing else of it", () => {
    expect(said(Uint8Array.from({ length: 8192 }, (_, i) => [0x20, 0x40, 0x13][i % 3]))).toEqual(["short-period blocks"]);
  });
});

describe("content", () => {
  it("that is noise asks for a reason", () => expect(said(stream("bench-seed-1", 65_536))).toEqual(["noise-like reason"]));
  it("with text that reads only some bits further on has slipped", () => {
    const text = joined(ascii("Head and track map, zone table: 0x12/0x34, serial A-1234.5 ".repeat(20)), plain(4096));
    expect(said(text)).toEqual([]);
    expect(alone(loseBits(joined([0x80], text), 0, 3))).toMatchObject([{ code: "bit-slip", severity: "blocks" }]);
  });
  it("needs 512 bytes of such text, and five times as many", () => {
    const words = ascii("abcdefgh".repeat(64));
    const moved = (n: number, asRead: number) => joined(plain(1024).map((v) => v | 0x80), loseBits(joined([0x80], words.subarray(0, n), [0x80]), 0, 1), ascii("ijklmnop".repeat(asRead)), [0xff]);
    expect(inspectWhole(moved(512, 12)).whole?.wordScores[7]).toBe(512);
    expect(said(moved(512, 12))).toEqual(["bit-slip blocks"]);
    expect(said(moved(511, 12))).toEqual([]);
    expect(said(moved(512, 13))).toEqual([]);
  });
  it("with a bit that never changes: a reason from 256 bytes, blocks from 4 KiB", () => {
    const low = (n: number) => plain(n).map((value) => value & 0xdf);
    expect(said(low(255))).toEqual([]);
    expect(said(low(256))).toEqual(["constant-bit reason"]);
    expect(said(low(4095))).toEqual(["constant-bit reason"]);
    expect(said(low(4096))).toEqual(["constant-bit blocks"]);
    // a store of settings: blank but for 100 bytes of text
    const store = Buffer.alloc(131_072, 0xff);
    store.fill("setting", 0x1000, 0x1064);
    expect(said(store)).toEqual(["nearly-blank note", "constant-bit reason"]);
    expect(alone(plain(4096).map((value) => value | 0x02))[0].message).toBe("In every byte bit 1 is always 1.");
  });
  it("that is text or an archive is no image", () => {
    expect(said(ascii(":10000000214601360121470136007EFE09D2190140\n:00000001FF\n"))).toEqual(["text-file blocks"]);
    const magic = plain(4096);
    magic.set([0x1f, 0x8b]);
    expect(said(magic)).toEqual(["container-file reason"]);
    const pdf = ascii(`%PDF-1.4 ${"abcdefgh".repeat(100)} %%EOF`);
    expect(said(pdf)).toEqual(["container-file blocks"]);
  });
});

describe("the chip's own facts", () => {
  it("contradict the size with a text that is ready-made", () => {
    expect(alone(plain(4096), { contradiction: "The id says 8 KiB, the chip's size is 4 KiB." })).toMatchObject([{ code: "size-contradicts", severity: "reason", message: "The id says 8 KiB, the chip's size is 4 KiB." }]);
  });
  it("tell a chip without contact from one that is blank", () => {
    const advice = (idBytes: string | null) => alone(fill(4096, 0xff), { idBytes })[0].advice;
    expect(advice(null)).toContain("A plausible chip id");
    expect(advice("ff ff ff")).toContain("there is no contact");
    expect(advice("202013")).toContain("likely truly blank");
  });
  it("know a padded tail from the image itself", () => {
    expect(said(joined(plain(4096), fill(512, 0xff)), { sizeBytes: 4096 })).toEqual(["padded blocks"]);
    expect(said(joined(plain(4096), fill(511, 0xff), [1]), { sizeBytes: 4096 })).toEqual(["extra-bytes blocks"]);
  });
});
