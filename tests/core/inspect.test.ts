import { execFileSync } from "node:child_process";
import { deflateRawSync, gzipSync } from "node:zlib";
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { crc32Of } from "@/lib/core/digest";
import { wordScores } from "@/lib/core/facts-words";
import { inspectWhole } from "@/lib/core/inspect";
import { gunzips } from "@/lib/engine/gunzips";
import { ascii, fill, goldenImage, stream } from "./stream";

const whole = (bytes: Uint8Array) => inspectWhole(bytes).whole!;

describe("entropy and chi-square", () => {
  /** `ent -t`: a header line, then 1, size, entropy, chi-square, … */
  const ent = (bytes: Uint8Array) => execFileSync("ent", ["-t"], { input: bytes, encoding: "utf8" }).split("\n")[1].split(",").slice(2, 4);
  it.each<[string, Uint8Array]>([
    ["512 KiB of stream", stream("bench-seed-1", 524_288)], ["the golden image", goldenImage()], ["text", ascii("mississippi".repeat(200))],
    ["1,281 bytes", stream("odd", 1281)], ["two values", fill(4096, 1).map((_, i) => (i % 4 === 0 ? 7 : 9))],
  ])("equal ent's for %s", (_name, bytes) => {
    const [entropy, chiSquare] = ent(bytes);
    expect(Number(whole(bytes).entropy)).toBeCloseTo(Number(entropy), 5);
    expect(Number(whole(bytes).chiSquare)).toBeCloseTo(Number(chiSquare), 1);
  });
  // CHECK-VALUES A.7, computed there
  it.each<[Uint8Array, string]>([
    [fill(100, 5), "0.000000"], [Uint8Array.from({ length: 256 }, (_, i) => i), "8.000000"], [Uint8Array.from([1, 1, 1, 2]), "0.811278"],
    [ascii("mississippi"), "1.823068"], [ascii("abracadabra"), "2.040373"], [ascii("hello world"), "2.845351"],
  ])("of worked examples", (bytes, entropy) => expect(whole(bytes).entropy).toBe(entropy));
  it("says no chi-square below 1,280 bytes", () => {
    expect(whole(stream("s", 1279)).chiSquare).toBeNull();
    expect(whole(Uint8Array.from({ length: 1280 }, (_, i) => i)).chiSquare).toBe("0.00");
  });
});

describe("noise", () => {
  it("is what 512 KiB of stream look like, whole blocks or not", () => {
    expect(whole(stream("bench-seed-1", 524_288))).toMatchObject({ noiseLike: true, entropy: "7.999715", chiSquare: "207.37" });
    expect(whole(stream("bench-seed-1", 524_288).subarray(0, 520_000)).noiseLike).toBe(true);
  });
  it("is not an image with one ordinary block, nor one that is too even, nor a small one", () => {
    const image = stream("bench-seed-1", 524_288);
    image.set(Uint8Array.from({ length: 4096 }, (_, i) => i % 128), 0x10000);
    image.set(Uint8Array.from({ length: 4096 }, (_, i) => 128 + (i % 128)), 0x30000);
    expect(Number(whole(image).chiSquare)).toBeLessThan(310);
    expect(whole(image).noiseLike).toBe(false);
    expect(whole(Uint8Array.from({ length: 8192 }, (_, i) => i)).noiseLike).toBe(false);
    expect(whole(stream("s", 1000)).noiseLike).toBe(false);
  });
});

describe("word scores", () => {
  const WORD = /[A-Za-z0-9 ._/%:-]{8,}/g;
  function naive(bytes: Uint8Array, shift: number): number {
    const moved = Array.from(bytes, (value, i) => ((value << shift) | ((bytes[i + 1] ?? 0) >> (8 - shift))) & 0xff);
    if (shift > 0) moved.pop();
    const text = String.fromCharCode(...moved);
    return [...text.matchAll(WORD)].filter(([run]) => new Set(run).size >= 4).reduce((sum, [run]) => sum + run.length, 0);
  }
  const wordy = fc.array(fc.oneof(fc.uint8Array({ maxLength: 12 }), fc.stringMatching(/^[A-Za-z0-9 ._/%:-]{0,24}$/).map((text) => ascii(text)), fc.constant(ascii("aaaaaaaaaabbbbbb"))), { maxLength: 30 })
    .map((parts) => Uint8Array.from(parts.flatMap((part) => [...part])));
  it("equal a naive count at every shift", () => {
    fc.assert(fc.property(wordy, fc.nat(7), (bytes, turn) => {
      const image = Uint8Array.from(bytes, (value, i) => ((value >> turn) | ((bytes[i - 1] ?? 0) << (8 - turn))) & 0xff);
      expect(wordScores(image)).toEqual([0, 1, 2, 3, 4, 5, 6, 7].map((shift) => naive(image, shift)));
    }), { numRuns: 500 });
  });
});

