import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { alike, type Family, familyFinding, likenessOf, nearest } from "@/lib/core/family";
import { judgeRead } from "@/lib/core/findings";
import { inspectWhole } from "@/lib/core/inspect";
import { DEFAULT_POLICY, type Stage } from "@/lib/core/words";
import { GOOD } from "./facts";
import { goldenImage, stream } from "./stream";

const share = (equalBytes: number, informativeBytes = 1000) => ({ equalBytes, informativeBytes });
const relative = (equalBytes: number, informativeBytes = 1000) => ({ ...share(equalBytes, informativeBytes), readName: "Read 1", designator: "U12", caseRef: "26-0181" });
const said = (family: Family) => familyFinding(family)?.message ?? null;

describe("the likeness of two images", () => {
  it("leaves out what is the same fill in both, and nothing else", () => {
    const a = Uint8Array.from([0xff, 0x00, 0xff, 0x00, 1, 2, 0xff]);
    const b = Uint8Array.from([0xff, 0x00, 0x00, 0xff, 1, 3, 7]);
    expect(likenessOf(a, b)).toEqual(share(1, 5));
  });
  it("is that of a naive count, and the same from either side", () => {
    fc.assert(fc.property(fc.array(fc.tuple(fc.constantFrom(0, 1, 0xff), fc.constantFrom(0, 1, 0xff)), { maxLength: 200 }), (pairs) => {
      const [a, b] = [0, 1].map((side) => Uint8Array.from(pairs, (pair) => pair[side]));
      const informative = pairs.filter(([x, y]) => x !== y || x === 1);
      expect(likenessOf(a, b)).toEqual(share(informative.filter(([x, y]) => x === y).length, informative.length));
      expect(likenessOf(b, a)).toEqual(likenessOf(a, b));
    }));
  });
  it("of a family begins at 90 %, and takes 64 bytes to tell", () => {
    expect([share(899), share(900), share(1000), share(63, 63), share(64, 64), share(0, 0), null].map(alike)).toEqual([false, true, true, false, true, false, false]);
  });
  it("is nearest where the share is greatest, not the count", () => {
    expect(nearest([share(10, 100), share(90, 1000), share(0, 0)])).toEqual(share(10, 100));
    expect(nearest([])).toBeNull();
  });
});

describe("a read beside the same chip of other boards", () => {
  it("all but equal to one of them is noted, with what differs", () => {
    expect(familyFinding({ relatives: [relative(950), relative(8191, 8192)], among: null })).toMatchObject({
      code: "family-likeness", severity: "note", measured: "99.98 % of 8,192 bytes equal, fill left out", threshold: "90 to 99.9 % between boards of one number",
      message: "Equals Read 1 of U12, case 26-0181, in all but 1 byte; that board has the same number.",
    });
    expect(said({ relatives: [relative(9989, 10_000)], among: null })).toBeNull();
    expect(said({ relatives: [relative(9990, 10_000)], among: null })).toContain("in all but 10 bytes");
  });
  it("unlike all of them is noted only where they are alike to each other", () => {
    expect(familyFinding({ relatives: [relative(400), relative(123)], among: share(972) })).toMatchObject({
      code: "family-likeness", severity: "note",
      message: "Unlike the same chip of other boards with this number: 40.00 % of its data equal Read 1 of U12, case 26-0181, the nearest.",
      advice: expect.stringContaining("alike to 97.20 %"),
    });
    expect(said({ relatives: [relative(400), relative(123)], among: share(899) })).toBeNull();
    expect(said({ relatives: [relative(400)], among: null })).toBeNull();
    expect(said({ relatives: [relative(400)], among: share(60, 60) })).toBeNull();
  });
  it("as alike as usual, or with too little to tell, is not noted", () => {
    for (const equal of [900, 950, 998]) expect(said({ relatives: [relative(equal)], among: share(990) })).toBeNull();
    expect(said({ relatives: [relative(2, 63)], among: share(990) })).toBeNull();
    expect(said({ relatives: [relative(2, 64)], among: share(990) })).not.toBeNull();
    expect(said({ relatives: [], among: share(990) })).toBeNull();
  });
});

describe("the note on a judged read", () => {
  const image = goldenImage();
  const other = { relation: "other-drive" as const, readName: "Read 1", designator: "U7", caseRef: "26-0181", sameSerial: false };
  const judged = (stage: Stage, elsewhere: (typeof other)[] = [], bytes = image) => judgeRead({
    stage, read: { sizeBytes: 8192, sha256: GOOD, fileName: "u3.bin", modifiedAt: null }, chip: { sizeBytes: 8192, sizeSource: "marking" },
    facts: inspectWhole(bytes), policy: DEFAULT_POLICY, earlier: [], elsewhere, family: { relatives: [{ ...relative(0), ...likenessOf(image, stream("s", 8192)) }], among: share(1000) },
  }).map((one) => `${one.code} ${one.severity}`);
  it("stands on reads of the original alone", () => expect((["before", "donor", "after"] as const).map((stage) => judged(stage))).toEqual([["family-likeness note"], [], []]));
  it("gives way to an equal image of another chip", () => expect(judged("before", [other])).toEqual(["other-drive blocks"]));
  it("gives way to a fault that the image shows by itself", () => {
    expect(judged("before", [], Uint8Array.from(image, (_, i) => image[i % 1024]))).toEqual(["repeats-within blocks"]);
  });
});
