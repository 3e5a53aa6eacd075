import { describe, expect, it } from "vitest";
import { diagnosePair } from "@/lib/core/diagnose-pair";
import { crc32Hex, crc32Of } from "@/lib/core/digest";
import { diagnoseReadBack, judgeRead } from "@/lib/core/findings";
import { inspectWhole } from "@/lib/core/inspect";
import { DEFAULT_POLICY } from "@/lib/core/words";
import { sha256Hex } from "../stream";
import { APPROVED, GOLDEN_FAULTS, GOLDEN_READ_BACKS, GOOD_DIGEST, GOOD_IMAGE, OLD } from "./recipes";

const good = GOOD_IMAGE;
const facts = inspectWhole(good);
const ctx = { nameA: "Read 1", nameB: "Read 2", sizeBytes: good.length };

function alone(bytes: Uint8Array): string[] {
  return judgeRead({
    stage: "before", read: { sizeBytes: bytes.length, sha256: sha256Hex(bytes), fileName: "u3.bin", modifiedAt: null },
    chip: { sizeBytes: good.length, sizeSource: "marking" }, facts: inspectWhole(bytes), policy: DEFAULT_POLICY, earlier: [], elsewhere: [],
  }).map((one) => `${one.code} ${one.severity}`);
}

describe("the golden fault set", () => {
  it("starts from its base image", () => {
    expect([crc32Hex(crc32Of(good)), sha256Hex(good)]).toEqual([GOOD_DIGEST.crc32, GOOD_DIGEST.sha256]);
    expect(facts).toMatchObject({ ffCount: 4192, zeroCount: 13, whole: { oneBits: 49_447, entropy: "4.882740", chiSquare: "543034.00" } });
    expect(alone(good)).toEqual([]);
  });
  describe.each(GOLDEN_FAULTS)("$name", (fault) => {
    const bad = fault.make(good);
    const [there, back] = [diagnosePair(good, bad, facts, inspectWhole(bad), ctx), diagnosePair(bad, good, inspectWhole(bad), facts, ctx)];
    it("is the image of the table", () => expect([crc32Hex(crc32Of(bad)), sha256Hex(bad)]).toEqual([fault.crc32, fault.sha256]));
    it(`is called ${fault.code} from either side`, () => expect([there.diagnosis.code, back.diagnosis.code]).toEqual([fault.code, fault.code]));
    it("differs as counted", () => {
      if (fault.bytes !== undefined) expect(there.comparison.differingBytes).toBe(fault.bytes);
      if (fault.up !== undefined) expect([there.comparison.zeroToOne, there.comparison.oneToZero]).toEqual([fault.up, fault.down]);
      if (fault.first !== undefined) expect([there.comparison.first, there.comparison.last]).toEqual([fault.first, fault.last]);
      if (fault.shiftBits !== undefined) {
        expect(there.diagnosis.counts.shiftBits).toBe(fault.shiftBits);
        expect(back.diagnosis.counts.shiftBits).toBe(-fault.shiftBits);
      }
    });
    it("names the faulty read, or both, and says what to do", () => {
      for (const { diagnosis } of [there, back]) {
        expect(diagnosis.message).toMatch(/^[A-Z].*looks like .*\.$|can't be told/);
        expect(diagnosis.message).toContain("Read 1");
        expect(diagnosis.message).toContain("Read 2");
        expect(diagnosis.advice).toMatch(/\.$/);
      }
      if (there.diagnosis.faulty) expect([there.diagnosis.faulty, back.diagnosis.faulty]).toEqual(["b", "a"]);
    });
  });
});

describe("golden faults as the only image there is", () => {
  const of = (name: string) => alone(GOLDEN_FAULTS.find((fault) => fault.name === name)!.make(good));
  it.each<[string, string[]]>([
    ["idrep", ["short-period blocks"]],
    ["A12low", ["repeats-within reason"]],
    ["A8low", ["address-line blocks"]],
    ["A8high", ["address-line blocks"]],
    ["wrap16k", ["extra-bytes blocks", "repeats-within blocks"]],
    ["trunc4k", ["too-short blocks"]],
    ["pad512", ["padded blocks"]],
    // its last 64 bytes are the good image's own FF: by itself it can't be told from padding
    ["hdr64", ["padded blocks"]],
  ])("%s", (name, expected) => expect(of(name)).toEqual(expected));
  it("knows the aliases by their counts", () => {
    const lines = (name: string) => inspectWhole(GOLDEN_FAULTS.find((fault) => fault.name === name)!.make(good)).whole!.repeats;
    expect(lines("A8low").lines).toMatchObject([{ line: 8, informative: 2055, matches: 2055 }]);
    expect(lines("A12low")).toMatchObject({ period: { bytes: 4096, informative: 2973 }, lines: [{ line: 12, informative: 2973, matches: 2973 }] });
    expect(lines("wrap16k").period?.bytes).toBe(8192);
    expect(lines("idrep").short).toEqual({ bytes: 3, informative: 8189, matches: 8189 });
  });
});

describe("golden read-backs", () => {
  it.each(GOLDEN_READ_BACKS)("$name", ({ bytes, crc32, sha256, code }) => {
    expect([crc32Hex(crc32Of(bytes)), sha256Hex(bytes)]).toEqual([crc32, sha256]);
    expect(diagnoseReadBack(bytes, APPROVED, OLD).code).toBe(code);
  });
  it("tells equal, refused and erased", () => {
    expect(diagnoseReadBack(APPROVED, APPROVED, OLD).code).toBe("verified");
    expect(diagnoseReadBack(OLD, APPROVED, OLD).code).toBe("write-refused");
    expect(diagnoseReadBack(APPROVED.map(() => 0xff), APPROVED, OLD).code).toBe("erased-only");
  });
  it("calls a rotated, swapped or shifted write by the fault's own code", () => {
    const written = GOLDEN_FAULTS.filter(({ name }) => ["lose1", "loseByte", "rot512", "swap16", "inverted", "bitrev"].includes(name));
    expect(written.map((fault) => diagnoseReadBack(fault.make(good), good, null).code)).toEqual(written.map((fault) => fault.code));
  });
});
