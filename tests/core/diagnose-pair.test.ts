import { describe, expect, it } from "vitest";
import { compareImages } from "@/lib/core/compare";
import { causeOfPair, diagnosePair, looksLikeText, sayCause, turnCause } from "@/lib/core/diagnose-pair";
import { inspectWhole } from "@/lib/core/inspect";
import { joined, loseBits } from "./golden/bits";
import { GOLDEN_FAULTS, GOOD_IMAGE } from "./golden/recipes";
import { ascii, fill, stream } from "./stream";

const good = stream("bench-seed-1", 16_384);
const named = (sizeBytes: number) => ({ nameA: "Read 1", nameB: "Read 2", sizeBytes });
function between(a: Uint8Array, b: Uint8Array, sizeBytes = a.length) {
  const [there, back] = [diagnosePair(a, b, inspectWhole(a), inspectWhole(b), named(sizeBytes)), diagnosePair(b, a, inspectWhole(b), inspectWhole(a), named(sizeBytes))];
  expect(back.diagnosis.code).toBe(there.diagnosis.code);
  return there.diagnosis;
}
function edited(edit: (bytes: Uint8Array) => void, from = good): Uint8Array {
  const out = from.slice();
  edit(out);
  return out;
}

describe("sentences", () => {
  const said = (name: string) => between(GOOD_IMAGE, GOLDEN_FAULTS.find((fault) => fault.name === name)!.make(GOOD_IMAGE), 8192).message;
  it.each([
    ["lose1", "Everything from 0x0400 on sits 1 bit earlier in Read 2 than in Read 1: looks like a missed clock."],
    ["loseByte", "Everything from 0x0400 on sits 1 byte earlier in Read 2 than in Read 1: looks like a lost or repeated byte."],
    ["rot512", "Read 2 holds the bytes of Read 1 from 0x0200 on, then those before it: looks like a read that began at another address."],
    ["swap32", "Read 1 and Read 2 hold the same bytes, exchanged within every 32 bits: looks like another byte order."],
    ["inverted", "Every bit of Read 2 is the opposite of Read 1's: looks like an inverting adapter."],
    ["A8low", "Read 2 differs from Read 1 in 2,183 bytes, all in 0x0100–0x17FF, and Read 2 repeats over address line 8, which Read 1 doesn't: looks like a stuck address line."],
    ["burstFF", "Read 2 differs from Read 1 in 63 bytes, all in 0x0300–0x03FF, and holds FF or 00 there: looks like lost contact."],
    ["hdr64", "Read 1 has 8 KiB, Read 2 8,256 bytes; Read 2 holds Read 1 from 0x0040 on: looks like a header."],
    ["echo", "Read 2 begins with 4 bytes of the read command, then holds Read 1: looks like the command read back with the content."],
    ["flip", "Read 1 and Read 2 differ in 1 byte, at 0x0123, 1 of them by a single bit: looks like single bits that flip."],
  ])("%s", (name, sentence) => expect(said(name)).toBe(sentence));
  it("gives the words after looks like for a code, and none where nothing is guessed", () => {
    expect([looksLikeText("lost-contact"), looksLikeText("equal"), looksLikeText("unclassified"), looksLikeText("nothing")]).toEqual(["lost contact", null, null, null]);
  });
});