describe("repeats", () => {
  it("finds the smallest power of two, and the lines below it", () => {
    const unit = stream("unit", 1024);
    expect(whole(Uint8Array.from({ length: 8192 }, (_, i) => unit[i % 1024])).repeats).toMatchObject({ period: { bytes: 1024 }, lines: [{ line: 10 }], short: null });
    expect(whole(Uint8Array.from({ length: 8192 }, (_, i) => unit[i % 1024 & ~32])).repeats).toMatchObject({ period: { bytes: 1024 }, lines: [{ line: 5 }, { line: 10 }] });
  });
  it("needs 64 informative pairs", () => {
    const image = (n: number) => { const out = fill(8192, 0xff); out.fill(0x20, 100, 100 + n); out[100] = 0x21; out.copyWithin(4196, 100, 100 + n); return out; };
    expect(whole(image(63)).repeats.period).toBeNull();
    expect(whole(image(64)).repeats.period).toEqual({ bytes: 4096, informative: 64 });
  });
  it("calls an address line at 98 %, not below", () => {
    const half = stream("half", 4096);
    const off = (n: number) => { const out = new Uint8Array(8192); out.set(half); out.set(half, 4096); for (let i = 0; i < n; i += 1) out[4096 + i * 50] ^= 1; return whole(out).repeats.lines; };
    expect(off(70)).toMatchObject([{ line: 12 }]);
    expect(off(81)).toMatchObject([{ line: 12 }]);
    expect(off(82)).toEqual([]);
  });
  it("takes a distance of up to 64 for an echo", () => {
    const over = (n: number) => whole(Uint8Array.from({ length: 8192 }, (_, i) => 1 + ((i % n) * 3) % 250)).repeats.short?.bytes ?? null;
    expect([over(2), over(3), over(64), over(65)]).toEqual([2, 3, 64, null]);
    const field = fill(8192, 0xff);
    field.fill(0x20, 0, 400);
    expect(whole(field).repeats.short).toBeNull();
  });
});

