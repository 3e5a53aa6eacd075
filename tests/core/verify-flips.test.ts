import { describe, expect, it, vi } from "vitest";
import { flipArchive, flipFiles, flipForScript } from "@/scripts/tamper/flips";
import { zipParts } from "@/scripts/tamper/zip-map";
import { randomOf } from "@/scripts/engine/random";
import { makeBag } from "../support/make-bag";
import { faultsOf, rememberingTools, verifyBag } from "../support/verify-bag";
import { zipBag } from "../support/zip-bag";

// the whole sweep is scripts/tamper/bundle-flips.ts, its report docs/bundle-flips.md
vi.setConfig({ testTimeout: 120_000 });

const bag = makeBag({ drives: 1, imageBytes: 64 });
const IMAGE = "data/drives/1/original-U12/before-1.bin";
const random = randomOf(41);
const some = (n: number) => (_: string, length: number) => Array.from({ length: Math.min(n, length) }, () => random.below(length));

describe("one flipped bit", () => {
  it("of an image is found, every one of them, and the image is named first", async () => {
    const tools = rememberingTools();
    const image = bag.get(IMAGE)!;
    for (let bit = 0; bit < image.length * 8; bit += 1) {
      const other = Buffer.from(image);
      other[bit >> 3] ^= 1 << (bit & 7);
      expect(faultsOf(await verifyBag(new Map(bag).set(IMAGE, other), null, tools))[0]).toMatch(`${IMAGE}: Its SHA-256`);
    }
  });

  it("of any file is found by the page", async () => {
    for (const [name, tally] of await flipFiles(bag, some(25))) expect([name, tally.missed]).toEqual([name, []]);
  });

  it("of any file but check.sh itself is found by check.sh", async () => {
    const flips = [...bag].filter(([name]) => name !== "check.sh").map(([name, bytes]) => ({ name, at: some(1)(name, bytes.length)[0] }));
    for (const [name, tally] of await flipForScript(bag, flips, 2)) expect([name, tally.missed]).toEqual([name, []]);
  });

  it("of the archive is found wherever it changes a file or a name", async () => {
    const zip = await zipBag(bag);
    const parts = zipParts(zip).filter(({ name }) => /content|name$|CRC-32|size|offset|signature|method|flags/.test(name));
    const places = parts.map((part) => part.start + random.below(part.length));
    const missed = (await flipArchive(zip, places, () => false)).filter((flip) => !flip.page).map(({ at }) => parts.find((part) => at >= part.start && at < part.start + part.length)!.name);
    expect(missed).toEqual([]);
  });
});