describe("images of one size", () => {
  it("are equal, for certain", () => expect(between(good, good.slice())).toMatchObject({ code: "equal", confidence: "certain", counts: { differingBytes: 0 } }));
  it("uniform in one or both", () => {
    expect(between(good, fill(good.length, 0x55))).toMatchObject({ code: "constant", faulty: "b" });
    expect(between(fill(512, 0xff), fill(512, 0))).toMatchObject({ code: "blank", faulty: null });
    expect(between(fill(512, 3), fill(512, 0))).toMatchObject({ code: "all-zero", faulty: null });
  });
  it("with two stretches exchanged hold the same bytes in another order", () => {
    expect(between(good, joined(good.subarray(0, 4096), good.subarray(8192, 12_288), good.subarray(4096, 8192), good.subarray(12_288))).code).toBe("rearranged");
  });
  it("that lost a byte of fill hold the same bytes, and have slipped all the same", () => {
    const apart = joined(stream("one", 1000), fill(504, 0xff), stream("two", 4000), fill(2688, 0xff));
    expect(between(apart, loseBits(apart, 1200 * 8, 8))).toMatchObject({ code: "byte-slip", counts: { shiftBits: 8 } });
  });
  it("exchanged in halves of 32 bits", () => expect(between(good, good.map((_, i) => good[i ^ 2]))).toMatchObject({ code: "byte-swapped", counts: { bits: 32 } }));
  it("of odd length keep their last byte when swapped", () => {
    const odd = good.slice(0, 1001);
    expect(between(odd, odd.map((value, i) => odd[i ^ 1] ?? value)).code).toBe("byte-swapped");
  });
  it("find a shift of up to 128 bits, not more", () => {
    expect(between(good, loseBits(good, 8000, 128))).toMatchObject({ code: "byte-slip", counts: { shiftBits: 128 } });
    expect(between(good, loseBits(good, 8000, 129)).code).not.toMatch(/slip/);
  });
  it("know which read lost bits when it has text", () => {
    const text = ascii("The drive starts only with its own configuration; name and path: /a/b.c ".repeat(200));
    expect(between(text, loseBits(text, 4000, 3))).toMatchObject({ code: "bit-slip", faulty: "b" });
  });
  it("want a fifth of the windows moved, and two", () => {
    const moved = edited((b) => b.set(good.subarray(4096 + 1, 4096 + 129), 4096));
    expect(between(good, moved).code).toBe("foreign-blocks");
  });
  it("of 128 bytes still show a slip", () => {
    const tiny = stream("tiny", 128);
    expect(between(tiny, loseBits(tiny, 100, 1)).code).toBe("bit-slip");
  });
  it("with foreign blocks, buffer edges and single ends", () => {
    expect(between(good, edited((b) => b.set(stream("other", 300), 5000))).code).toBe("foreign-blocks");
    expect(between(good, edited((b) => [256, 768, 2048, 8192].forEach((at) => { b[at] ^= 0x5a; b[at + 1] ^= 0x33; }))).code).toBe("buffer-edge");
    expect(between(good, edited((b) => [256, 768, 2048].forEach((at) => { b[at] ^= 0x5a; b[at + 1] ^= 0x33; }))).code).toBe("unclassified");
    expect(between(good, edited((b) => [256, 768, 2048, 8200].forEach((at) => { b[at] ^= 0x5a; b[at + 1] ^= 0x33; }))).code).toBe("unclassified");
    expect(between(good, edited((b) => { b[0] ^= 7; b[15] ^= 9; }))).toMatchObject({ code: "edge-bytes", counts: { atStart: 1 } });
    expect(between(good, edited((b) => { b[16_383] ^= 7; b[16_368] ^= 9; }))).toMatchObject({ code: "edge-bytes", counts: { atStart: 0 } });
    expect(between(good, edited((b) => { b[0] ^= 7; b[16] ^= 9; })).code).toBe("unclassified");
  });
  it("need 8 bytes of fill for lost contact", () => {
    const burst = (n: number) => between(good, edited((b) => b.fill(0xff, 5001, 5001 + n))).code;
    expect(good.subarray(5000, 5012).includes(0xff)).toBe(false);
    expect([burst(7), burst(8)]).toEqual(["unclassified", "lost-contact"]);
  });
  it("take half of the segments for lost contact", () => {
    const mix = (bad: number) => between(good, edited((b) => {
      for (let n = 0; n < 4; n += 1) b.fill(0, 1000 + n * 500, 1020 + n * 500);
      for (let n = 0; n < bad; n += 1) { b[9000 + n * 50] ^= 0x5a; b[9001 + n * 50] ^= 0x33; }
    })).code;
    expect([mix(4), mix(5)]).toEqual(["lost-contact", "unclassified"]);
  });
  it("tell flips that go one way from those that don't", () => {
    const flips = (n: number, value: 0 | 1 | null) => edited((b) => {
      for (let [at, left] = [100, n]; left > 0; at += 17) if (value === null || ((good[at] >> (at % 8)) & 1) === value) { b[at] ^= 1 << (at % 8); left -= 1; }
    });
    expect(between(good, flips(200, null)).code).toBe("random-flips");
    expect(between(good, flips(200, 0)).code).toBe("one-way-flips");
    expect(between(good, flips(200, 1)).code).toBe("one-way-flips");
    // 8 of one kind are 2.8 standard deviations, 12 are 3.5; fewer than 8 are never enough
    expect([7, 8, 12].map((n) => between(good, flips(n, 0)).code)).toEqual(["random-flips", "random-flips", "one-way-flips"]);
  });
  it("are sparse when there is too little to tell", () => {
    const [a, b] = [fill(8192, 0xff), fill(8192, 0xff)];
    a.set([1, 2, 3], 500);
    b.set([0x71, 0x18, 0x35], 500);
    expect(between(a, b)).toMatchObject({ code: "unclassified", confidence: "unsure", counts: { sparse: 1 } });
  });
  it("that both repeat over a line don't blame the line", () => {
    const [half, torn] = [stream("half", 8192), stream("half", 8192)];
    torn.fill(0xff, 3000, 3200);
    expect(between(joined(half, half), joined(torn, torn)).code).toBe("lost-contact");
  });
  it("with patterns that fit their own neighbourhood don't move", () => {
    const image = joined(stream("data", 8192), ...Array.from({ length: 8 }, (_, n) => { const unit = stream(`unit ${n}`, 8); return Array.from({ length: 1024 }, (__, i) => unit[i % 8]); }));
    const torn = edited((b) => { for (let at = 8192 + 52; at < b.length; at += 128) for (let i = 0; i < 8; i += 1) b[at + i] ^= 0x5a; }, image);
    expect(between(image, torn).code).toBe("unclassified");
  });
  it("with single bits off in blank space have not lost contact", () => {
    const blank = joined(stream("data", 8192), fill(8192, 0xff));
    expect(between(blank, edited((b) => [9001, 10_001, 12_001].forEach((at) => b.fill(0xfe, at, at + 12)), blank)).code).toMatch(/flips/);
  });
  it("mostly FF must lose ones: 40 flips one way say nothing there", () => {
    const blank = joined(stream("data", 512), fill(16_000, 0xff));
    expect(between(blank, edited((b) => { for (let n = 0; n < 40; n += 1) b[1003 + n * 300] ^= 1 << (n % 8); }, blank)).code).toBe("random-flips");
  });
  it("with one long stretch over fill and other faults beside it stay unclassified", () => {
    const blank = joined(stream("data", 8192), fill(8192, 0xff));
    expect(between(blank, edited((b) => {
      b.set(stream("over", 300), 9000);
      for (const at of [1001, 2001, 3001]) { b[at] ^= 0x5a; b[at + 1] ^= 0x33; }
    }, blank)).code).toBe("unclassified");
  });
  it("that differ at both ends differ at neither alone", () => {
    expect(between(good, edited((b) => { b[0] ^= 0x5a; b[16_383] ^= 0x33; })).code).toBe("unclassified");
  });
  it("keep their cause without names, and say it again from either side", () => {
    for (const name of ["lose1", "rot512", "burst00", "A8low"]) {
      const bad = GOLDEN_FAULTS.find((fault) => fault.name === name)!.make(GOOD_IMAGE);
      const [a, b] = [inspectWhole(GOOD_IMAGE), inspectWhole(bad)];
      const kept = JSON.parse(JSON.stringify(causeOfPair(GOOD_IMAGE, bad, a, b, 8192, compareImages(GOOD_IMAGE, bad))));
      const turned = sayCause(compareImages(bad, GOOD_IMAGE), turnCause(kept, 8192), named(8192));
      expect(turned).toEqual(diagnosePair(bad, GOOD_IMAGE, b, a, named(8192)).diagnosis);
    }
  });
  it("takes the facts that an early engine kept, and looks at the whole itself", () => {
    const kept = (bytes: Uint8Array) => ({ ...inspectWhole(bytes), whole: undefined });
    const bad = good.map((_, i) => good[i & ~0x100]);
    expect(diagnosePair(good, bad, kept(good), kept(bad), named(good.length)).diagnosis.code).toBe("address-line");
  });
});

describe("images of two sizes", () => {
  it("name the one that isn't the chip's size", () => {
    const half = good.slice(0, 8192);
    expect(between(good, half, 16_384)).toMatchObject({ code: "too-short", faulty: "b" });
    expect(between(good, half, 8192)).toMatchObject({ code: "extra-bytes", faulty: "a" });
    expect(between(good, half, 4096)).toMatchObject({ code: "too-short", confidence: "unsure" });
  });
  it("say no more than the length where nothing else fits", () => {
    expect(between(good, stream("other", 8192), 16_384)).toMatchObject({ code: "different-length", faulty: "b" });
  });
  it("find the shorter one inside the longer, in a chip of a few bytes too", () => {
    const tiny = stream("tiny", 128);
    expect(between(tiny, joined(fill(16, 0), tiny, [1]), 128)).toMatchObject({ code: "extra-bytes", counts: { offset: 16 } });
  });
});