describe("what kind of file it is", () => {
  const zip = (comment = 0) => {
    const out = new Uint8Array(200 + 22 + comment);
    out.set([0x50, 0x4b, 3, 4]);
    out.set([0x50, 0x4b, 5, 6], 200);
    out[200 + 20] = comment;
    out[200 + 16] = 100;
    out[200 + 12] = 100;
    return out;
  };
  const sevenZip = () => {
    const out = stream("7z", 200);
    out.set([0x37, 0x7a, 0xbc, 0xaf, 0x27, 0x1c, 0, 4]);
    new DataView(out.buffer).setUint32(8, crc32Of(out.subarray(12, 32)), true);
    return out;
  };
  const elf = () => { const out = new Uint8Array(256); out.set([0x7f, 0x45, 0x4c, 0x46, 1, 1, 1]); out[40] = 52; out[28] = 52; return out; };
  it.each<[string, Uint8Array, string]>([
    ["zip", zip(), "zip"], ["zip with a comment", zip(9), "zip"],
    ["7z", sevenZip(), "7z"], ["pdf", ascii(`%PDF-1.7\n${"x".repeat(2000)}\n%%EOF\n`), "pdf"], ["elf", elf(), "elf"],
  ])("%s parses", (_name, bytes, kind) => expect(whole(new Uint8Array(bytes)).container).toEqual({ kind, parses: true }));
  it.each<[string, number[]]>([["zip", [0x50, 0x4b, 3, 4]], ["gzip", [0x1f, 0x8b]], ["7z", [0x37, 0x7a, 0xbc, 0xaf]], ["pdf", [0x25, 0x50, 0x44, 0x46]], ["elf", [0x7f, 0x45, 0x4c, 0x46]]])(
    "%s by its first bytes alone does not", (kind, magic) => {
      const bytes = stream("bench-seed-1", 4096);
      bytes.set(magic);
      expect(whole(bytes).container).toEqual({ kind, parses: false });
    });
  describe("of a gzip file", () => {
    const packed = gzipSync(stream("s", 100_000));
    const changed = (at: number) => packed.map((value, i) => (i === at ? value ^ 1 : value));
    const containerOf = async (bytes: Uint8Array) => inspectWhole(bytes, await gunzips(bytes)).whole?.container;
    it.each<[string, Uint8Array]>([
      ["that unpacks", packed], ["of text", gzipSync(ascii("words ".repeat(900)))], ["with nothing in it", gzipSync("")],
      // RFC 1952 section 2.2: a file is a series of members
      ["of two members", Buffer.concat([packed, gzipSync("more")])],
      ["that unpacks to more than anyone asks for", gzipSync(new Uint8Array(66 << 20))],
    ])("%s is one", async (_name, bytes) => expect(await containerOf(new Uint8Array(bytes))).toEqual({ kind: "gzip", parses: true }));
    it.each<[string, Uint8Array]>([
      ["cut by a byte", packed.subarray(0, -1)], ["with one bit off in its data", changed(50_000)], ["with another CRC-32", changed(packed.length - 8)],
      ["with another length", changed(packed.length - 2)], ["before padding of FF", Buffer.concat([packed, fill(300, 0xff)])],
      ["before padding of 00", Buffer.concat([packed, fill(300_000, 0)])], ["of its first bytes alone", Uint8Array.from([0x1f, 0x8b])],
    ])("%s is none", async (_name, bytes) => expect(await containerOf(new Uint8Array(bytes))).toEqual({ kind: "gzip", parses: false }));
    it("is never found by chance: no header is enough", async () => {
      for (let i = 0; i < 200; i += 1) {
        const bytes = stream(`chance-${i}`, 8192);
        bytes.set([0x1f, 0x8b, 8, 0]);
        expect(await gunzips(bytes)).toBe(false);
      }
    });
    it("is asked of no other file", async () => expect(await gunzips(goldenImage())).toBe(false));
  });
  it("is no container because of deflated data inside", () => expect(whole(new Uint8Array(deflateRawSync(stream("s", 900)))).container).toBeNull());
  it.each<[string, string, string | null]>([
    ["records", ":10000000214601360121470136007EFE09D2190140\r\n:00000001FF\r\n", "intel-hex"],
    ["lower case records", ":10000000214601360121470136007efe09d2190140\n:00000001ff\n\n", "intel-hex"],
    ["S-records", "S00600004844521B\nS9030000FC\n", "s-record"],
    ["hex digits", "0b 6a 07 e1 88 53 f7 0c\n", "hex-text"],
    ["a sentence", "The quick brown fox jumps over the lazy dog", null],
  ])("%s", (_name, text, kind) => expect(whole(ascii(text)).text).toBe(kind));
  it("is no text with one byte that is none", () => {
    const bytes = ascii("0b6a07e18853f70c".repeat(64));
    expect(whole(bytes).text).toBe("hex-text");
    bytes[500] = 0x80;
    expect(whole(bytes).text).toBeNull();
    bytes[500] = 1;
    expect(whole(bytes).text).toBeNull();
  });
});

describe("inspection", () => {
  it("leaves as plain JSON", () => {
    for (const bytes of [goldenImage(), new Uint8Array(1), fill(300, 0xff), stream("s", 5000)]) {
      expect(JSON.parse(JSON.stringify(inspectWhole(bytes)))).toEqual(inspectWhole(bytes));
    }
  });
  it("counts set bits and the run at the end", () => {
    expect(whole(goldenImage())).toMatchObject({ oneBits: 49_447, endRun: 2192, alwaysOne: 0, everOne: 0xff });
    expect(whole(Uint8Array.from([0x81, 0x83, 0x83]))).toMatchObject({ oneBits: 8, endRun: 2, alwaysOne: 0x81, everOne: 0x83 });
  });
});
