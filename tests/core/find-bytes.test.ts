import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { findBytes, hexPairs, type Needle, textNeedles } from "@/lib/core/find-bytes";

const reader = (image: Uint8Array) => (offset: number, length: number) => Promise.resolve(image.subarray(offset, offset + length));
const needle = (...bytes: number[]): Needle[] => [{ bytes: Uint8Array.from(bytes), as: "bytes" }];
const MIB = 1_048_576;

/** Every place, the slow way. */
function placesOf(image: Uint8Array, needles: readonly Needle[]): number[] {
  return Array.from(image.keys()).filter((at) => needles.some(({ bytes }) => at + bytes.length <= image.length && bytes.every((byte, i) => image[at + i] === byte)));
}

describe("a search in an image", () => {
  it("finds what a look at every address finds, in both ways and around the end", async () => {
    await fc.assert(fc.asyncProperty(
      fc.uint8Array({ minLength: 1, maxLength: 60, max: 2 }), fc.uint8Array({ minLength: 1, maxLength: 4, max: 2 }), fc.nat(60), async (image, sought, somewhere) => {
        const from = Math.min(somewhere, image.length);
        const needles = needle(...sought);
        const places = placesOf(image, needles);
        const next = places.find((at) => at >= from) ?? places[0];
        const previous = places.findLast((at) => at < from) ?? places.at(-1);
        expect((await findBytes(reader(image), image.length, needles, from, "next"))?.at).toBe(next);
        expect((await findBytes(reader(image), image.length, needles, from, "previous"))?.at).toBe(previous);
      }));
  });

  it("doesn't miss what lies across the border of two pieces, from either side", async () => {
    const image = new Uint8Array(3 * MIB);
    for (const at of [MIB - 1, 2 * MIB - 2]) image.set([1, 2, 3], at);
    const look = async (from: number, way: "next" | "previous") => findBytes(reader(image), image.length, needle(1, 2, 3), from, way);
    expect(await look(0, "next")).toEqual({ at: MIB - 1, length: 3, as: "bytes", around: false });
    expect(await look(MIB, "next")).toMatchObject({ at: 2 * MIB - 2, around: false });
    expect(await look(2 * MIB, "next")).toMatchObject({ at: MIB - 1, around: true });
    expect(await look(3 * MIB, "previous")).toMatchObject({ at: 2 * MIB - 2, around: false });
    expect(await look(2 * MIB - 2, "previous")).toMatchObject({ at: MIB - 1, around: false });
    expect(await look(MIB - 1, "previous")).toMatchObject({ at: 2 * MIB - 2, around: true });
  });

  it("finds a text that is written in one byte a character or in two, and says which", async () => {
    const image = new Uint8Array(100);
    image.set([0x42, 0, 0x4f, 0, 0x54, 0], 20);
    image.set([0x42, 0x4f, 0x54], 60);
    const look = (from: number) => findBytes(reader(image), 100, textNeedles("BOT"), from, "next");
    expect(await look(0)).toEqual({ at: 20, length: 6, as: "utf-16le", around: false });
    expect(await look(21)).toEqual({ at: 60, length: 3, as: "utf-8", around: false });
    expect(await findBytes(reader(image), 100, textNeedles("bot"), 0, "next")).toBeNull();
  });

  it("takes bytes as people write them, and no half ones", () => {
    expect(["5AA5", "5a a5", "0x5A, 0xA5", "5A-A5"].map((text) => [...(hexPairs(text) ?? [])])).toEqual(Array.from({ length: 4 }, () => [0x5a, 0xa5]));
    expect(["", "5", "5AA", "GG", "boot"].map(hexPairs)).toEqual([null, null, null, null, null]);
  });
});
